import { FLOW_PATTERN_WORDS } from '@riseback/contracts';
import { FITTINGS, NOMINAL_SIZES, pipeBore, pipeSizes } from '@riseback/hydraulics';
import { inOrder, type NetworkDocument, type PipeRun, setOp } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import type { Choice, Column, ListContext, Proposal } from './column';
import { quantityColumn, resultColumn } from './column-kinds';
import { FITTINGS_IN_WORDS, ROUTE_IN_WORDS } from './sheet-forms';
import { caseColumn, findingColumn, nameColumns, noteColumn } from './shared-columns';

/** For a pipe that is given by its bore and gets a nominal size: the usual one for condensate piping to begin with. */
export const FIRST_SCHEDULE = '80';

export const PIPE_COLUMNS: readonly Column<PipeRun>[] = [
  ...nameColumns<PipeRun>('pipes').map((column) =>
    column.key === 'area' ? { ...column, minor: true as const } : column,
  ),
  endColumn('from', 'From'),
  endColumn('to', 'To'),
  quantityColumn<PipeRun>('pipes', 'lengthM', 'length', { title: 'Length', widthPx: 70 }),
  nominalSizeColumn(),
  scheduleColumn(),
  boreColumn(),
  {
    key: 'fittings',
    title: 'Fittings',
    group: 'inputs',
    widthPx: 100,
    value: ({ fittings }) => fittings.map(({ kind, count }) => `${String(count)} ${FITTINGS[kind].name}`).join('; '),
    editor: { by: 'dialog', dialog: 'fittings' },
    sheet: FITTINGS_IN_WORDS,
  },
  quantityColumn<PipeRun>('pipes', 'lossCoefficient', 'factor', { title: 'Loss K', widthPx: 58, optional: true }),
  {
    key: 'rise',
    title: 'Rise',
    group: 'inputs',
    widthPx: 60,
    quantity: 'length',
    derived: () => true,
    value: (pipe, { document }) => riseM(pipe, document),
  },
  {
    key: 'route',
    title: 'Route',
    group: 'inputs',
    widthPx: 150,
    minor: true,
    value: ({ route }) => route?.length,
    show: (pipe, context) => routeWords(pipe, context),
    editor: { by: 'dialog', dialog: 'route' },
    sheet: ROUTE_IN_WORDS,
  },
  quantityColumn<PipeRun>('pipes', 'roughnessM', 'roughness', {
    title: 'Roughness',
    widthPx: 100,
    optional: true,
    minor: true,
  }),
  quantityColumn<PipeRun>('pipes', 'heatLossWM', 'heatLossPerLength', {
    title: 'Heat loss',
    widthPx: 116,
    optional: true,
    minor: true,
  }),
  checkValveColumn(),
  noteColumn('pipes'),
  resultColumn<PipeRun>(
    'massFlowKgS',
    'massFlow',
    { title: 'Flow', widthPx: 72 },
    ({ id }, { pipes }) => pipes.get(id)?.massFlowKgS,
  ),
  resultColumn<PipeRun>(
    'liquidVelocityMS',
    'velocity',
    { title: 'Liquid', widthPx: 86 },
    ({ id }, { pipes }) => pipes.get(id)?.liquidVelocityMS,
  ),
  resultColumn<PipeRun>(
    'mixtureVelocityMS',
    'velocity',
    { title: 'Mixture', widthPx: 92 },
    ({ id }, { pipes }) => pipes.get(id)?.mixtureVelocityMS,
  ),
  resultColumn<PipeRun>(
    'staticPa',
    'pressureDifference',
    { title: 'Static', widthPx: 66 },
    ({ id }, { pipes }) => pipes.get(id)?.staticPa,
  ),
  resultColumn<PipeRun>(
    'frictionPa',
    'pressureDifference',
    { title: 'Friction', widthPx: 74 },
    ({ id }, { pipes }) => pipes.get(id)?.frictionPa,
  ),
  resultColumn<PipeRun>(
    'flashPa',
    'pressureDifference',
    { title: 'Flash', widthPx: 66 },
    ({ id }, { pipes }) => pipes.get(id)?.flashPa,
  ),
  caseColumn<PipeRun>(),
  findingColumn<PipeRun>({ title: 'Finding', widthPx: 190 }, () => false),
  // after the finding, which must be in sight on a usual screen
  patternColumn(),
  outletColumn(),
];

