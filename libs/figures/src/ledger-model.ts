import type { TrapResult } from '@riseback/contracts';
import type { NetworkDocument, PipeRun } from '@riseback/network';
import type { LedgerEntry } from '@riseback/solver';
import {
  type DisplayUnits,
  displayUnit,
  formatQuantity,
  roundCumulatively,
  roundedSum,
  toDisplay,
} from '@riseback/units';
import { boreWords } from './element-text';
import { printAccount, type PrintedAccount, valueOf } from './printed-account';
import { nameOf } from './element-words';

/** Decimals of the account: a hundredth of a psi or of a kPa is below anything that matters. */
const DECIMALS = 2;
/** An absent entry. */
export const NOTHING = '–';

export interface LedgerRow {
  readonly no: number;
  readonly pipeId: string;
  readonly element: string;
  readonly place: string;
  readonly bore: string;
  readonly length: string;
  readonly rise: string;
  /** Rise and fall by themselves; '' for none. */
  readonly up: string;
  readonly down: string;
  readonly flow: string;
  readonly flash: string;
  readonly static: string;
  readonly friction: string;
  readonly flashSteam: string;
  readonly running: string;
  readonly handAdds: string;
  readonly handRunning: string;
  readonly lifts: boolean;
  readonly bar: LedgerBar;
}

/** The line's share of the whole account, 0 to 1 along the bar: what stood before it, and what it adds. */
export interface LedgerBar {
  readonly before: number;
  readonly parts: readonly {
    readonly kind: 'lift' | 'friction' | 'flash';
    readonly from: number;
    readonly to: number;
  }[];
  readonly after: number;
}

export interface LedgerModel {
  readonly rows: readonly LedgerRow[];
  readonly opening: string;
  readonly closing: {
    readonly length: string;
    readonly rise: string;
    readonly up: string;
    readonly down: string;
    readonly static: string;
    readonly friction: string;
    readonly flashSteam: string;
    readonly running: string;
    readonly handAdds: string;
    readonly handRunning: string;
  };
  readonly barScale: { readonly low: string; readonly high: string };
  readonly titles: {
    readonly length: string;
    readonly rise: string;
    readonly flow: string;
    readonly adds: string;
    readonly running: string;
  };
  /** Why the hand check says something else. */
  readonly handCheck: string;
}

/**
 * A trap's account as it is printed, in the person's units.
 * @param entries from the vessel back to the trap, as the solver's `ledger` gives them
 */
