import { exactDecimal } from './printed-number';
import { KINDS, type QuantityKind, type UnitSystem } from './quantity-kinds';
import { unitBySymbol, type UnitDefinition } from './unit-catalogue';

/** What a person's screen needs to know to show a stored value. */
export interface DisplayUnits {
  readonly system: UnitSystem;
  /** The site's atmosphere [Pa], between gauge and absolute. */
  readonly atmosphericPressurePa: number;
}

/** The number a stored SI value has in its display unit, unrounded; for axes, ledgers and editing. */
export function toDisplay(si: number, kind: QuantityKind, units: DisplayUnits): number {
  const unit = displayUnitDefinition(kind, units.system);
  return unit === undefined ? si : fromSi(si, unit, kind, units);
}

/** The stored SI value of a number in the kind's display unit; the inverse of `toDisplay`. */
export function fromDisplay(value: number, kind: QuantityKind, units: DisplayUnits): number {
  const unit = displayUnitDefinition(kind, units.system);
  return unit === undefined ? value : toSi(value, unit, kind, units);
}

/**
 * Digits kept of a converted value. One fewer than a double can tell apart, so that what is stored of 1.5 in is 0.0381 m and of 32 °F
 * is 273.15 K, at a relative cost of 5e-15 at most.
 */
const STORED_DIGITS = 15;

/** Stored SI value of a number in any unit the kind accepts. */
export function toSi(value: number, unit: UnitDefinition, kind: QuantityKind, units: DisplayUnits): number {
  return exactDecimal(value)
    .plus(zeroOf(unit, kind))
    .times(unit.factor)
    .plus(pressureShiftPa(unit, kind, units))
    .toSignificantDigits(STORED_DIGITS)
    .toNumber();
}

function fromSi(si: number, unit: UnitDefinition, kind: QuantityKind, units: DisplayUnits): number {
  return (si - pressureShiftPa(unit, kind, units)) / unit.factor - zeroOf(unit, kind);
}

function displayUnitDefinition(kind: QuantityKind, system: UnitSystem): UnitDefinition | undefined {
  const symbol = KINDS[kind].display[system].unit;
  return symbol === '' ? undefined : unitBySymbol(symbol);
}

/** A temperature difference has no zero point: 9 °F of difference are 5 K. */
function zeroOf(unit: UnitDefinition, kind: QuantityKind): number {
  return kind === 'temperatureDifference' ? 0 : (unit.zero ?? 0);
}

/** What must be added to a pressure in its own reference to reach the stored one [Pa]. */
function pressureShiftPa(unit: UnitDefinition, kind: QuantityKind, units: DisplayUnits): number {
  const { pressureMeaning } = KINDS[kind];
  if (unit.dimension !== 'pressure' || pressureMeaning === undefined) return 0;
  switch (pressureMeaning) {
    case 'storedAbsoluteShownGauge':
      return unit.reference === 'absolute' ? 0 : units.atmosphericPressurePa;
    case 'gauge':
      return unit.reference === 'absolute' ? -units.atmosphericPressurePa : 0;
    case 'absolute':
    case 'difference':
      return 0;
  }
}
