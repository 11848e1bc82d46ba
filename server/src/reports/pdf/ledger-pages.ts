import {
  backPressureLimit,
  bandsAlong,
  boreWords,
  endWords,
  gaugesOnWay,
  ledgerModel,
  liftProfileShapes,
  nameOf,
  PROFILE,
  pressureRamp,
  pressuresOf,
  type PressureRamp,
  trapTypeWords,
  trapVerdicts,
  verdictShapes,
} from '@riseback/figures';
import { fromFile, type NetworkDocument } from '@riseback/network';
import { ledger, liftProfile } from '@riseback/solver';
import { displayUnit, formatQuantity } from '@riseback/units';
import type { ToldWay } from '../exports/ledger-tables';
import type { TableSource } from '../exports/table-source';
import { paintShapes } from './figure-painter';
import { LedgerTable } from './ledger-table';
import type { Sheet } from './sheet';
import { solverResult } from './solver-result';

/** As wide as the screen's figure is drawn for paper, px. */
const PROFILE_WIDTH = 1200;

/** The account of each told trap, with its lift profile above it. */
export function ledgerPages(sheet: Sheet, source: TableSource, ways: readonly ToldWay[]): void {
  const document = fromFile(source.file);
  const ramp = pressureRamp(pressuresOf(source.outcomes), source.units);
  for (const way of ways) new LedgerPages(sheet, source, document, ramp, way).print();
}

class LedgerPages {
  private readonly trap;
  private readonly node;
  private readonly end;
  private readonly solved;

  constructor(
    private readonly sheet: Sheet,
    private readonly source: TableSource,
    private readonly document: NetworkDocument,
    private readonly ramp: PressureRamp,
    private readonly way: ToldWay,
  ) {
    this.trap = way.solved.traps.get(way.trapId);
    this.solved = solverResult(way.solved.result);
    const node = source.nodes.get(way.trapId);
    this.node = node?.kind === 'trap' ? node : undefined;
    const last = source.pipes.get(this.trap?.walk.at(-1) ?? '');
    const ends = [last?.to, last?.from].map((id) => source.nodes.get(id ?? ''));
    this.end = ends.find((found) => found?.kind === 'receiver' || found?.kind === 'flashVessel');
  }

  print(): void {
    const { sheet, way, trap, node, source } = this;
    if (trap === undefined || node === undefined) return;
    sheet.begin('Ledgers', `Lift and ledger: ${nameOf(node)}, case ${way.solved.name}`);
    this.head();
    this.profile();
    const entries = ledger(source.file, this.solved, way.trapId);
    const model = ledgerModel(entries, trap, this.document, source.units);
    const opening = `Opening: ${endWords(this.end)}`;
    new LedgerTable(sheet, model, { trapName: nameOf(node), endName: this.endName(), opening }).print();
    sheet.paragraph(model.handCheck, { size: 7.6, ink: 'ink2' });
  }

  private head(): void {
    const { sheet, trap, node, source, way } = this;
    if (trap === undefined || node === undefined) return;
    const { units } = source;
    const verdict = trapVerdicts(way.solved.result).get(way.trapId) ?? null;
    const pressure = formatQuantity(trap.backPressurePa, 'pressure', units);
    const quantity = (si: number, kind: 'pressure' | 'pressureDifference' | 'massFlow') =>
      formatQuantity(si, kind, units, { withUnit: true });
    const inlet = trap.backPressurePa + trap.differentialPa;
    const words = `${trapTypeWords(node.trapType)}, load ${quantity(node.loadKgS, 'massFlow')}, from ${quantity(inlet, 'pressure')} at its inlet. Way to ${endWords(this.end)}: ${String(trap.walk.length)} pipes. Differential ${quantity(trap.differentialPa, 'pressureDifference')}.`;
    const { y, right } = sheet;
    const unit = displayUnit('pressure', units.system);
    sheet.tagged('P', () => {
      sheet.print(unit, right, y - 12, { size: 8.6, ink: 'ink2' }, 'right');
      const at = right - sheet.measure(unit, { size: 8.6 }) - 4;
      sheet.print(pressure, at, y - 12, { size: 20, weight: 600 }, 'right');
      if (verdict !== null) {
        const mark = at - sheet.measure(pressure, { size: 20, weight: 600 }) - 50;
        paintShapes(sheet, verdictShapes(verdict), mark, y - 17, 0.9);
        const word = { fail: 'Fail', watch: 'Watch', pass: 'Pass' }[verdict];
        sheet.print(word, mark + 9, y - 13.5, { size: 9, weight: 600, ink: verdict });
      }
    });
    sheet.paragraph(sheet.fitted(words, sheet.width, { size: 8 }), { size: 8, ink: 'ink2' }, { gap: 4 });
  }

  private profile(): void {
    const { sheet, source, way, trap, node, document } = this;
    const { file, units } = source;
    const points = liftProfile(file, this.solved, way.trapId);
    if (trap === undefined || node === undefined || points.length < 2) return;
    const model = file.trapModels.find(({ id }) => id === node.trapModel);
    const limit = backPressureLimit(trap, node, model, units);
    const pipe = (id: string) => source.pipes.get(id);
    const shapes = liftProfileShapes({
      points,
      units,
      ramp: this.ramp,
      limit,
      exceeded: limit !== null && trap.backPressurePa > limit.pressurePa,
      nameOfPipe: (id) => pipe(id)?.tag ?? id,
      sizeOf: (id) => {
        const found = pipe(id);
        return found === undefined ? '' : boreWords(found, units);
      },
      bands: bandsAlong(file, this.solved, trap),
      spread: trap.spread,
      credible: trap.credible,
      gauges: gaugesOnWay(document, way.trapId, trap.walk, points),
      trapName: nameOf(node),
      endName: this.endName(),
      width: PROFILE_WIDTH,
    });
    const scale = sheet.width / PROFILE_WIDTH;
    const height = PROFILE.height * scale;
    const words = `Lift profile from ${nameOf(node)} to ${this.endName()}: pressure and elevation along the way. The ledger under it holds the same numbers.`;
    const { left: x, y, width } = sheet;
    sheet.figure(shapes, { x, y, scale }, words, { x, y, width, height });
    sheet.y += height + 4;
  }

  private endName(): string {
    return this.end === undefined ? 'the receiver' : nameOf(this.end);
  }
}
