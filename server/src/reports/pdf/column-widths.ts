/** What a column would like and what it can do with, pt. */
export interface WantedWidth {
  readonly natural: number;
  /** Of its longest word, or of its longest number, which is not broken. */
  readonly least: number;
}

/**
 * Widths that fill the page: what is over is shared out evenly; what is missing is taken from the columns that have most to give, never below the
 * least of any while all can keep it.
 */
export function columnWidths(wanted: readonly WantedWidth[], available: number): number[] {
  const natural = sum(wanted.map((column) => column.natural));
  if (natural <= available) {
    const over = (available - natural) / Math.max(1, wanted.length);
    return wanted.map((column) => column.natural + over);
  }
  const least = sum(wanted.map((column) => column.least));
  if (least >= available) return wanted.map((column) => (column.least * available) / least);
  // one cap for all columns: whoever wants more than it gets it, or its least
  let [low, high] = [0, Math.max(...wanted.map((column) => column.natural))];
  const capped = (cap: number) => wanted.map(({ natural: most, least: few }) => Math.max(few, Math.min(most, cap)));
  for (let step = 0; step < 40; step += 1) {
    const cap = (low + high) / 2;
    if (sum(capped(cap)) > available) high = cap;
    else low = cap;
  }
  return capped(low);
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
