/** What spreadsheets take for the beginning of a formula. */
const FORMULA_START = /^[=+\-@\t\r]/;

/** One line of RFC 4180, with formulas neutralised: a cell that would be run when the file is opened begins with '. */
export function csvLine(cells: readonly string[]): string {
  return `${cells.map(csvCell).join(',')}\r\n`;
}

function csvCell(text: string): string {
  const safe = FORMULA_START.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
