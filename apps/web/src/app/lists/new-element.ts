import type { TaggedKind, TagPatterns } from '@riseback/contracts';
import { pipeBore, pipeSizes } from '@riseback/hydraulics';
import {
  type AddOp,
  inOrder,
  type NetworkDocument,
  newElementId,
  nextOrdinal,
  type PipeRun,
  type Position,
} from '@riseback/network';
import { nextTag } from '../shared/next-tag';
import { GRID, nearestFreePoint } from '@riseback/figures';
import { findPlace, gaugePlaces } from './columns/gauge-columns';
import { findNode, nodeName } from './columns/pipe-columns';
import { type Field, type FieldValues, numberOf, optionalText, textOf } from './dialogs/field';
import type { NewKind } from './list-definitions';

/** How a new element of one kind is asked for and made. */
export interface NewElementForm {
  readonly title: string;
  readonly note?: string;
  readonly fields: readonly Field[];
  readonly values: FieldValues;
  readonly judge: (values: FieldValues) => string;
  readonly make: (values: FieldValues) => { readonly label: string; readonly op: AddOp; readonly id: string };
}

type NodeKind = Exclude<NewKind, 'pipe' | 'trapModel' | 'gauge'>;

const NODE_PARTS: Readonly<Record<NodeKind, { prefix: string; word: string; fields: readonly Field[] }>> = {
  trap: {
    prefix: 'T',
    word: 'trap',
    fields: [
      { key: 'inletPressurePa', title: 'Inlet pressure', by: 'quantity', quantity: 'pressure' },
      { key: 'loadKgS', title: 'Load', by: 'quantity', quantity: 'massFlow' },
    ],
  },
  junction: { prefix: 'J', word: 'junction', fields: [] },
  receiver: {
    prefix: 'R',
    word: 'receiver',
    fields: [
      { key: 'pressurePa', title: 'Pressure (empty: vented)', by: 'quantity', quantity: 'pressure', optional: true },
    ],
  },
  flashVessel: {
    prefix: 'V',
    word: 'flash vessel',
    fields: [{ key: 'pressurePa', title: 'Pressure', by: 'quantity', quantity: 'pressure' }],
  },
  pumpedInlet: {
    prefix: 'P',
    word: 'pumped inlet',
    fields: [
      { key: 'flowKgS', title: 'Flow', by: 'quantity', quantity: 'massFlow' },
      { key: 'temperatureK', title: 'Temperature', by: 'quantity', quantity: 'temperature' },
    ],
  },
};

/** @param patterns after which the site tags its elements */
export function newElementForm(kind: NewKind, document: NetworkDocument, patterns: TagPatterns = {}): NewElementForm {
  if (kind === 'pipe') return newPipeForm(document, patterns);
  if (kind === 'gauge') return newGaugeForm(document, patterns);
  return kind === 'trapModel' ? newTrapModelForm(document) : newNodeForm(kind, document, patterns);
}

function newNodeForm(kind: NodeKind, document: NetworkDocument, patterns: TagPatterns): NewElementForm {
  const { prefix, word, fields } = NODE_PARTS[kind];
  return {
    title: `Add a ${word}`,
    note: 'It is placed beside the last one on the drawing; connect it there or under Pipes.',
    fields: [
      { key: 'tag', title: 'Tag', by: 'text', maxLength: 64, optional: true },
      { key: 'elevationM', title: 'Elevation', by: 'quantity', quantity: 'length' },
      ...fields,
    ],
    values: { tag: offeredTag(kind, document, patterns) },
    judge: () => '',
    make: (values) => {
      const id = newElementId(document, prefix);
      const numbers = Object.fromEntries(
        fields.flatMap(({ key }) => (values[key] === undefined ? [] : [[key, numberOf(values, key)]])),
      );
      const vented = kind === 'receiver' && values['pressurePa'] === undefined ? { vented: true } : {};
      return {
        id,
        label: `add ${word} ${nameFrom(values, id)}`,
        op: {
          op: 'add',
          in: 'nodes',
          ordinal: nextOrdinal(document, 'nodes'),
          value: {
            id,
            kind,
            ...optionalText(values, 'tag'),
            elevationM: numberOf(values, 'elevationM'),
            position: freePosition(kind, document),
            ...numbers,
            ...vented,
          },
        },
      };
    },
  };
}

