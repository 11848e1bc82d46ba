import {
  checkName,
  COINCIDENCE_WORDS,
  FRICTION_WORDS,
  LIMIT_WORDS,
  STATIC_LIFT_WORDS,
  VOID_FRACTION_WORDS,
} from '@riseback/contracts';
import { CHECK_LIMITS, type CheckLimit } from '@riseback/solver';
import { displayUnit, type DisplayUnits, type QuantityKind } from '@riseback/units';
import { plainNumber, quantityCell, type ReportTable, type TableCell } from './report-table';
import type { TableSource } from './table-source';

/** The site, the method and the limits: what holds for the network as a whole. */
export function settingTables(source: TableSource): ReportTable[] {
  return [methodTable(source), limitTable(source)];
}

function methodTable({ file: { site, method }, units }: TableSource): ReportTable {
  const quantity = (name: string, si: number, kind: QuantityKind): TableCell[] => [
    name,
    quantityCell(si, kind, units),
    displayUnit(kind, units.system) || undefined,
  ];
  return {
    name: 'Method',
    columns: ['Setting', 'Value', 'Unit'].map((title) => ({ title, unit: '' })),
    rows: [
      quantity('Atmospheric pressure', site.atmosphericPressurePa, 'absolutePressure'),
      quantity('Ambient temperature', site.ambientTemperatureK, 'temperature'),
      ['Lift', STATIC_LIFT_WORDS[method.staticLift], undefined],
      quantity('Lift rule', method.liftRulePaM, 'pressurePerRise'),
      quantity('Credit for falls', method.dropCredit, 'fraction'),
      ['Friction', FRICTION_WORDS[method.friction], undefined],
      ['Void fraction', VOID_FRACTION_WORDS[method.voidFraction], undefined],
      ['Discharges together', COINCIDENCE_WORDS[method.coincidence], undefined],
      ['Acceleration', method.acceleration ? 'Counted' : 'Left out', undefined],
    ],
  };
}

function limitTable({ file, units }: TableSource): ReportTable {
  const own: Readonly<Record<string, Readonly<Record<string, number | undefined>> | undefined>> = file.limits;
  return {
    name: 'Limits',
    columns: ['Check', 'Limit', 'Value', 'Unit', 'Default', 'Source of the default'].map((title) => ({
      title,
      unit: '',
    })),
    rows: Object.entries<Readonly<Record<string, CheckLimit>>>(CHECK_LIMITS).flatMap(([code, ofCode]) =>
      Object.entries(ofCode).map(([key, limit]) => limitRow(code, key, limit, own[code]?.[key], units)),
    ),
  };
}

function limitRow(
  code: string,
  key: string,
  { value, quantity, source }: CheckLimit,
  own: number | undefined,
  units: DisplayUnits,
): TableCell[] {
  // a limit of a gauge pressure is stored as such; its number is the same as that of a difference
  const unit = key.endsWith('GaugePa')
    ? displayUnit('gaugePressure', units.system)
    : displayUnit(quantity, units.system);
  const cell = (si: number) => (quantity === 'factor' ? plainNumber(si) : quantityCell(si, quantity, units));
  return [
    checkName(code),
    LIMIT_WORDS[`${code}.${key}`] ?? key,
    cell(own ?? value),
    unit === '' ? undefined : unit,
    own === undefined ? 'Yes' : 'No',
    source,
  ];
}
