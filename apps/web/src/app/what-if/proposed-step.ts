import { pipeBore } from '@riseback/hydraulics';
import type { NetworkDocument, PipeRun } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { nameOf } from '../shared/element-words';
import { sizeAway, USUAL_SCHEDULE } from './next-size';
import { routesAfterRaising } from './raised-routes';
import type { TriedStep, TriedValue } from './trial';
import { nodeValue, SUBJECT_FACTS, type Subject, type Way } from './trial-subjects';

export interface Wish {
  readonly subject: Subject;
  readonly way: Way;
  readonly ids: readonly string[];
  /** SI, or a factor; not needed for a step of sizes. */
  readonly amount?: number | undefined;
  /** A nominal size, where one is chosen. */
  readonly nps?: string | undefined;
}

export type Proposed =
  { readonly ok: true; readonly step: Omit<TriedStep, 'id'> } | { readonly ok: false; readonly reason: string };

/** What a wish makes of a network, element by element; all of it or nothing, with the first reason. */
export function proposedStep(document: NetworkDocument, wish: Wish, units: DisplayUnits): Proposed {
  const { subject, ids } = wish;
  if (ids.length === 0) return no(`Choose at least one ${SUBJECT_FACTS[subject].one}.`);
  const made = subject === 'size' ? resized(document, wish) : moved(document, { ...wish, subject }, units);
  if (!made.ok) return made;
  return { ok: true, step: { words: `${wordsOf(wish, units)}: ${namesOf(document, ids)}`, values: made.values } };
}

type Made = { readonly ok: true; readonly values: TriedValue[] } | { readonly ok: false; readonly reason: string };

function resized(document: NetworkDocument, { way, ids, nps }: Wish): Made {
  const values: TriedValue[] = [];
  for (const id of ids) {
    const pipe = document.pipes.get(id)?.value;
    if (pipe === undefined) continue;
    const bore = way === 'set' ? sizeOf(pipe, nps) : sizeAway(pipe, way === 'up' ? 1 : -1);
    if (bore === undefined) return no(noSize(pipe, way, nps));
    const size = { nps: bore.nps, schedule: bore.schedule };
    // a pipe has a size or a bore, never both
    values.push({ in: 'pipes', id, key: 'size', to: size }, { in: 'pipes', id, key: 'insideDiameterM' });
  }
  return { ok: true, values };
}

function sizeOf({ size }: PipeRun, nps: string | undefined): ReturnType<typeof pipeBore> {
  return nps === undefined ? undefined : pipeBore({ nps, schedule: size?.schedule ?? USUAL_SCHEDULE });
}

function noSize(pipe: PipeRun, way: Way, nps: string | undefined): string {
  const schedule = pipe.size?.schedule ?? USUAL_SCHEDULE;
  if (way === 'set') {
    if (nps === undefined) return 'Choose a size.';
    return `${nameOf(pipe)}: ${nps} in is not made in schedule ${schedule}. Choose another size.`;
  }
  return `${nameOf(pipe)} has the ${way === 'up' ? 'largest' : 'smallest'} size that schedule ${schedule} is made in.`;
}

function moved(
  document: NetworkDocument,
  { subject, way, ids, amount }: Wish & { subject: Exclude<Subject, 'size'> },
  units: DisplayUnits,
): Made {
  if (amount === undefined) return no('Give a value.');
  const values: TriedValue[] = [];
  const elevations = new Map<string, number>();
  for (const id of ids) {
    const node = document.nodes.get(id)?.value;
    const now = node === undefined ? undefined : nodeValue(node, subject, units);
    if (node === undefined || now === undefined) continue;
    const to = changed(now, way, amount);
    if (subject === 'pressure' && !(to > 0))
      return no(`${nameOf(node)} cannot stand below no pressure at all. Give a smaller difference.`);
    if (subject === 'load' && to < 0) return no('A load cannot be below nothing.');
    values.push({ in: 'nodes', id, key: KEYS[subject](node.kind), to });
    if (subject === 'pressure' && node.kind === 'receiver') values.push({ in: 'nodes', id, key: 'vented' });
    if (subject === 'elevation') elevations.set(id, to);
  }
  return { ok: true, values: [...values, ...routesAfterRaising(document, elevations)] };
}

function changed(now: number, way: Way, amount: number): number {
  if (way === 'add') return now + amount;
  return way === 'multiply' ? now * amount : amount;
}

const KEYS: Readonly<Record<Exclude<Subject, 'size'>, (kind: string) => string>> = {
  pressure: () => 'pressurePa',
  elevation: () => 'elevationM',
  load: (kind) => (kind === 'trap' ? 'loadKgS' : 'flowKgS'),
};

/** What is wished, as it stands before the names: "Next size up", "Pressure raised by 5.0 psi", "Load × 1.2". */
function wordsOf({ subject, way, amount = 0, nps = '' }: Wish, units: DisplayUnits): string {
  const facts = SUBJECT_FACTS[subject].ways.find((one) => one.way === way);
  if (subject === 'size') return way === 'set' ? `Size ${nps} in` : (facts?.words ?? '');
  if (facts === undefined || facts.asks === null || facts.asks === 'size') return SUBJECT_FACTS[subject].words;
  const value = formatQuantity(Math.abs(amount), facts.asks.kind, units, { withUnit: true });
  const noun = NOUNS[subject];
  if (way === 'multiply') return `${noun} × ${value}`;
  if (way === 'add') return `${noun} ${amount < 0 ? 'lowered' : 'raised'} by ${value}`;
  return `${noun} ${formatQuantity(amount, facts.asks.kind, units, { withUnit: true })}`;
}

const NOUNS = { pressure: 'Pressure', elevation: 'Elevation', load: 'Load' } as const;

/** "CR-1, CR-2 and 3 more" */
function namesOf(document: NetworkDocument, ids: readonly string[]): string {
  const names = ids.slice(0, 3).map((id) => {
    const element = document.nodes.get(id)?.value ?? document.pipes.get(id)?.value;
    return element === undefined ? id : nameOf(element);
  });
  return ids.length > 3 ? `${names.slice(0, 2).join(', ')} and ${String(ids.length - 2)} more` : names.join(', ');
}

function no(reason: string): { readonly ok: false; readonly reason: string } {
  return { ok: false, reason };
}
