import { unitBySymbol, UNITS, type Dimension, type UnitDefinition } from './unit-catalogue';

/**
 * What a value is, which decides how it is stored, shown and read.
 *
 * - `pressure`: stored Pa absolute, shown as gauge; the usual kind.
 * - `absolutePressure`: stored Pa absolute, shown absolute; the atmosphere itself, which has no gauge value.
 * - `gaugePressure`: stored Pa above the atmosphere, shown as gauge; gauge ranges.
 * - `pressureDifference`: Pa between two places; neither gauge nor absolute.
 * - `length`, `diameter`, `roughness`: m. `massFlow`: kg/s. `velocity`: m/s.
 * - `temperature`, `temperatureDifference`: K. `pressureGradient`: Pa/m along a pipe. `pressurePerRise`: Pa per m of height.
 * - `momentumFlux`: ρv², Pa. `fraction`, `quality`: 0 to 1, shown as per cent. `factor`, `count`: plain numbers.
 * - `heatLossPerLength`: W/m. `specificEnthalpy`: J/kg. `density`: kg/m³.
 */
export type QuantityKind =
  | 'pressure'
  | 'absolutePressure'
  | 'gaugePressure'
  | 'pressureDifference'
  | 'length'
  | 'diameter'
  | 'roughness'
  | 'massFlow'
  | 'temperature'
  | 'temperatureDifference'
  | 'velocity'
  | 'pressureGradient'
  | 'pressurePerRise'
  | 'momentumFlux'
  | 'fraction'
  | 'quality'
  | 'factor'
  | 'count'
  | 'heatLossPerLength'
  | 'specificEnthalpy'
  | 'density';

export type UnitSystem = 'us' | 'si';

/** How a kind is written in one system. */
export interface DisplayForm {
  /** Symbol of the unit; '' for plain numbers. */
  readonly unit: string;
  /** Significant digits aimed at, within the two limits on decimals; zeros past the lower limit are dropped. */
  readonly significantDigits: number;
  readonly minDecimals: number;
  readonly maxDecimals: number;
}

/** What pressure a bare "psi" is taken for, and what psig and psia mean, in a field of this kind. */
export type PressureMeaning = 'storedAbsoluteShownGauge' | 'absolute' | 'gauge' | 'difference';

export interface KindDefinition {
  /** Reads after "This field takes". */
  readonly noun: string;
  readonly dimensions: readonly Dimension[];
  readonly pressureMeaning?: PressureMeaning;
  /** Units named first in hints and refusals. */
  readonly hints: readonly string[];
  /** SI range [low, high] within which a bare number is worth suggesting after a wrong unit. Never refuses anything. */
  readonly plausible: readonly [number, number];
  readonly display: Readonly<Record<UnitSystem, DisplayForm>>;
}

/** Fixed decimals keep columns of results aligned; the other form drops zeros that say nothing, down to the fewest decimals. */
const fixed = (unit: string, decimals: number): DisplayForm => ({
  unit,
  significantDigits: 1,
  minDecimals: decimals,
  maxDecimals: decimals,
});
const digits = (unit: string, significantDigits: number, minDecimals: number, maxDecimals: number): DisplayForm => ({
  unit,
  significantDigits,
  minDecimals,
  maxDecimals,
});

const PLAIN_NUMBER: DisplayForm = digits('', 4, 0, 4);
const PER_CENT: DisplayForm = digits('%', 3, 0, 2);
const LENGTH_HINTS = ['ft', 'in', 'm', 'mm'] as const;

