import { pipeBore } from '@riseback/hydraulics';
import {
  type FlashVessel,
  type Gauge,
  inOrder,
  type Junction,
  type NetworkDocument,
  type PipeRun,
  type PumpedInlet,
  type Receiver,
  type Trap,
  type TrapModel,
  withTrapDefaults,
} from '@riseback/network';
import { vesselKind } from '../columns/node-columns';
import { FIRST_SCHEDULE, nominalSize } from '../columns/pipe-columns';

/** The cells of a row by the keys of their columns. */
export type RowTexts = ReadonlyMap<string, string>;

/** What a list's rows need besides their columns when they come from a spreadsheet. */
export interface RowRules<E> {
  /** The cell that names a row. */
  readonly name: 'tag' | 'name';
  /** Ids of new elements begin with it. */
  readonly prefix: (texts: RowTexts) => string;
  /** What a new row's cells are read into. Of it only the keys of `fixed` are stored, the others when a cell gives them. */
  readonly blank: (id: string, texts: RowTexts) => E;
  readonly fixed: readonly string[];
  /** Cells that make sense only together: keys to set before the others are read, and the cells that are then done with. */
  readonly together?: (texts: RowTexts, element: E, document: NetworkDocument) => Together;
  /** The column to which a mistake of the whole row is told. */
  readonly whole: string;
}

interface Together {
  readonly set: Readonly<Record<string, unknown>>;
  readonly done: readonly string[];
}

const NODE_KEYS = ['id', 'kind'] as const;

export const TRAP_ROWS: RowRules<Trap> = {
  name: 'tag',
  prefix: () => 'T',
  blank: (id) => withTrapDefaults({ id, kind: 'trap', elevationM: 0, inletPressurePa: 1e5, loadKgS: 0 }),
  fixed: NODE_KEYS,
  whole: 'tag',
};

export const JUNCTION_ROWS: RowRules<Junction> = {
  name: 'tag',
  prefix: () => 'J',
  blank: (id) => ({ id, kind: 'junction', elevationM: 0 }),
  fixed: NODE_KEYS,
  whole: 'tag',
};

export const VESSEL_ROWS: RowRules<Receiver | FlashVessel> = {
  name: 'tag',
  prefix: (texts) => (isFlashVessel(texts) ? 'V' : 'R'),
  blank: (id, texts) =>
    isFlashVessel(texts)
      ? { id, kind: 'flashVessel', elevationM: 0, pressurePa: 1e5 }
      : { id, kind: 'receiver', elevationM: 0, vented: true },
  // without a pressure a receiver is vented, as in the form that adds one
  fixed: [...NODE_KEYS, 'vented'],
  whole: 'pressurePa',
};

export const PUMPED_INLET_ROWS: RowRules<PumpedInlet> = {
  name: 'tag',
  prefix: () => 'P',
  blank: (id) => ({ id, kind: 'pumpedInlet', elevationM: 0, flowKgS: 0, temperatureK: 300, peakFactor: 1 }),
  fixed: NODE_KEYS,
  whole: 'tag',
};

export const PIPE_ROWS: RowRules<PipeRun> = {
  name: 'tag',
  prefix: () => 'L',
  blank: (id) => ({
    id,
    from: '',
    to: '',
    lengthM: 0,
    roughnessM: 0,
    fittings: [],
    lossCoefficient: 0,
    heatLossWM: 0,
    checkValve: false,
  }),
  fixed: ['id'],
  together: (texts, { size }, document) => {
    const nps = nominalSize(textAt(texts, 'nps'));
    if (nps === undefined) return { set: {}, done: [] };
    const schedule = textAt(texts, 'schedule') || size?.schedule || lastSchedule(document);
    // what is not made in that wall is left to its own cell, which says so
    if (pipeBore({ nps, schedule }) === undefined) return { set: {}, done: ['insideDiameterM'] };
    return {
      set: { size: { nps, schedule }, insideDiameterM: undefined },
      done: ['nps', 'schedule', 'insideDiameterM'],
    };
  },
  whole: 'nps',
};

export const GAUGE_ROWS: RowRules<Gauge> = {
  name: 'tag',
  prefix: () => 'G',
  blank: (id) => ({ id, elevationM: 0, waterLeg: false, retired: false }),
  fixed: ['id'],
  whole: 'place',
};

export const TRAP_MODEL_ROWS: RowRules<TrapModel> = {
  name: 'name',
  prefix: () => 'M',
  blank: (id) => ({ id, name: '' }),
  fixed: ['id'],
  whole: 'name',
};

function isFlashVessel(texts: RowTexts): boolean {
  return vesselKind(textAt(texts, 'kind')) === 'flashVessel';
}

function lastSchedule(document: NetworkDocument): string {
  return (
    inOrder(document.pipes).findLast(([, { value }]) => value.size !== undefined)?.[1].value.size?.schedule ??
    FIRST_SCHEDULE
  );
}

function textAt(texts: RowTexts, key: string): string {
  return texts.get(key)?.trim() ?? '';
}