function patternColumn(): Column<PipeRun> {
  return {
    key: 'flowPattern',
    title: 'Flow pattern',
    group: 'result',
    widthPx: 124,
    value: ({ id }, { pipes }) => {
      const pattern = pipes.get(id)?.flowPattern;
      return pattern === undefined ? undefined : FLOW_PATTERN_WORDS[pattern];
    },
  };
}

/** Where a choked pipe's outlet stands; empty where it is free. */
function outletColumn(): Column<PipeRun> {
  return {
    key: 'outletPressurePa',
    title: 'Choked at',
    group: 'result',
    widthPx: 92,
    quantity: 'pressure',
    value: ({ id }, { pipes }) => pipes.get(id)?.outletPressurePa,
  };
}

function endColumn(key: 'from' | 'to', title: string): Column<PipeRun> {
  return {
    key,
    title,
    group: 'inputs',
    widthPx: 66,
    value: (pipe, { document }) => nodeName(pipe[key], document),
    editor: {
      by: 'text',
      optional: false,
      maxLength: 64,
      initial: (pipe, { document }) => nodeName(pipe[key], document),
      suggestions: ({ document }) => inOrder(document.nodes).map(([id]) => nodeName(id, document)),
      propose: (text, { id }, { document }) => {
        const node = text === undefined ? undefined : findNode(text, document);
        return node === undefined
          ? {
              ok: false,
              reason: `Nothing in this network is called ${text ?? 'so'}. Type the tag of a trap, junction or vessel.`,
            }
          : { ok: true, ops: [setOp(document, 'pipes', id, key, node)] };
      },
    },
  };
}

function nominalSizeColumn(): Column<PipeRun> {
  return {
    key: 'nps',
    title: 'Size',
    unit: 'in',
    group: 'inputs',
    widthPx: 64,
    value: ({ size }) => (size === undefined ? undefined : sizeRank(size.nps)),
    show: ({ size }) => size?.nps ?? '',
    editor: {
      by: 'choice',
      choices: ({ size }) =>
        (pipeSizes().find(({ schedule }) => schedule === (size?.schedule ?? FIRST_SCHEDULE))?.sizes ?? []).map(
          ({ nps, dn }) => ({ value: nps, word: `${nps} in (DN ${String(dn)})` }),
        ),
      chosen: ({ size }) => size?.nps ?? '',
      propose: (nps, pipe, { document }) => sizeSet(pipe, nps, pipe.size?.schedule ?? FIRST_SCHEDULE, document),
    },
    sheet: {
      write: ({ size }) => size?.nps,
      read: (text, pipe, { document }) => {
        const nps = nominalSize(text);
        return nps === undefined
          ? { ok: false, reason: `${text} is not a nominal size. Write it in inches as in 1-1/2, or as DN 40.` }
          : sizeSet(pipe, nps, pipe.size?.schedule ?? FIRST_SCHEDULE, document);
      },
    },
  };
}

function scheduleColumn(): Column<PipeRun> {
  return {
    key: 'schedule',
    title: 'Schedule',
    group: 'inputs',
    widthPx: 72,
    value: ({ size }) => size?.schedule,
    editor: {
      by: 'choice',
      choices: ({ size }): Choice[] =>
        pipeSizes()
          .filter(({ sizes }) => size === undefined || sizes.some(({ nps }) => nps === size.nps))
          .map(({ standard, schedule }) => ({ value: schedule, word: `${schedule} (${standard})` })),
      chosen: ({ size }) => size?.schedule ?? '',
      propose: (schedule, pipe, { document }) =>
        pipe.size === undefined
          ? { ok: false, reason: 'This pipe is given by its bore. Choose a nominal size first.' }
          : sizeSet(pipe, pipe.size.nps, schedule, document),
    },
  };
}

