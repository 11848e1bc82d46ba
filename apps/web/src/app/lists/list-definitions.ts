import type { Permission } from '@riseback/contracts';
import {
  type FlashVessel,
  type Gauge,
  inOrder,
  type Junction,
  type NetworkDocument,
  type NetworkNode,
  type PipeRun,
  type PumpedInlet,
  type TrapModel,
} from '@riseback/network';
import type { Column, ListContext, ListedElement } from './columns/column';
import { GAUGE_COLUMNS } from './columns/gauge-columns';
import { JUNCTION_COLUMNS, PUMPED_INLET_COLUMNS, VESSEL_COLUMNS, type Vessel } from './columns/node-columns';
import { PIPE_COLUMNS } from './columns/pipe-columns';
import { isTrap, TRAP_COLUMNS } from './columns/trap-columns';
import { TRAP_MODEL_COLUMNS } from './columns/trap-model-columns';
import { type BlockTarget, blockTarget } from './exchange/block-target';
import {
  GAUGE_ROWS,
  JUNCTION_ROWS,
  PIPE_ROWS,
  PUMPED_INLET_ROWS,
  type RowRules,
  TRAP_MODEL_ROWS,
  TRAP_ROWS,
  VESSEL_ROWS,
} from './exchange/row-rules';
import { type ListTable, tabulate } from './list-table';

export const LIST_IDS = ['traps', 'pipes', 'junctions', 'vessels', 'pumped-inlets', 'gauges', 'trap-models'] as const;
export type ListId = (typeof LIST_IDS)[number];

export type ListedCollection = 'nodes' | 'pipes' | 'trapModels' | 'gauges';

/** What can be added from a list's own button. */
export type NewKind = NetworkNode['kind'] | 'pipe' | 'trapModel' | 'gauge';

export interface ListFacts {
  readonly id: ListId;
  readonly word: string;
  /** Over the first columns. */
  readonly head: string;
  readonly one: string;
  readonly many: string;
  readonly collection: ListedCollection;
  /** What a role must be allowed to change here. */
  readonly permission: Permission;
  readonly additions: readonly { readonly kind: NewKind; readonly word: string }[];
}

/** A list as the page sees it; what its rows are made of stays inside. */
export interface ElementList extends ListFacts {
  readonly count: (document: NetworkDocument) => number;
  readonly holds: (document: NetworkDocument, elementId: string) => boolean;
  readonly table: (context: ListContext) => ListTable;
  /** For spreadsheets, both ways. */
  readonly block: (context: ListContext) => BlockTarget;
}

export const ELEMENT_LISTS: readonly ElementList[] = [
  elementList(
    {
      id: 'traps',
      word: 'Traps',
      head: 'Trap',
      one: 'trap',
      many: 'traps',
      collection: 'nodes',
      permission: 'draw',
      additions: [{ kind: 'trap', word: 'Add a trap' }],
    },
    (document) => nodes(document).filter(isTrap),
    TRAP_COLUMNS,
    TRAP_ROWS,
  ),
  elementList(
    {
      id: 'pipes',
      word: 'Pipes',
      head: 'Pipe',
      one: 'pipe',
      many: 'pipes',
      collection: 'pipes',
      permission: 'draw',
      additions: [{ kind: 'pipe', word: 'Add a pipe' }],
    },
    (document): PipeRun[] => inOrder(document.pipes).map(([, { value }]) => value),
    PIPE_COLUMNS,
    PIPE_ROWS,
  ),
  elementList(
    {
      id: 'junctions',
      word: 'Junctions',
      head: 'Junction',
      one: 'junction',
      many: 'junctions',
      collection: 'nodes',
      permission: 'draw',
      additions: [{ kind: 'junction', word: 'Add a junction' }],
    },
    (document) => nodes(document).filter((node): node is Junction => node.kind === 'junction'),
    JUNCTION_COLUMNS,
    JUNCTION_ROWS,
  ),
  elementList(
    {
      id: 'vessels',
      word: 'Vessels & receivers',
      head: 'Vessel or receiver',
      one: 'vessel',
      many: 'vessels',
      collection: 'nodes',
      permission: 'draw',
      additions: [
        { kind: 'receiver', word: 'Add a receiver' },
        { kind: 'flashVessel', word: 'Add a flash vessel' },
      ],
    },
    (document) => nodes(document).filter(isVessel),
    VESSEL_COLUMNS,
    VESSEL_ROWS,
  ),
  elementList(
    {
      id: 'pumped-inlets',
      word: 'Pumped inlets',
      head: 'Pumped inlet',
      one: 'pumped inlet',
      many: 'pumped inlets',
      collection: 'nodes',
      permission: 'draw',
      additions: [{ kind: 'pumpedInlet', word: 'Add a pumped inlet' }],
    },
    (document) => nodes(document).filter((node): node is PumpedInlet => node.kind === 'pumpedInlet'),
    PUMPED_INLET_COLUMNS,
    PUMPED_INLET_ROWS,
  ),
  elementList(
    {
      id: 'gauges',
      word: 'Gauges',
      head: 'Gauge',
      one: 'gauge',
      many: 'gauges',
      collection: 'gauges',
      permission: 'readings',
      additions: [{ kind: 'gauge', word: 'Add a gauge' }],
    },
    (document): Gauge[] => inOrder(document.gauges).map(([, { value }]) => value),
    GAUGE_COLUMNS,
    GAUGE_ROWS,
  ),
  elementList(
    {
      id: 'trap-models',
      word: 'Trap models',
      head: 'Trap model',
      one: 'trap model',
      many: 'trap models',
      collection: 'trapModels',
      permission: 'draw',
      additions: [{ kind: 'trapModel', word: 'Add a trap model' }],
    },
    (document): TrapModel[] => inOrder(document.trapModels).map(([, { value }]) => value),
    TRAP_MODEL_COLUMNS,
    TRAP_MODEL_ROWS,
  ),
];

function elementList<E extends ListedElement>(
  facts: ListFacts,
  elements: (document: NetworkDocument) => E[],
  columns: readonly Column<E>[],
  rules: RowRules<E>,
): ElementList {
  return {
    ...facts,
    count: (document) => elements(document).length,
    holds: (document, elementId) => elements(document).some(({ id }) => id === elementId),
    table: (context) => tabulate(columns, elements(context.document), context),
    block: (context) => {
      const listed = elements(context.document);
      const { cell } = tabulate(columns, listed, context);
      const { collection, one } = facts;
      return blockTarget({ collection, one, columns, elements: listed, rules }, context, cell);
    },
  };
}

/** Ids of nodes and pipes stand in the address and lead to the drawing; those of gauges and models are numbered apart. */
export function isDrawn({ collection }: ListFacts): boolean {
  return collection === 'nodes' || collection === 'pipes';
}

function nodes(document: NetworkDocument): NetworkNode[] {
  return inOrder(document.nodes).map(([, { value }]) => value);
}

function isVessel(node: NetworkNode): node is Vessel {
  return node.kind === 'receiver' || node.kind === ('flashVessel' satisfies FlashVessel['kind']);
}
