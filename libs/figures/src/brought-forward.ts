import { roundedSum } from '@riseback/units';
import { type LedgerModel, type LedgerRow, NOTHING } from './ledger-model';
import { valueOf } from './printed-account';

/** How many lines of the account a sheet of A4 landscape holds; Letter, which is taller, holds them too. */
export const SHEET_LINES = {
  /** Below the head and the lift profile. */
  first: 16,
  other: 36,
  /** What the closing line and the foot take. */
  foot: 5,
} as const;

/** Before which lines a new sheet begins, so that the closing line and the foot stand whole on the last. */
export function sheetBreaks(lines: number): readonly number[] {
  const breaks: number[] = [];
  let from = 0;
  for (;;) {
    const room = breaks.length === 0 ? SHEET_LINES.first : SHEET_LINES.other;
    const left = lines - from;
    if (left <= room - SHEET_LINES.foot) return breaks;
    // a sheet that holds all the lines but not the foot leaves a line for the next, which would begin with nothing else
    from += Math.min(room - 1, left - 1);
    breaks.push(from);
  }
}

/** What the columns add up to so far: at the end of a sheet and again at the head of the next. */
export interface Forward {
  readonly length: string;
  readonly rise: string;
  readonly static: string;
  readonly friction: string;
  readonly flashSteam: string;
  readonly running: string;
  readonly handAdds: string;
  readonly handRunning: string;
}

/** @param count how many lines stand before; at least one */
export function broughtForward({ rows, opening }: Pick<LedgerModel, 'rows' | 'opening'>, count: number): Forward {
  const before = rows.slice(0, count);
  const last = before.at(-1);
  const sum = (of: (row: LedgerRow) => string) => printedSum(before.map(of));
  const [up, down] = [sum(({ up: rise }) => rise), sum(({ down: fall }) => fall)];
  const rise = [...(up === NOTHING ? [] : [`+${up}`]), ...(down === NOTHING ? [] : [`−${down}`])].join(' ');
  return {
    length: sum(({ length }) => length),
    rise: rise === '' ? NOTHING : rise,
    static: sum((row) => row.static),
    friction: sum(({ friction }) => friction),
    flashSteam: sum(({ flashSteam }) => flashSteam),
    running: last?.running ?? opening,
    handAdds: sum(({ handAdds }) => handAdds),
    handRunning: last?.handRunning ?? opening,
  };
}

/** The sum of what is printed, in its own decimals; a dash where there is nothing but dashes. */
function printedSum(entries: readonly string[]): string {
  const numbers = entries.filter((entry) => entry !== NOTHING && entry !== '');
  if (numbers.length === 0) return NOTHING;
  const decimals = Math.max(...numbers.map((entry) => entry.split('.')[1]?.length ?? 0));
  return roundedSum(numbers.map(valueOf), decimals);
}