export function ledgerModel(
  entries: readonly LedgerEntry[],
  trap: TrapResult,
  document: NetworkDocument,
  units: DisplayUnits,
): LedgerModel {
  const difference = (pa: number) => toDisplay(pa, 'pressureDifference', units);
  const opening = toDisplay(trap.receiverPressurePa, 'pressure', units);
  const statics = entries.map(({ staticPa }) => difference(staticPa));
  const frictions = entries.map(({ frictionPa }) => difference(frictionPa));
  const flashes = entries.map(({ flashPa }) => difference(flashPa));
  const account = printAccount(opening, [statics, frictions, flashes], DECIMALS);
  const hand = handAccount(entries, account, opening, units);
  const lengths = printColumn(entries.map(({ lengthM }) => toDisplay(lengthM, 'length', units)));
  const rises = printRises(entries, units);
  const [staticColumn, frictionColumn, flashColumn] = account.columns;
  const bars = ledgerBars(entries, trap);
  const unit = displayUnit('pressure', units.system);
  const lengthUnit = displayUnit('length', units.system);

  return {
    rows: entries.map((entry, i) => {
      const pipe = document.pipes.get(entry.pipeId)?.value;
      return {
        no: i + 1,
        pipeId: entry.pipeId,
        element: pipe === undefined ? entry.pipeId : nameOf(pipe),
        place: placeWords(entry, pipe, i, entries.length),
        bore: pipe === undefined ? NOTHING : boreWords(pipe, units),
        length: lengths.entries[i] ?? '',
        rise: rises.entries[i] ?? '',
        up: rises.ups[i] ?? '',
        down: rises.downs[i] ?? '',
        flow: formatQuantity(entry.massFlowKgS, 'massFlow', units),
        flash: unless(entry.quality === 0, formatQuantity(entry.quality, 'quality', units, { decimals: 1 })),
        static: unless(entry.staticPa === 0, staticColumn?.entries[i]),
        friction: unless(entry.frictionPa === 0, frictionColumn?.entries[i]),
        flashSteam: unless(entry.flashPa === 0, flashColumn?.entries[i]),
        running: account.running[i] ?? '',
        handAdds: unless(entry.handCheckPa === 0, hand.columns[0]?.entries[i]),
        handRunning: hand.running[i] ?? '',
        lifts: entry.riseM > 0,
        bar: bars[i] ?? { before: 0, parts: [], after: 0 },
      };
    }),
    opening: account.opening,
    closing: {
      length: lengths.total,
      rise: rises.total,
      up: rises.up,
      down: rises.down,
      static: unless(statics.every(isZero), staticColumn?.total),
      friction: unless(frictions.every(isZero), frictionColumn?.total),
      flashSteam: unless(flashes.every(isZero), flashColumn?.total),
      running: account.closing,
      handAdds: unless(
        entries.every(({ handCheckPa }) => handCheckPa === 0),
        hand.columns[0]?.total,
      ),
      handRunning: hand.closing,
    },
    barScale: {
      low: formatQuantity(Math.min(...levels(entries, trap)), 'pressure', units),
      high: formatQuantity(Math.max(...levels(entries, trap)), 'pressure', units),
    },
    titles: {
      length: `Length ${lengthUnit}`,
      rise: `Rise ${lengthUnit}`,
      flow: `Flow ${displayUnit('massFlow', units.system)}`,
      adds: displayUnit('pressureDifference', units.system),
      running: unit,
    },
    handCheck: handCheckWords(account, hand, displayUnit('pressureDifference', units.system)),
  };
}

/** By rule and without credit the lift is the hand check's own, and is printed the same, line by line. */
function handAccount(
  entries: readonly LedgerEntry[],
  account: PrintedAccount,
  opening: number,
  units: DisplayUnits,
): PrintedAccount {
  const same = entries.every(({ staticPa, handCheckPa }) => Math.abs(staticPa - handCheckPa) < 0.5);
  const adds = entries.map(({ handCheckPa }) => toDisplay(handCheckPa, 'pressureDifference', units));
  const lift = account.columns[0];
  if (!same || lift === undefined) return printAccount(opening, [adds], DECIMALS);
  let balance = valueOf(account.opening);
  const running = lift.entries.map((entry) => {
    balance += valueOf(entry);
    return roundedSum([balance], DECIMALS);
  });
  return { opening: account.opening, columns: [lift], running, closing: running.at(-1) ?? account.opening };
}

function handCheckWords({ columns, closing }: PrintedAccount, hand: PrintedAccount, unit: string): string {
  const [lift, friction, flash] = columns.map(({ total }) => valueOf(total));
  const print = (value: number) => roundedSum([Math.abs(value)], DECIMALS);
  const apart = valueOf(closing) - valueOf(hand.closing);
  const liftApart = (lift ?? 0) - valueOf(hand.columns[0]?.total ?? '0');
  const leftOut = [
    ...(friction === 0 ? [] : [`friction ${print(friction ?? 0)}`]),
    ...(flash === 0 ? [] : [`flash steam ${print(flash ?? 0)}`]),
  ].join(' and ');
  const reasons = [
    ...(leftOut === '' ? [] : [`it leaves out ${leftOut}`]),
    ...(print(liftApart) === print(0)
      ? []
      : [`it counts ${print(liftApart)} ${liftApart > 0 ? 'less' : 'more'} for rises and falls`]),
  ].join(', and ');
  const head =
    print(apart) === print(0)
      ? 'Hand check agrees to the last digit'
      : `Hand check is ${print(apart)} ${unit} ${apart > 0 ? 'lower' : 'higher'}`;
  return `${head}${reasons === '' ? '' : `: ${reasons}`}. Falls are not credited.`;
}