export const KINDS: Readonly<Record<QuantityKind, KindDefinition>> = {
  pressure: {
    noun: 'a pressure',
    dimensions: ['pressure'],
    pressureMeaning: 'storedAbsoluteShownGauge',
    hints: ['psig', 'psia', 'kPa', 'bar'],
    plausible: [5e3, 5e6],
    display: { us: fixed('psig', 1), si: fixed('kPa g', 1) },
  },
  absolutePressure: {
    noun: 'an absolute pressure',
    dimensions: ['pressure'],
    pressureMeaning: 'absolute',
    hints: ['psia', 'kPa abs', 'bar a', 'inHg'],
    plausible: [5e3, 5e6],
    display: { us: fixed('psia', 2), si: fixed('kPa abs', 2) },
  },
  gaugePressure: {
    noun: 'a gauge pressure',
    dimensions: ['pressure'],
    pressureMeaning: 'gauge',
    hints: ['psig', 'kPa g', 'bar g', 'inHg'],
    plausible: [-1e5, 5e6],
    display: { us: fixed('psig', 1), si: fixed('kPa g', 1) },
  },
  pressureDifference: {
    noun: 'a pressure difference',
    dimensions: ['pressure'],
    pressureMeaning: 'difference',
    hints: ['psi', 'kPa', 'bar', 'inH2O'],
    plausible: [0, 5e6],
    display: { us: digits('psi', 2, 1, 2), si: digits('kPa', 2, 1, 2) },
  },
  length: {
    noun: 'a length',
    dimensions: ['length'],
    hints: LENGTH_HINTS,
    plausible: [-100, 5e3],
    display: { us: digits('ft', 6, 0, 2), si: digits('m', 6, 0, 3) },
  },
  diameter: {
    noun: 'a diameter',
    dimensions: ['length'],
    hints: ['in', 'mm', 'ft', 'm'],
    plausible: [1e-4, 3],
    display: { us: digits('in', 6, 0, 3), si: digits('mm', 6, 0, 2) },
  },
  roughness: {
    noun: 'a roughness',
    dimensions: ['length'],
    hints: ['in', 'ft', 'mm', 'µm'],
    plausible: [1e-7, 3e-3],
    display: { us: digits('in', 3, 0, 6), si: digits('mm', 3, 0, 5) },
  },
  massFlow: {
    noun: 'a mass flow',
    dimensions: ['massFlow'],
    hints: ['lb/h', 'kg/h', 'kg/s', 't/h'],
    plausible: [0, 100],
    display: { us: digits('lb/h', 3, 0, 2), si: digits('kg/h', 3, 0, 2) },
  },
  temperature: {
    noun: 'a temperature',
    dimensions: ['temperature'],
    hints: ['°F', '°C', 'K'],
    plausible: [223.15, 873.15],
    display: { us: digits('°F', 3, 0, 1), si: fixed('°C', 1) },
  },
  temperatureDifference: {
    noun: 'a temperature difference',
    dimensions: ['temperature'],
    hints: ['°F', '°C', 'K'],
    plausible: [0, 300],
    display: { us: digits('°F', 3, 0, 1), si: digits('K', 3, 0, 1) },
  },
  velocity: {
    noun: 'a velocity',
    dimensions: ['velocity'],
    hints: ['ft/min', 'ft/s', 'm/s'],
    plausible: [0, 300],
    display: { us: digits('ft/min', 3, 0, 1), si: digits('m/s', 3, 0, 2) },
  },
  pressureGradient: {
    noun: 'a pressure drop per length',
    dimensions: ['pressureGradient'],
    hints: ['psi/100 ft', 'psi/ft', 'Pa/m', 'kPa/m'],
    plausible: [0, 1e5],
    display: { us: digits('psi/100 ft', 3, 0, 3), si: digits('Pa/m', 3, 0, 1) },
  },
  pressurePerRise: {
    noun: 'a pressure per height',
    dimensions: ['pressureGradient'],
    hints: ['psi/ft', 'kPa/m', 'Pa/m'],
    plausible: [0, 1e5],
    display: { us: digits('psi/ft', 3, 1, 3), si: digits('kPa/m', 3, 1, 2) },
  },
  momentumFlux: {
    noun: 'a momentum flux (density times velocity squared)',
    dimensions: ['momentumFlux', 'pressure'],
    pressureMeaning: 'difference',
    hints: ['lb/ft·s²', 'kg/m·s²', 'Pa', 'kPa'],
    plausible: [0, 1e6],
    display: { us: digits('lb/ft·s²', 3, 0, 1), si: digits('Pa', 3, 0, 1) },
  },
  fraction: {
    noun: 'a share',
    dimensions: ['ratio'],
    hints: ['%'],
    plausible: [0, 1],
    display: { us: PER_CENT, si: PER_CENT },
  },
  quality: {
    noun: 'a steam quality',
    dimensions: ['ratio'],
    hints: ['%'],
    plausible: [0, 1],
    display: { us: PER_CENT, si: PER_CENT },
  },
  factor: {
    noun: 'a plain number',
    dimensions: ['ratio'],
    hints: [],
    plausible: [0, 1000],
    display: { us: PLAIN_NUMBER, si: PLAIN_NUMBER },
  },
  count: {
    noun: 'a whole number',
    dimensions: [],
    hints: [],
    plausible: [0, 1e6],
    display: { us: fixed('', 0), si: fixed('', 0) },
  },
  heatLossPerLength: {
    noun: 'a heat loss per length',
    dimensions: ['heatLossPerLength'],
    hints: ['Btu/h·ft', 'W/m', 'W/ft'],
    plausible: [0, 5e3],
    display: { us: digits('Btu/h·ft', 3, 0, 1), si: digits('W/m', 3, 0, 1) },
  },
  specificEnthalpy: {
    noun: 'a specific enthalpy',
    dimensions: ['specificEnthalpy'],
    hints: ['Btu/lb', 'kJ/kg'],
    plausible: [0, 4e6],
    display: { us: fixed('Btu/lb', 1), si: fixed('kJ/kg', 1) },
  },
  density: {
    noun: 'a density',
    dimensions: ['density'],
    hints: ['lb/ft³', 'kg/m³'],
    plausible: [1e-2, 2e3],
    display: { us: digits('lb/ft³', 3, 0, 4), si: digits('kg/m³', 3, 0, 3) },
  },
};

/** Symbol of the unit a kind is shown in: "psig", "kPa g"; '' for plain numbers. */
export function displayUnit(kind: QuantityKind, system: UnitSystem): string {
  return KINDS[kind].display[system].unit;
}

/** Symbols of every unit a field of this kind understands, the usual ones first. */
export function unitsAccepted(kind: QuantityKind): string[] {
  const { hints } = KINDS[kind];
  const others = UNITS.filter((unit) => acceptsUnit(kind, unit)).map((unit) => unit.symbol);
  return [...new Set([...hints.filter((symbol) => acceptsUnit(kind, unitBySymbol(symbol))), ...others])];
}

/** Whether a value in this unit can be meant by a field of this kind. */
export function acceptsUnit(kind: QuantityKind, unit: UnitDefinition): boolean {
  const { dimensions, pressureMeaning } = KINDS[kind];
  if (!dimensions.includes(unit.dimension)) return false;
  if (pressureMeaning === 'difference') return unit.reference === undefined;
  if (pressureMeaning === 'absolute') return unit.reference !== 'gauge';
  return true;
}
