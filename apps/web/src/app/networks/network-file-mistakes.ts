import { type FileMistake, MAXIMUM_MISTAKES } from '@riseback/network';

/** A mistake in a network file, where a person would look for it. */
export interface PlacedMistake {
  /** "Trap 4 (TR-104), loadKgS"; '' for the whole file. */
  readonly place: string;
  readonly detail: string;
}

const ELEMENT_WORDS: Readonly<Record<string, string>> = {
  nodes: 'Node',
  pipes: 'Pipe',
  trapModels: 'Trap model',
  cases: 'Case',
  gauges: 'Gauge',
};
const NODE_WORDS: Readonly<Record<string, string>> = {
  trap: 'Trap',
  junction: 'Junction',
  flashVessel: 'Flash vessel',
  pumpedInlet: 'Pumped inlet',
  receiver: 'Receiver',
};

/** Pointers into a file in words: which element by its place, tag or name, and which key of it. */
export function placedMistakes(errors: readonly FileMistake[], file: unknown): PlacedMistake[] {
  return errors.slice(0, MAXIMUM_MISTAKES).map(({ pointer, detail }) => ({ place: placeOf(pointer, file), detail }));
}

function placeOf(pointer: string, file: unknown): string {
  const [collection = '', index = '', ...keys] = pointer
    .split('/')
    .slice(1)
    .map((key) => key.replaceAll('~1', '/').replaceAll('~0', '~'));
  const word = ELEMENT_WORDS[collection];
  if (word === undefined || !/^\d+$/.test(index)) return [collection, index, ...keys].filter(Boolean).join(', ');
  const element = at(at(file, collection), index);
  const kind = NODE_WORDS[String(at(element, 'kind'))] ?? word;
  const name = ['tag', 'name', 'id'].map((key) => at(element, key)).find((value) => typeof value === 'string');
  // people count from one
  const numbered = `${kind} ${String(Number(index) + 1)}`;
  return [typeof name === 'string' ? `${numbered} (${name})` : numbered, ...keys].join(', ');
}

function at(value: unknown, key: string): unknown {
  return typeof value === 'object' && value !== null
    ? new Map<string, unknown>(Object.entries(value)).get(key)
    : undefined;
}
