import { type Gauge, inOrder, type NetworkDocument, setOp } from '@riseback/network';
import type { Column, ListContext, Proposal } from './column';
import { keySet, quantityColumn, textColumn } from './column-kinds';
import { findNode, nodeName } from './pipe-columns';

export const GAUGE_COLUMNS: readonly Column<Gauge>[] = [
  {
    ...textColumn<Gauge>('gauges', 'tag', { title: 'Tag', group: 'element', widthPx: 96, maxLength: 64 }),
    show: ({ tag, id }) => tag ?? id,
    derived: ({ tag }) => tag === undefined,
  },
  placeColumn(),
  distanceColumn(),
  quantityColumn<Gauge>('gauges', 'elevationM', 'length', { title: 'Elevation', widthPx: 92 }),
  yesNoColumn('waterLeg', 'Water leg', 84),
  quantityColumn<Gauge>('gauges', 'rangeLowPa', 'gaugePressure', { title: 'Range from', widthPx: 108, optional: true }),
  quantityColumn<Gauge>('gauges', 'rangeHighPa', 'gaugePressure', { title: 'Range to', widthPx: 96, optional: true }),
  quantityColumn<Gauge>('gauges', 'accuracy', 'fraction', { title: 'Accuracy', widthPx: 84, optional: true }),
  quantityColumn<Gauge>('gauges', 'resolutionPa', 'pressureDifference', {
    title: 'Resolution',
    widthPx: 96,
    optional: true,
  }),
  dateColumn('calibratedOn', 'Calibrated on'),
  dateColumn('calibrationDueOn', 'Calibration due'),
  yesNoColumn('retired', 'Retired', 84),
];

/** Where a gauge may be put: everything that has a name people use. */
export function gaugePlaces(document: NetworkDocument): string[] {
  return [
    ...inOrder(document.nodes).map(([id]) => nodeName(id, document)),
    ...inOrder(document.pipes).map(([id, { value }]) => value.tag ?? id),
  ];
}

/** The node or pipe that a text names, by tag before id, nodes before pipes. */
export function findPlace(
  text: string,
  document: NetworkDocument,
): { readonly node: string } | { readonly pipe: string } | undefined {
  const wanted = text.trim().toLowerCase();
  const node = findNode(text, document);
  if (node !== undefined && document.nodes.get(node)?.value.tag?.toLowerCase() === wanted) return { node };
  const pipe =
    inOrder(document.pipes).find(([, { value }]) => value.tag?.toLowerCase() === wanted)?.[0] ??
    [...document.pipes.keys()].find((id) => id.toLowerCase() === wanted);
  if (node !== undefined) return { node };
  return pipe === undefined ? undefined : { pipe };
}

function placeColumn(): Column<Gauge> {
  const nameOfPlace = ({ node, pipe }: Gauge, { document }: ListContext): string => {
    if (node !== undefined) return nodeName(node, document);
    return pipe === undefined ? '' : (document.pipes.get(pipe)?.value.tag ?? pipe);
  };
  return {
    key: 'place',
    title: 'On',
    group: 'element',
    widthPx: 110,
    value: nameOfPlace,
    editor: {
      by: 'text',
      optional: false,
      maxLength: 64,
      initial: nameOfPlace,
      suggestions: ({ document }) => gaugePlaces(document),
      propose: (text, gauge, { document }) => placeSet(text ?? '', gauge, document),
    },
  };
}

/** A gauge stands at a node or some way along a pipe, so the three keys change in one batch. */
function placeSet(text: string, { id, distanceM, pipe }: Gauge, document: NetworkDocument): Proposal {
  const place = findPlace(text, document);
  if (place === undefined)
    return { ok: false, reason: `Nothing in this network is called ${text}. Type the tag of an element or a pipe.` };
  const onPipe = 'pipe' in place ? place.pipe : undefined;
  return {
    ok: true,
    ops: [
      setOp(document, 'gauges', id, 'node', 'node' in place ? place.node : undefined),
      setOp(document, 'gauges', id, 'pipe', onPipe),
      // at the start of another pipe until its place is typed
      setOp(document, 'gauges', id, 'distanceM', onPipe === undefined ? undefined : onPipe === pipe ? distanceM : 0),
    ],
  };
}

function distanceColumn(): Column<Gauge> {
  return {
    key: 'distanceM',
    title: 'From its start',
    group: 'element',
    widthPx: 112,
    quantity: 'length',
    value: ({ distanceM }) => distanceM,
    editor: {
      by: 'quantity',
      quantity: 'length',
      optional: false,
      si: ({ distanceM }) => distanceM,
      propose: (distanceM, { id, pipe }, { document }) =>
        pipe === undefined
          ? { ok: false, reason: 'This gauge stands at an element. Put it on a pipe first, under On.' }
          : keySet(document, 'gauges', id, 'distanceM', distanceM),
    },
  };
}

function yesNoColumn(key: 'waterLeg' | 'retired', title: string, widthPx: number): Column<Gauge> {
  return {
    key,
    title,
    group: 'inputs',
    widthPx,
    value: (gauge) => (gauge[key] ? 'Yes' : 'No'),
    editor: {
      by: 'choice',
      choices: () => [
        { value: 'yes', word: 'Yes' },
        { value: 'no', word: 'No' },
      ],
      chosen: (gauge) => (gauge[key] ? 'yes' : 'no'),
      propose: (value, { id }, { document }) => keySet(document, 'gauges', id, key, value === 'yes'),
    },
  };
}

const CALENDAR_DATE = /^(\d{4})-(\d{1,2})-(\d{1,2})$/;

function dateColumn(key: 'calibratedOn' | 'calibrationDueOn', title: string): Column<Gauge> {
  return {
    key,
    title,
    group: 'inputs',
    widthPx: 116,
    value: (gauge) => gauge[key],
    editor: {
      by: 'text',
      optional: true,
      maxLength: 10,
      propose: (text, { id }, { document }) => {
        const date = text === undefined ? undefined : calendarDate(text);
        return date === null
          ? { ok: false, reason: `${text ?? ''} is not a date. Write year, month and day, as in 2026-03-01.` }
          : keySet(document, 'gauges', id, key, date);
      },
    },
  };
}

/** The date as stored; null when the text is none. Days and months in another order would be guessed at, so they are refused. */
function calendarDate(text: string): string | null {
  const [, year = '', month = '', day = ''] = CALENDAR_DATE.exec(text.trim()) ?? [];
  const date = `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;
  const at = new Date(`${date}T00:00:00Z`);
  // the 31st of a shorter month would run on into the next
  return Number.isNaN(at.getTime()) || at.toISOString().slice(0, 10) !== date ? null : date;
}