function boreColumn(): Column<PipeRun> {
  const bore = ({ size, insideDiameterM }: PipeRun): number | undefined =>
    insideDiameterM ?? (size === undefined ? undefined : pipeBore(size)?.insideDiameterM);
  return {
    key: 'insideDiameterM',
    title: 'Bore',
    group: 'inputs',
    widthPx: 66,
    quantity: 'diameter',
    value: bore,
    derived: ({ size }) => size !== undefined,
    editor: {
      by: 'quantity',
      quantity: 'diameter',
      optional: false,
      si: bore,
      propose: (insideDiameterM, { id }, { document }) => ({
        ok: true,
        ops: [
          setOp(document, 'pipes', id, 'insideDiameterM', insideDiameterM),
          setOp(document, 'pipes', id, 'size', undefined),
        ],
      }),
    },
  };
}

function checkValveColumn(): Column<PipeRun> {
  return {
    key: 'checkValve',
    title: 'Check valve',
    group: 'inputs',
    widthPx: 92,
    minor: true,
    value: ({ checkValve }) => (checkValve ? 'Yes' : 'No'),
    editor: {
      by: 'choice',
      choices: () => [
        { value: 'yes', word: 'Yes' },
        { value: 'no', word: 'No' },
      ],
      chosen: ({ checkValve }) => (checkValve ? 'yes' : 'no'),
      propose: (value, { id }, { document }) => ({
        ok: true,
        ops: [setOp(document, 'pipes', id, 'checkValve', value === 'yes')],
      }),
    },
  };
}

/** The nominal size that a text names: "1-1/2", "1 1/2 in", "1.5" or "DN 40". */
export function nominalSize(text: string): string | undefined {
  const written = text
    .trim()
    .toLowerCase()
    .replace(/\s*(?:in|inch|inches|")$/, '')
    .replace(/\s+/g, '-');
  const dn = /^dn-?(\d+)$/.exec(written)?.[1];
  const sizes = Object.entries(NOMINAL_SIZES);
  if (dn !== undefined) return sizes.find(([, each]) => each === Number(dn))?.[0];
  const inches = inchesOf(written);
  return sizes.find(([nps]) => nps === written || inchesOf(nps) === inches)?.[0];
}

/** "1-1/2" as 1.5; NaN, which equals nothing, where it is no number. */
function inchesOf(text: string): number {
  const [, whole = '0', above, below = '1'] = /^(?:(\d+)-)?(\d+)\/(\d+)$/.exec(text) ?? [];
  if (above !== undefined) return Number(whole) + Number(above) / Number(below);
  return text === '' ? NaN : Number(text);
}

/** A pipe has a size or a bore, never both, so the bore goes with the same batch. */
function sizeSet(pipe: PipeRun, nps: string, schedule: string, document: NetworkDocument): Proposal {
  if (pipeBore({ nps, schedule }) === undefined) {
    return { ok: false, reason: `${nps} in is not made in schedule ${schedule}. Choose another size or schedule.` };
  }
  return {
    ok: true,
    ops: [
      setOp(document, 'pipes', pipe.id, 'size', { nps, schedule }),
      setOp(document, 'pipes', pipe.id, 'insideDiameterM', undefined),
    ],
  };
}

export function riseM({ from, to }: PipeRun, document: NetworkDocument): number | undefined {
  const [start, end] = [document.nodes.get(from)?.value, document.nodes.get(to)?.value];
  return start === undefined || end === undefined ? undefined : end.elevationM - start.elevationM;
}

function routeWords({ route }: PipeRun, { units }: ListContext): string {
  if (route === undefined) return '';
  return route
    .map(({ lengthM, riseM: rise }) =>
      [lengthM, rise].map((metres) => formatQuantity(metres, 'length', units)).join(' up '),
    )
    .join(', ');
}

/** An element by its tag, else by its id; a tag that two share names the first. */
export function findNode(text: string, document: NetworkDocument): string | undefined {
  const wanted = text.trim().toLowerCase();
  let first: { readonly id: string; readonly ordinal: number } | undefined;
  for (const [id, { ordinal, value }] of document.nodes) {
    if (value.tag?.toLowerCase() === wanted && (first === undefined || ordinal < first.ordinal))
      first = { id, ordinal };
  }
  return first?.id ?? [...document.nodes.keys()].find((id) => id.toLowerCase() === wanted);
}

export function nodeName(id: string, document: NetworkDocument): string {
  return document.nodes.get(id)?.value.tag ?? id;
}

function sizeRank(nps: string): number | undefined {
  return new Map<string, number>(Object.entries(NOMINAL_SIZES)).get(nps);
}