function printColumn(values: readonly number[]): { entries: readonly string[]; total: string } {
  const decimals = decimalsFor(values);
  return { entries: roundCumulatively(values, decimals), total: roundedSum(values, decimals) };
}

/** As few decimals as show every value to half a hundredth, two at most: pipes are measured in whole feet more often than not. */
function decimalsFor(values: readonly number[]): number {
  const shownBy = (decimals: number) =>
    values.every((value) => Math.abs(value - Number(value.toFixed(decimals))) < 0.005);
  return [0, 1].find(shownBy) ?? 2;
}

/** Rises and falls of a pipe are told apart, since only rises count by hand: +22 −1. */
interface PrintedRises {
  readonly entries: readonly string[];
  readonly total: string;
  /** By themselves; '' for none. */
  readonly ups: readonly string[];
  readonly downs: readonly string[];
  readonly up: string;
  readonly down: string;
}

function printRises(entries: readonly LedgerEntry[], units: DisplayUnits): PrintedRises {
  const up = entries.map(({ riseM }) => toDisplay(riseM, 'length', units));
  const down = entries.map(({ fallM }) => toDisplay(fallM, 'length', units));
  const decimals = decimalsFor([...up, ...down]);
  const alone = (printed: string) => (isNothing(printed) ? '' : printed);
  const both = (rise: string, fall: string) => {
    const parts = [...(rise === '' ? [] : [`+${rise}`]), ...(fall === '' ? [] : [`−${fall}`])];
    return parts.length === 0 ? NOTHING : parts.join(' ');
  };
  const [ups, downs] = [up, down].map((column) => roundCumulatively(column, decimals).map(alone));
  const [totalUp, totalDown] = [up, down].map((column) => alone(roundedSum(column, decimals)));
  return {
    entries: (ups ?? []).map((rise, i) => both(rise, downs?.[i] ?? '')),
    total: both(totalUp ?? '', totalDown ?? ''),
    ups: ups ?? [],
    downs: downs ?? [],
    up: totalUp ?? '',
    down: totalDown ?? '',
  };
}

function placeWords({ riseM }: LedgerEntry, pipe: PipeRun | undefined, index: number, count: number): string {
  const [firstLine = ''] = (pipe?.note ?? '').split('\n');
  const given = [pipe?.area ?? '', firstLine].filter((part) => part !== '').join(', ');
  if (given !== '') return given;
  if (index === count - 1) return 'Trap outlet';
  return riseM > 0 ? 'Rise' : '';
}

/** The balance before the first line and after each, Pa. */
function levels(entries: readonly LedgerEntry[], { receiverPressurePa }: TrapResult): number[] {
  let levelPa = receiverPressurePa;
  return [levelPa, ...entries.map((entry) => (levelPa += entry.staticPa + entry.frictionPa + entry.flashPa))];
}

function ledgerBars(entries: readonly LedgerEntry[], trap: TrapResult): LedgerBar[] {
  const stand = levels(entries, trap);
  const lowPa = Math.min(...stand);
  const spanPa = Math.max(1, Math.max(...stand) - lowPa);
  const share = (pa: number) => Math.min(1, Math.max(0, (pa - lowPa) / spanPa));
  return entries.map((entry, i) => {
    const beforePa = stand[i] ?? lowPa;
    let atPa = beforePa;
    const parts = (
      [
        ['lift', entry.staticPa],
        ['friction', entry.frictionPa],
        ['flash', entry.flashPa],
      ] as const
    ).map(([kind, pa]) => {
      const from = Math.min(atPa, atPa + pa);
      const to = Math.max(atPa, atPa + pa);
      atPa += pa;
      return { kind, from: share(from), to: share(to) };
    });
    return { before: share(beforePa), parts, after: share(atPa) };
  });
}

function isNothing(printed: string | undefined): boolean {
  return printed === undefined || !/[1-9]/.test(printed);
}

/** A dash says that there is nothing; 0.00 that there is too little to print. */
function unless(absent: boolean, printed: string | undefined): string {
  return absent || printed === undefined ? NOTHING : printed;
}

function isZero(value: number): boolean {
  return value === 0;
}
