export const MOST_INITIAL_KB: number;
export function initialJavaScript(folder: string): { readonly files: readonly string[]; readonly kB: number };
export function demandSmallStart(folder: string, log: (line: string) => void, mostKB?: number): void;
