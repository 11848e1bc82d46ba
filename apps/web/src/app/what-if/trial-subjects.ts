import { pipeBore } from '@riseback/hydraulics';
import {
  inOrder,
  type NetworkDocument,
  type NetworkNode,
  overrideId,
  type OverrideKey,
  type PipeRun,
} from '@riseback/network';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { boreWords } from '@riseback/figures';
import { KIND_WORDS, nameOf } from '../shared/element-words';

export const SUBJECTS = ['size', 'pressure', 'elevation', 'load'] as const;
/** What can be tried. */
export type Subject = (typeof SUBJECTS)[number];
export const WAYS = ['up', 'down', 'set', 'add', 'multiply'] as const;
/** How it is changed: by sizes, to a value, by a difference, by a factor. */
export type Way = (typeof WAYS)[number];

export interface WayFacts {
  readonly way: Way;
  readonly words: string;
  /** What has to be given; a nominal size is chosen, the rest is typed. */
  readonly asks: { readonly label: string; readonly kind: QuantityKind } | 'size' | null;
}

interface SubjectFacts {
  readonly words: string;
  readonly one: string;
  readonly many: string;
  readonly ways: readonly WayFacts[];
}

export const SUBJECT_FACTS: Readonly<Record<Subject, SubjectFacts>> = {
  size: {
    words: 'Pipe sizes',
    one: 'pipe',
    many: 'pipes',
    ways: [
      { way: 'up', words: 'Next size up', asks: null },
      { way: 'down', words: 'Next size down', asks: null },
      { way: 'set', words: 'One size', asks: 'size' },
    ],
  },
  pressure: {
    words: 'Receiver and vessel pressures',
    one: 'receiver or vessel',
    many: 'receivers and vessels',
    ways: [
      { way: 'set', words: 'Hold at', asks: { label: 'Pressure', kind: 'pressure' } },
      { way: 'add', words: 'Raise by', asks: { label: 'Difference', kind: 'pressureDifference' } },
    ],
  },
  elevation: {
    words: 'Elevations',
    one: 'element',
    many: 'elements',
    ways: [
      { way: 'add', words: 'Raise by', asks: { label: 'Difference', kind: 'length' } },
      { way: 'set', words: 'Set at', asks: { label: 'Elevation', kind: 'length' } },
    ],
  },
  load: {
    words: 'Loads',
    one: 'trap or pumped inlet',
    many: 'traps and pumped inlets',
    ways: [
      { way: 'multiply', words: 'Multiply by', asks: { label: 'Factor', kind: 'factor' } },
      { way: 'set', words: 'Set to', asks: { label: 'Load', kind: 'massFlow' } },
    ],
  },
};

/** An element at which a subject can be tried, with what it is now. */
export interface Candidate {
  readonly id: string;
  readonly name: string;
  readonly where: string;
  readonly value: string;
  /** The chosen case has a value of its own here, so that what is tried does not act in it. */
  readonly ownInCase: boolean;
}

/** The elements that a subject has, in the file's order, as they stand with what is tried already. */
export function candidatesOf(
  document: NetworkDocument,
  subject: Subject,
  units: DisplayUnits,
  caseId: string,
): readonly Candidate[] {
  if (subject === 'size') return inOrder(document.pipes).map(([, { value }]) => pipeCandidate(document, value, units));
  return inOrder(document.nodes).flatMap(([, { value: node }]): Candidate[] => {
    const si = nodeValue(node, subject, units);
    if (si === undefined) return [];
    const ownKey = OWN_KEYS[subject](node);
    const own = ownKey === undefined ? undefined : document.overrides.get(overrideId(caseId, node.id))?.value;
    return [
      {
        id: node.id,
        name: nameOf(node),
        where: [KIND_WORDS[node.kind], node.area ?? ''].filter((word) => word !== '').join(', '),
        value: formatQuantity(si, KINDS_OF_VALUE[subject], units, { withUnit: true }),
        ownInCase: ownKey !== undefined && own?.[ownKey] !== undefined,
      },
    ];
  });
}

/** What a node has of a subject, SI; undefined where it has none. */
export function nodeValue(
  node: NetworkNode,
  subject: Exclude<Subject, 'size'>,
  { atmosphericPressurePa }: Pick<DisplayUnits, 'atmosphericPressurePa'>,
): number | undefined {
  switch (subject) {
    case 'elevation':
      return node.elevationM;
    case 'load':
      if (node.kind === 'trap') return node.loadKgS;
      return node.kind === 'pumpedInlet' ? node.flowKgS : undefined;
    case 'pressure':
      if (node.kind === 'flashVessel') return node.pressurePa;
      return node.kind === 'receiver' ? (node.pressurePa ?? atmosphericPressurePa) : undefined;
  }
}

const KINDS_OF_VALUE = { pressure: 'pressure', elevation: 'length', load: 'massFlow' } as const;

const OWN_KEYS: Readonly<Record<Exclude<Subject, 'size'>, (node: NetworkNode) => OverrideKey | undefined>> = {
  pressure: () => 'pressurePa',
  elevation: () => undefined,
  load: ({ kind }) => (kind === 'trap' ? 'loadKgS' : 'flowKgS'),
};

function pipeCandidate(document: NetworkDocument, pipe: PipeRun, units: DisplayUnits): Candidate {
  const name = (id: string): string => {
    const node = document.nodes.get(id)?.value;
    return node === undefined ? id : nameOf(node);
  };
  return {
    id: pipe.id,
    name: nameOf(pipe),
    where: `${name(pipe.from)} to ${name(pipe.to)}`,
    value: sizeWords(pipe, units),
    ownInCase: false,
  };
}

/** The nominal size and schedule, else the bore. */
export function sizeWords(pipe: PipeRun, units: DisplayUnits): string {
  const { size } = pipe;
  if (size === undefined || pipeBore(size) === undefined) return boreWords(pipe, units);
  return `${boreWords(pipe, units)} sch ${size.schedule}`;
}
