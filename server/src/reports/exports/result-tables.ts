import { checkName, FLOW_PATTERN_WORDS } from '@riseback/contracts';
import type { NetworkNode, PipeRun, Trap } from '@riseback/network';
import { findingSummary } from './element-findings';
import { type ReportColumn, type ReportTable, tableOf } from './report-table';
import type { SolvedCase } from './solved-cases';
import type { TableSource } from './table-source';

/** One element in one case. */
interface Solved<E> {
  readonly solved: SolvedCase;
  readonly element: E;
}

/** What came out, case by case: the result columns of the screen's lists, and what a trap's back pressure is made of. */
export function resultTables({ file, units }: TableSource, cases: readonly SolvedCase[]): ReportTable[] {
  const rows = <E>(elements: readonly E[]): Solved<E>[] =>
    cases.flatMap((solved) => elements.map((element) => ({ solved, element })));
  const traps = file.nodes.filter((node): node is Trap => node.kind === 'trap');
  const others = file.nodes.filter(({ kind }) => kind !== 'trap');
  return [
    tableOf('Trap results', TRAP_COLUMNS, rows(traps), units),
    tableOf('Pipe results', PIPE_COLUMNS, rows(file.pipes), units),
    tableOf('Node results', NODE_COLUMNS, rows(others), units),
  ];
}

function namedColumns<E extends NetworkNode | PipeRun>(): ReportColumn<Solved<E>>[] {
  return [
    { title: 'Case', value: ({ solved }) => solved.name },
    { title: 'Tag', value: ({ element: { tag, id } }) => tag ?? id },
    { title: 'State', value: ({ solved, element }) => solved.stateOf(element.id) },
  ];
}

function idColumn<E extends { readonly id: string }>(): ReportColumn<Solved<E>> {
  return { title: 'Id', value: ({ element }) => element.id };
}

type TrapNumber = (trap: NonNullable<ReturnType<SolvedCase['traps']['get']>>) => number | undefined;

function trapColumn(title: string, quantity: 'pressure' | 'pressureDifference' | 'massFlow', number: TrapNumber) {
  return {
    title,
    quantity,
    value: ({ solved, element }: Solved<Trap>) => {
      const trap = solved.traps.get(element.id);
      return trap === undefined ? undefined : number(trap);
    },
  } satisfies ReportColumn<Solved<Trap>>;
}

const TRAP_COLUMNS: readonly ReportColumn<Solved<Trap>>[] = [
  ...namedColumns<Trap>(),
  trapColumn('Back', 'pressure', ({ backPressurePa }) => backPressurePa),
  trapColumn('Differential', 'pressureDifference', ({ differentialPa }) => differentialPa),
  { title: 'Verdict', value: ({ solved, element }) => trapVerdict(solved, element.id) },
  trapColumn('Receiver or vessel', 'pressure', ({ receiverPressurePa }) => receiverPressurePa),
  trapColumn('Static', 'pressureDifference', ({ staticPa }) => staticPa),
  trapColumn('Friction', 'pressureDifference', ({ frictionPa }) => frictionPa),
  trapColumn('Flash', 'pressureDifference', ({ flashPa }) => flashPa),
  trapColumn('Hand check', 'pressure', ({ handCheck }) => handCheck.backPressurePa),
  trapColumn('Credible from', 'pressure', ({ credible }) => credible?.lowPa),
  trapColumn('Credible to', 'pressure', ({ credible }) => credible?.highPa),
  trapColumn('Spread from', 'pressure', ({ spread }) => spread?.lowPa),
  trapColumn('Spread to', 'pressure', ({ spread }) => spread?.highPa),
  trapColumn('Live steam', 'massFlow', ({ liveSteamKgS }) => liveSteamKgS),
  {
    title: 'Not checked',
    value: ({ solved, element }) =>
      solved.traps
        .get(element.id)
        ?.notChecked.map(({ code, reason }) => `${checkName(code)}: ${reason}`)
        .join(' '),
  },
  idColumn(),
];

const PIPE_COLUMNS: readonly ReportColumn<Solved<PipeRun>>[] = [
  ...namedColumns<PipeRun>(),
  pipeColumn('Flow', 'massFlow', 'massFlowKgS'),
  pipeColumn('Liquid', 'velocity', 'liquidVelocityMS'),
  pipeColumn('Mixture', 'velocity', 'mixtureVelocityMS'),
  pipeColumn('Static', 'pressureDifference', 'staticPa'),
  pipeColumn('Friction', 'pressureDifference', 'frictionPa'),
  pipeColumn('Flash', 'pressureDifference', 'flashPa'),
  { title: 'Finding', value: ({ solved, element }) => findingSummary(solved.findings.get(element.id) ?? []) },
  {
    title: 'Flow pattern',
    value: ({ solved, element }) => {
      const pattern = solved.pipes.get(element.id)?.flowPattern;
      return pattern === undefined ? undefined : FLOW_PATTERN_WORDS[pattern];
    },
  },
  pipeColumn('Choked at', 'pressure', 'outletPressurePa'),
  pipeColumn('Upstream', 'pressure', 'upstreamPressurePa'),
  pipeColumn('Downstream', 'pressure', 'downstreamPressurePa'),
  pipeColumn('Upstream steam', 'quality', 'upstreamQuality'),
  pipeColumn('Downstream steam', 'quality', 'downstreamQuality'),
  idColumn(),
];

type PipeKey =
  | 'massFlowKgS'
  | 'liquidVelocityMS'
  | 'mixtureVelocityMS'
  | 'staticPa'
  | 'frictionPa'
  | 'flashPa'
  | 'outletPressurePa'
  | 'upstreamPressurePa'
  | 'downstreamPressurePa'
  | 'upstreamQuality'
  | 'downstreamQuality';

function pipeColumn(
  title: string,
  quantity: NonNullable<ReportColumn<unknown>['quantity']>,
  key: PipeKey,
): ReportColumn<Solved<PipeRun>> {
  return {
    title,
    quantity,
    value: ({ solved, element }) => {
      const number = solved.pipes.get(element.id)?.[key];
      return quantity === 'quality' ? flashShare(number) : number;
    },
  };
}

const NODE_COLUMNS: readonly ReportColumn<Solved<NetworkNode>>[] = [
  ...namedColumns<NetworkNode>(),
  {
    title: 'Pressure',
    quantity: 'pressure',
    value: ({ solved, element }) => solved.nodes.get(element.id)?.pressurePa,
  },
  {
    title: 'Temperature',
    quantity: 'temperature',
    value: ({ solved, element }) => solved.nodes.get(element.id)?.temperatureK,
  },
  {
    title: 'Flash steam',
    quantity: 'quality',
    value: ({ solved, element }) => flashShare(solved.nodes.get(element.id)?.quality),
  },
  { title: 'Flow', quantity: 'massFlow', value: ({ solved, element }) => solved.nodes.get(element.id)?.massFlowKgS },
  { title: 'Finding', value: ({ solved, element }) => findingSummary(solved.findings.get(element.id) ?? []) },
  idColumn(),
];

/** Silence is never a pass: what was not checked at all has no verdict. */
export function trapVerdict({ findings, traps }: SolvedCase, trapId: string): string | undefined {
  const checks = traps.get(trapId)?.checks.length ?? 0;
  return findingSummary(findings.get(trapId) ?? []) ?? (checks > 0 ? 'Pass' : undefined);
}

/** A negative quality is a subcooled liquid: no flash steam at all. */
function flashShare(quality: number | undefined): number | undefined {
  return quality === undefined ? undefined : Math.max(0, quality);
}
