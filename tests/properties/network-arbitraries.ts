import {
  makeSetOp,
  newElementId,
  nextOrdinal,
  readNetworkFile,
  removalOps,
  setNetworkOp,
  setOp,
  type EditOp,
  type NetworkDocument,
  type NetworkFile,
} from '@riseback/network';
import * as fc from 'fast-check';
import { readFileSync } from 'node:fs';

/** One seed for all, so that a failure can be had again; fast-check prints it with the smallest failing case. */
export const SEED = 20_260_301;

/** The demo plant's file as parsed JSON, a fresh copy each time. */
export function ternQuayJson(): unknown {
  return JSON.parse(readFileSync(new URL('../fixtures/tern-quay.json', import.meta.url), 'utf8'));
}

export function ternQuay(): NetworkFile {
  const read = readNetworkFile(ternQuayJson());
  if (!read.ok) throw new Error(`The demo file is refused: ${JSON.stringify(read.errors)}`);
  return read.file;
}

/** What a person does in one move, by numbers that fast-check can shrink. */
export const move = fc.record({
  action: fc.nat(),
  which: fc.nat(),
  other: fc.nat(),
  number: fc.integer({ min: 1, max: 400 }),
});
export type Move = typeof move extends fc.Arbitrary<infer T> ? T : never;

type Maker = (document: NetworkDocument, move: Move) => EditOp[];

function pick<T>(list: readonly T[], n: number): T | undefined {
  return list.length === 0 ? undefined : list[n % list.length];
}

const addNode: Maker = (document, { which, number }) => {
  const elevationM = number / 10;
  const kinds = [
    {
      kind: 'trap',
      inletPressurePa: 5e5,
      loadKgS: number / 1000,
      ...(which % 2 === 0 ? { trapType: 'invertedBucket' } : {}),
    },
    { kind: 'junction', tag: ' J ' },
    { kind: 'flashVessel', pressurePa: 2e5 },
    { kind: 'pumpedInlet', flowKgS: 1, temperatureK: 350 },
    { kind: 'receiver', vented: true },
  ];
  const value = { id: newElementId(document, 'N'), elevationM, ...pick(kinds, which) };
  return [{ op: 'add', in: 'nodes', ordinal: nextOrdinal(document, 'nodes'), value }];
};

const addPipe: Maker = (document, { which, other, number }) => {
  const nodes = [...document.nodes.keys()];
  const value = {
    id: newElementId(document, 'L'),
    from: pick(nodes, which),
    to: pick(nodes, other),
    lengthM: number,
    insideDiameterM: 0.05,
  };
  // several elements may share an ordinal: the id decides between them
  return nodes.length === 0 ? [] : [{ op: 'add', in: 'pipes', ordinal: number % 3, value }];
};

const removeNode: Maker = (document, { which }) => {
  const id = pick([...document.nodes.keys()], which);
  return id === undefined ? [] : removalOps(document, { nodes: [id] });
};

const removePipe: Maker = (document, { which }) => {
  const id = pick([...document.pipes.keys()], which);
  return id === undefined ? [] : removalOps(document, { pipes: [id] });
};

const removeModelOrCase: Maker = (document, { which, other }) => {
  const model = pick([...document.trapModels.keys()], which);
  const operatingCase = pick([...document.cases.keys()], other);
  return removalOps(document, {
    trapModels: model === undefined ? [] : [model],
    cases: operatingCase === undefined ? [] : [operatingCase],
  });
};

const setNodeKey: Maker = (document, { which, other, number }) => {
  const id = pick([...document.nodes.keys()], which);
  const [key, to] = pick(
    [
      ['elevationM', number],
      ['tag', `  TR-${number} `],
      ['tag', undefined],
      ['position', { x: number, y: -number }],
      ['note', 'nøted'],
    ] as const,
    other,
  ) ?? ['tag', undefined];
  return id === undefined ? [] : [setOp(document, 'nodes', id, key, to)];
};

const setPipeKey: Maker = (document, { which, other, number }) => {
  const id = pick([...document.pipes.keys()], which);
  const [key, to] = pick(
    [
      ['lengthM', number],
      ['fittings', [{ kind: 'elbow90', count: number }]],
      ['fittings', undefined],
      ['lossCoefficient', undefined],
      ['route', [{ lengthM: number, riseM: 1 }]],
      ['route', undefined],
    ] as const,
    other,
  ) ?? ['route', undefined];
  return id === undefined ? [] : [setOp(document, 'pipes', id, key, to)];
};

/** A vented receiver gets a pressure, or the other way round: neither operation would do by itself. */
const turnReceiver: Maker = (document, { which, number }) => {
  const receiver = pick(
    [...document.nodes.values()].flatMap(({ value }) => (value.kind === 'receiver' ? [value] : [])),
    which,
  );
  if (receiver === undefined) return [];
  const vented = receiver.vented === true;
  return [
    makeSetOp('nodes', receiver.id, 'vented', receiver.vented, vented ? undefined : true),
    makeSetOp('nodes', receiver.id, 'pressurePa', receiver.pressurePa, vented ? 1e5 + number : undefined),
  ];
};

const addCaseWithOverride: Maker = (document, { which, number }) => {
  const id = newElementId(document, 'case');
  const trap = pick(
    [...document.nodes.values()].flatMap(({ value }) => (value.kind === 'trap' ? [value.id] : [])),
    which,
  );
  const ops: EditOp[] = [{ op: 'add', in: 'cases', ordinal: number, value: { id, name: `Case ${number}` } }];
  if (trap !== undefined) {
    const value = { node: trap, loadKgS: number / 1000 };
    ops.unshift({ op: 'add', in: 'overrides', id: `${id}/${trap}`, ordinal: number, value });
  }
  return ops;
};

const addGauge: Maker = (document, { which, number }) => {
  const pipe = pick([...document.pipes.keys()], which);
  const value = { id: newElementId(document, 'G'), pipe, distanceM: number, elevationM: 0 };
  return pipe === undefined ? [] : [{ op: 'add', in: 'gauges', ordinal: number, value }];
};

/** Puts a junction in a node's place: an element of another kind under the same id. */
const replaceNode: Maker = (document, { which, number }) => {
  const id = pick([...document.nodes.keys()], which);
  if (id === undefined) return [];
  const overrides = [...document.overrides].filter(([, { value }]) => value.node === id);
  return [
    ...overrides.map(([override]) => ({ op: 'remove', in: 'overrides', id: override }) as const),
    { op: 'remove', in: 'nodes', id },
    { op: 'add', in: 'nodes', ordinal: number, value: { id, kind: 'junction', elevationM: number } },
  ];
};

const setNetwork: Maker = (document, { which, number }) =>
  which % 2 === 0
    ? [setNetworkOp(document, 'name', `Plant ${number}`)]
    : [setNetworkOp(document, 'limits', { velocity: { watchMS: number } })];

const MAKERS = [
  addNode,
  addPipe,
  removeNode,
  removePipe,
  removeModelOrCase,
  setNodeKey,
  setPipeKey,
  turnReceiver,
  addCaseWithOverride,
  addGauge,
  replaceNode,
  setNetwork,
];

/** The operations of one move on a document as it is. */
export function opsOf(document: NetworkDocument, made: Move): EditOp[] {
  return pick(MAKERS, made.action)?.(document, made) ?? [];
}
