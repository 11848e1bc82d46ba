import { applyBatch, type EditOp, jsonEqual, type NetworkDocument, setOp } from '@riseback/network';
import * as z from 'zod';
import { nameOf } from '../shared/element-words';

/** One value that is tried: what a key of an element is to be; `to` left out takes the key away. */
const TriedValue = z.object({
  in: z.enum(['nodes', 'pipes']),
  id: z.string(),
  key: z.string(),
  to: z.unknown().optional(),
});
export type TriedValue = z.infer<typeof TriedValue>;

/** What was tried at once, and can be taken back at once. */
const TriedStep = z.object({ id: z.string(), words: z.string(), values: z.array(TriedValue) });
export type TriedStep = z.infer<typeof TriedStep>;

/** What stood in the network when a place was first touched, so that a change by others is noticed. */
const SeenValue = z.object({ place: z.string(), value: z.unknown().optional() });

/** Changes that are tried on top of a network. It holds no network: it is laid over whatever the network is. */
export const Trial = z.object({ steps: z.array(TriedStep), seen: z.array(SeenValue) });
export type Trial = z.infer<typeof Trial>;

export const EMPTY_TRIAL: Trial = { steps: [], seen: [] };

/** A place where others changed what is tried here too. */
export interface OvertakenPlace {
  readonly place: string;
  readonly name: string;
  readonly key: string;
}

export interface LaidOver {
  /** The network with all that is tried; nobody else sees it. */
  readonly document: NetworkDocument;
  /** What keeping it would do, as one batch made on the network as it is now. */
  readonly ops: readonly EditOp[];
  readonly overtaken: readonly OvertakenPlace[];
  /** What is tried at elements that are no longer there: their ids. */
  readonly gone: readonly string[];
  /** Steps that the network refuses, with the reasons. */
  readonly refused: readonly { readonly stepId: string; readonly reasons: readonly string[] }[];
}

/** Lays a trial over the network as it stands now. A step that no longer fits is left out and named. */
export function layOver(base: NetworkDocument, { steps, seen }: Trial): LaidOver {
  let document = base;
  const gone = new Set<string>();
  const refused: { stepId: string; reasons: string[] }[] = [];
  const places = new Map<string, TriedValue>();
  for (const { id: stepId, values } of steps) {
    const there = values.filter(({ in: collection, id }) => base[collection].has(id));
    for (const value of values) if (!there.includes(value)) gone.add(value.id);
    const ops = there.map((value) => setOp(document, value.in, value.id, value.key, value.to));
    const applied = applyBatch(document, ops);
    if (applied.ok) {
      document = applied.document;
      for (const value of there) places.set(placeOf(value), value);
    } else refused.push({ stepId, reasons: applied.errors.map(({ detail }) => detail) });
  }
  const touched = [...places.values()];
  return {
    document,
    ops: touched.flatMap((value) => changeAt(base, document, value)),
    overtaken: touched.flatMap((value) => overtakenAt(base, document, seen, value)),
    gone: [...gone],
    refused,
  };
}

/** The trial with one step more, made on the network as it is now. */
export function withStep(base: NetworkDocument, trial: Trial, step: TriedStep): Trial {
  const known = new Set(trial.seen.map(({ place }) => place));
  const added = new Map(
    step.values.filter((value) => !known.has(placeOf(value))).map((value) => [placeOf(value), value]),
  );
  return {
    steps: [...trial.steps, step],
    seen: [...trial.seen, ...[...added].map(([place, value]) => ({ place, value: valueAt(base, value) }))],
  };
}

export function withoutStep({ steps, seen }: Trial, stepId: string): Trial {
  const left = steps.filter(({ id }) => id !== stepId);
  const places = new Set(left.flatMap(({ values }) => values.map(placeOf)));
  return { steps: left, seen: seen.filter(({ place }) => places.has(place)) };
}

/** What others changed meanwhile stays theirs: the steps that touch those places are taken out, whole, since their values belong together. */
export function withoutStepsAt(trial: Trial, places: ReadonlySet<string>): Trial {
  const touching = trial.steps.filter(({ values }) => values.some((value) => places.has(placeOf(value))));
  return touching.reduce((left, { id }) => withoutStep(left, id), trial);
}

/** All that is tried in one line, shortened to what the label of an edit may hold. */
export function labelOf({ steps }: Trial): string {
  const words = `tried: ${steps.map((step) => step.words).join('; ')}`;
  return words.length <= LABEL_LENGTH ? words : `${words.slice(0, LABEL_LENGTH - 1)}…`;
}

const LABEL_LENGTH = 120;

function changeAt(base: NetworkDocument, tried: NetworkDocument, value: TriedValue): EditOp[] {
  const to = valueAt(tried, value);
  return jsonEqual(valueAt(base, value), to) ? [] : [setOp(base, value.in, value.id, value.key, to)];
}

function overtakenAt(
  base: NetworkDocument,
  tried: NetworkDocument,
  seen: Trial['seen'],
  value: TriedValue,
): OvertakenPlace[] {
  const place = placeOf(value);
  const then = seen.find((one) => one.place === place);
  const now = valueAt(base, value);
  if (then === undefined || jsonEqual(then.value, now) || jsonEqual(now, valueAt(tried, value))) return [];
  const element = base[value.in].get(value.id)?.value;
  return [{ place, name: element === undefined ? value.id : nameOf(element), key: value.key }];
}

function valueAt(document: NetworkDocument, { in: collection, id, key }: TriedValue): unknown {
  const element = document[collection].get(id)?.value;
  return element === undefined ? undefined : new Map<string, unknown>(Object.entries(element)).get(key);
}

function placeOf({ in: collection, id, key }: TriedValue): string {
  return `${collection}/${id}/${key}`;
}
