import { roundCumulatively, roundedSum } from '@riseback/units';

/** An account as it is printed: every column adds up to its total, every line to the running balance, the totals to the closing. */
export interface PrintedAccount {
  readonly opening: string;
  readonly columns: readonly PrintedColumn[];
  /** The balance after each entry. */
  readonly running: readonly string[];
  readonly closing: string;
}

export interface PrintedColumn {
  readonly entries: readonly string[];
  readonly total: string;
}

/**
 * Rounds an account so that nothing in it contradicts anything else. Each column is rounded cumulatively, so it adds up to its total.
 * The totals are rounded so that they add up, with the opening, to the rounded closing: where their own roundings do not, those
 * farthest from theirs give way by one in the last place, and their column's entries in proportion. An entry of nothing stays nothing
 * and none prints with the wrong sign.
 * @param columns the columns' entries, as many in each, in display units
 */
export function printAccount(
  opening: number,
  columns: readonly (readonly number[])[],
  decimals: number,
): PrintedAccount {
  const printedOpening = roundedSum([opening], decimals);
  const closing = roundedSum([opening, ...columns.flat()], decimals);
  const totals = agreeingTotals(printedOpening, columns, closing, decimals);
  const printed = columns.map((entries, i) => printColumn(entries, totals[i], decimals));
  const lines = columns[0]?.length ?? 0;
  const balance = [valueOf(printedOpening)];
  const running = Array.from({ length: lines }, (_, line) => {
    balance.push(...printed.map(({ entries }) => valueOf(entries[line] ?? '0')));
    return roundedSum(balance, decimals);
  });
  return { opening: printedOpening, columns: printed, running, closing };
}

/** The number that a printed amount stands for. */
export function valueOf(printed: string): number {
  return Number(printed.replaceAll(',', '').replace('−', '-'));
}

/** For each column the total it must print instead of its own rounding; undefined where its own will do. */
function agreeingTotals(
  opening: string,
  columns: readonly (readonly number[])[],
  closing: string,
  decimals: number,
): (number | undefined)[] {
  const unit = 10 ** -decimals;
  const own = columns.map((entries) => valueOf(roundedSum(entries, decimals)));
  const missing = Math.round((valueOf(closing) - valueOf(opening) - own.reduce((a, b) => a + b, 0)) / unit);
  const direction = Math.sign(missing);
  /** How far its own rounding went the other way; the more, the better a column can give way. */
  const roundedOff = columns.map((entries, i) => direction * (entries.reduce((a, b) => a + b, 0) - (own[i] ?? 0)));
  const giving = columns
    .map((_, i) => i)
    .filter((i) => columns[i]?.some((entry) => entry !== 0))
    .sort((a, b) => (roundedOff[b] ?? 0) - (roundedOff[a] ?? 0))
    .slice(0, Math.abs(missing));
  return columns.map((_, i) => (giving.includes(i) ? (own[i] ?? 0) + direction * unit : undefined));
}

function printColumn(entries: readonly number[], total: number | undefined, decimals: number): PrintedColumn {
  if (total === undefined)
    return { entries: roundCumulatively(entries, decimals), total: roundedSum(entries, decimals) };
  const sum = entries.reduce((a, b) => a + b, 0);
  const size = entries.reduce((a, b) => a + Math.abs(b), 0);
  const adjusted = entries.map((entry) => entry + ((total - sum) * Math.abs(entry)) / size);
  return { entries: roundCumulatively(adjusted, decimals), total: roundedSum([total], decimals) };
}
