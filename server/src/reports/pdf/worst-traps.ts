import {
  backPressureLimit,
  badness,
  endWords,
  flatStaffShapes,
  nameOf,
  type StaffModel,
  staffModel,
  trapVerdicts,
  verdictShapes,
  worstOfCases,
} from '@riseback/figures';
import type { TrapResult, Verdict } from '@riseback/contracts';
import { formatQuantity } from '@riseback/units';
import { caseNameOf, type TableSource } from '../exports/table-source';
import { paintShapes } from './figure-painter';
import type { Sheet, TextStyle } from './sheet';

interface WorstTrap {
  readonly name: string;
  readonly caseName: string;
  readonly verdict: Verdict | null;
  readonly trap: TrapResult;
  readonly staff: StaffModel;
}

const ROW = 16;
/** What stands under them, and their head. */
const CAUTIONS_ROOM = 66;
const LEAST_ROWS = 3;
const CELL: TextStyle = { size: 8.4 };
/** The staff's own height and the share it is drawn at. */
const STAFF = { width: 250, scale: 0.82 } as const;

/** The traps with most against them, each in its own worst case, as lying staffs on one scale. */
export function worstTraps(sheet: Sheet, source: TableSource): void {
  if (sheet.room < CAUTIONS_ROOM + LEAST_ROWS * ROW) sheet.newPage();
  const most = Math.floor((sheet.room - CAUTIONS_ROOM) / ROW);
  const traps = worstFirst(source).slice(0, Math.min(14, most));
  if (traps.length < 1) return;
  const { left, right } = sheet;
  sheet.tagged('H2', () => sheet.print('Traps, worst first', left, sheet.y + 9, { size: 10.5, weight: 600 }));
  const key =
    'Filled to the back pressure; the tick at the end is the steam inlet, the pointer the limit, copper the bands.';
  sheet.tagged('P', () => sheet.print(key, right, sheet.y + 9, { size: 7.2, ink: 'ink3' }, 'right'));
  sheet.rule(left, sheet.y + 14, right, 'ink', 0.9);
  sheet.y += 16;
  const topPa = Math.max(...traps.map(({ staff }) => staff.topPa));
  for (const worst of traps) {
    row(sheet, source, worst, topPa);
    sheet.y += ROW;
    sheet.rule(left, sheet.y, right);
  }
  sheet.y += 8;
}

function row(
  sheet: Sheet,
  { units }: TableSource,
  { name, caseName, verdict, trap, staff }: WorstTrap,
  topPa: number,
): void {
  const { left, right, y } = sheet;
  const baseline = y + 10.6;
  const quantity = (si: number, kind: 'pressure' | 'pressureDifference') =>
    formatQuantity(si, kind, units, { withUnit: true });
  const shapes = flatStaffShapes(staff, STAFF.width / STAFF.scale, topPa);
  sheet.tagged('P', () => {
    if (verdict !== null) paintShapes(sheet, verdictShapes(verdict), left + 5, y + 7.6, 0.68);
    sheet.print(sheet.fitted(name, 100, { ...CELL, weight: 600 }), left + 14, baseline, { ...CELL, weight: 600 });
    sheet.print(sheet.fitted(caseName, 140, CELL), left + 122, baseline, { ...CELL, ink: 'ink2' });
    sheet.print(
      quantity(trap.backPressurePa, 'pressure'),
      right - 146,
      baseline,
      { ...CELL, weight: 600, tabular: true },
      'right',
    );
    const differential = `${quantity(trap.differentialPa, 'pressureDifference')} differential`;
    sheet.print(differential, right, baseline, { ...CELL, tabular: true }, 'right');
  });
  sheet.decoration(() => paintShapes(sheet, shapes, left + 272, y + 1.2, STAFF.scale));
}

function worstFirst(source: TableSource): WorstTrap[] {
  const worst = worstOfCases(source.outcomes);
  if (worst === null) return [];
  const verdicts = new Map<string, Verdict | null>();
  for (const outcome of source.outcomes) {
    if (outcome.status !== 'solved') continue;
    for (const [id, verdict] of trapVerdicts(outcome.result)) {
      if (worst.caseOf.get(id) === outcome.caseId) verdicts.set(id, verdict);
    }
  }
  return worst.result.traps
    .flatMap((trap) => worstTrap(source, trap, worst.caseOf.get(trap.id) ?? '', verdicts.get(trap.id) ?? null))
    .sort((a, b) => badness(b.verdict) - badness(a.verdict) || b.trap.backPressurePa - a.trap.backPressurePa);
}

function worstTrap(source: TableSource, trap: TrapResult, caseId: string, verdict: Verdict | null): WorstTrap[] {
  const { units, nodes, pipes, file } = source;
  const node = nodes.get(trap.id);
  if (node?.kind !== 'trap') return [];
  const model = file.trapModels.find(({ id }) => id === node.trapModel);
  const inletPa = trap.backPressurePa + trap.differentialPa;
  const last = pipes.get(trap.walk.at(-1) ?? '');
  const receiverName = endWords(nodes.get(last?.to ?? ''));
  const limitPa = backPressureLimit(trap, node, model, units)?.pressurePa;
  const staff = staffModel(trap, inletPa, units, { receiverName, limitPa });
  return [{ name: nameOf(node), caseName: caseNameOf(source, caseId), verdict, trap, staff }];
}
