/** Tags counted up one by one from here on are told by the first and the last. */
const SHORTEST_RUN = 3;
const BY_TAG = new Intl.Collator('en', { numeric: true });

/** As a person counts: CR-9 before CR-10. */
export function compareTags(a: string, b: string): number {
  return BY_TAG.compare(a, b);
}

/** "CR-18", "CR-20 to CR-23": tags as a person would say them, runs by their ends. */
export function tagRuns(tags: readonly string[]): string[] {
  const runs: string[][] = [];
  for (const tag of [...tags].sort(compareTags)) {
    const run = runs.at(-1);
    const last = run?.at(-1);
    if (run !== undefined && last !== undefined && follows(last, tag)) run.push(tag);
    else runs.push([tag]);
  }
  return runs.flatMap((run) => (run.length < SHORTEST_RUN ? run : [`${run[0] ?? ''} to ${run.at(-1) ?? ''}`]));
}

/** The same before the number, and the number one higher: TR-009 and TR-010 count on, TR-9 and TR-010 do not. */
function follows(last: string, next: string): boolean {
  const [a, b] = [numbered(last), numbered(next)];
  if (a === null || b === null || a.stem !== b.stem || Number(b.digits) !== Number(a.digits) + 1) return false;
  return a.digits.length === b.digits.length || !(a.digits.startsWith('0') || b.digits.startsWith('0'));
}

function numbered(tag: string): { stem: string; digits: string } | null {
  const digits = /\d{1,9}$/.exec(tag)?.[0];
  return digits === undefined ? null : { stem: tag.slice(0, -digits.length), digits };
}