function newPipeForm(document: NetworkDocument, patterns: TagPatterns): NewElementForm {
  const names = inOrder(document.nodes).map(([id]) => nodeName(id, document));
  const last = inOrder(document.pipes)
    .map(([, { value }]) => value)
    .findLast(({ size }) => size !== undefined);
  const schedules = pipeSizes();
  const sizes = new Map(schedules.flatMap(({ sizes: made }) => made.map(({ nps, dn }) => [nps, dn] as const)));
  const inSizeOrder = [...sizes].sort(([, a], [, b]) => a - b);
  return {
    title: 'Add a pipe',
    note: 'The flow is counted from the first to the second. Size and schedule are those of the last pipe until you change them.',
    fields: [
      { key: 'tag', title: 'Tag', by: 'text', maxLength: 64, optional: true },
      { key: 'from', title: 'From', by: 'text', maxLength: 64, suggestions: names },
      { key: 'to', title: 'To', by: 'text', maxLength: 64, suggestions: names },
      { key: 'lengthM', title: 'Length', by: 'quantity', quantity: 'length' },
      {
        key: 'nps',
        title: 'Size',
        by: 'choice',
        choices: inSizeOrder.map(([nps, dn]) => ({ value: nps, word: `${nps} in (DN ${String(dn)})` })),
      },
      {
        key: 'schedule',
        title: 'Schedule',
        by: 'choice',
        choices: schedules.map(({ schedule, standard }) => ({ value: schedule, word: `${schedule} (${standard})` })),
      },
    ],
    values: {
      tag: offeredTag('pipe', document, patterns),
      nps: last?.size?.nps ?? '1',
      schedule: last?.size?.schedule ?? '80',
    },
    judge: (values) => {
      for (const key of ['from', 'to']) {
        if (findNode(textOf(values, key), document) === undefined)
          return `Nothing in this network is called ${textOf(values, key)}.`;
      }
      const size = { nps: textOf(values, 'nps'), schedule: textOf(values, 'schedule') };
      return pipeBore(size) === undefined ? `${size.nps} in is not made in schedule ${size.schedule}.` : '';
    },
    make: (values) => {
      const id = newElementId(document, 'L');
      const value = {
        id,
        ...optionalText(values, 'tag'),
        from: findNode(textOf(values, 'from'), document) ?? '',
        to: findNode(textOf(values, 'to'), document) ?? '',
        lengthM: numberOf(values, 'lengthM'),
        size: { nps: textOf(values, 'nps'), schedule: textOf(values, 'schedule') },
      } satisfies Partial<PipeRun>;
      return {
        id,
        label: `add pipe ${nameFrom(values, id)}`,
        op: { op: 'add', in: 'pipes', ordinal: nextOrdinal(document, 'pipes'), value },
      };
    },
  };
}

function newTrapModelForm(document: NetworkDocument): NewElementForm {
  return {
    title: 'Add a trap model',
    note: 'Its ratings and capacity are typed in the list afterwards, from the maker’s sheet.',
    fields: [
      { key: 'name', title: 'Name', by: 'text', maxLength: 120 },
      { key: 'orificeDiameterM', title: 'Orifice', by: 'quantity', quantity: 'diameter', optional: true },
    ],
    values: {},
    judge: () => '',
    make: (values) => {
      const id = newElementId(document, 'M');
      const orifice = values['orificeDiameterM'];
      return {
        id,
        label: `add trap model ${textOf(values, 'name').trim()}`,
        op: {
          op: 'add',
          in: 'trapModels',
          ordinal: nextOrdinal(document, 'trapModels'),
          value: {
            id,
            name: textOf(values, 'name').trim(),
            ...(typeof orifice === 'number' ? { orificeDiameterM: orifice } : {}),
          },
        },
      };
    },
  };
}

