/** A constant of the code as the page prints it, so that none is typed a second time: "4,000", "1e8", "0.05". */
export function printed(value: number, significantDigits = 6): string {
  const rounded = Number(value.toPrecision(significantDigits));
  const size = Math.abs(rounded);
  if (size >= 1e7 || (size > 0 && size < 1e-4)) return rounded.toExponential().replace('e+', 'e').replace('-', '−');
  return rounded.toLocaleString('en', { maximumFractionDigits: 8 }).replace('-', '−');
}
