import { guarded } from '@riseback/contracts';

/** One line of RFC 4180, with formulas neutralised: a cell that would be run when the file is opened begins with '. */
export function csvLine(cells: readonly string[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`;
}

function csvCell(text: string): string {
  const safe = guarded(text);
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