function newGaugeForm(document: NetworkDocument, patterns: TagPatterns): NewElementForm {
  const onPipe = (values: FieldValues): boolean => 'pipe' in (placeFrom(values, document) ?? {});
  return {
    title: 'Add a gauge',
    note: 'Its own height counts: with a water leg the column of water between tap and gauge is part of what it reads.',
    fields: [
      { key: 'tag', title: 'Tag', by: 'text', maxLength: 64, optional: true },
      { key: 'place', title: 'On', by: 'text', maxLength: 64, suggestions: gaugePlaces(document) },
      { key: 'distanceM', title: 'From the pipe’s start', by: 'quantity', quantity: 'length', when: onPipe },
      { key: 'elevationM', title: 'Elevation of the gauge', by: 'quantity', quantity: 'length' },
      { key: 'rangeLowPa', title: 'Range from', by: 'quantity', quantity: 'gaugePressure', optional: true },
      { key: 'rangeHighPa', title: 'Range to', by: 'quantity', quantity: 'gaugePressure', optional: true },
      { key: 'accuracy', title: 'Accuracy, of span', by: 'quantity', quantity: 'fraction', optional: true },
    ],
    values: { tag: nextGaugeTag(document, patterns) },
    judge: (values) =>
      placeFrom(values, document) === undefined
        ? `Nothing in this network is called ${textOf(values, 'place')}.`
        : rangeEndsAboveStart(values),
    make: (values) => {
      const id = newElementId(document, 'G');
      const place = placeFrom(values, document) ?? {};
      const numbers = ['rangeLowPa', 'rangeHighPa', 'accuracy'].filter((key) => typeof values[key] === 'number');
      return {
        id,
        label: `add gauge ${nameFrom(values, id)}`,
        op: {
          op: 'add',
          in: 'gauges',
          ordinal: nextOrdinal(document, 'gauges'),
          value: {
            id,
            ...optionalText(values, 'tag'),
            ...place,
            ...('pipe' in place ? { distanceM: numberOf(values, 'distanceM') } : {}),
            elevationM: numberOf(values, 'elevationM'),
            ...Object.fromEntries(numbers.map((key) => [key, numberOf(values, key)])),
          },
        },
      };
    },
  };
}

function placeFrom(values: FieldValues, document: NetworkDocument): ReturnType<typeof findPlace> {
  const place = values['place'];
  return typeof place === 'string' ? findPlace(place, document) : undefined;
}

function rangeEndsAboveStart({ rangeLowPa, rangeHighPa }: FieldValues): string {
  return typeof rangeLowPa === 'number' && typeof rangeHighPa === 'number' && rangeHighPa <= rangeLowPa
    ? 'A gauge’s range ends above its start.'
    : '';
}

function nextGaugeTag(document: NetworkDocument, patterns: TagPatterns): string {
  const tags = inOrder(document.gauges).flatMap(([, { value }]) => value.tag ?? []);
  return nextTag('gauge', tags, new Set(tags), patterns.gauge);
}

function nameFrom(values: FieldValues, id: string): string {
  return optionalText(values, 'tag')['tag'] ?? id;
}

function offeredTag(kind: Exclude<TaggedKind, 'gauge'>, document: NetworkDocument, patterns: TagPatterns): string {
  const all = [...inOrder(document.nodes), ...inOrder(document.pipes)].map(([, { value }]) => value);
  const ofKind = all.filter((element) => ('kind' in element ? element.kind === kind : kind === 'pipe'));
  const tagsOf = (elements: typeof all): string[] => elements.flatMap(({ tag }) => (tag === undefined ? [] : [tag]));
  return nextTag(kind, tagsOf(ofKind), new Set(tagsOf(all)), patterns[kind]);
}

/** A free grid point under the last element of the kind, else under the last of all. */
function freePosition(kind: NodeKind, document: NetworkDocument): Position {
  const nodes = inOrder(document.nodes).map(([, { value }]) => value);
  const placed = nodes.flatMap(({ position }) => position ?? []);
  const last = nodes.findLast((node) => node.kind === kind)?.position ?? placed.at(-1) ?? { x: 0, y: 0 };
  const lines = inOrder(document.pipes).flatMap(([, { value }]) => {
    const ends = [value.from, value.to].map((id) => document.nodes.get(id)?.value.position);
    const [from, to] = ends;
    return from === undefined || to === undefined ? [] : [[from, ...(value.bends ?? []), to]];
  });
  const near = placed.length === 0 ? last : { x: last.x, y: last.y + 4 * GRID };
  return nearestFreePoint(near, { nodes: placed, lines });
}
