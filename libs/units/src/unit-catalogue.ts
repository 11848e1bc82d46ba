import {
  BTU_J,
  FAHRENHEIT_ZERO_R,
  FOOT_M,
  FOOT_OF_WATER_PA,
  HOUR_S,
  ICE_POINT_K,
  INCH_M,
  INCH_OF_MERCURY_PA,
  INCH_OF_WATER_PA,
  KGF_PER_CM2_PA,
  MINUTE_S,
  POUND_KG,
  PSI_PA,
  RANKINE_K,
  TORR_PA,
} from './exact-factors';

/** What a unit measures. Two units of one dimension can be converted into each other. */
export type Dimension =
  | 'pressure'
  | 'length'
  | 'massFlow'
  | 'temperature'
  | 'velocity'
  | 'pressureGradient'
  | 'momentumFlux'
  | 'ratio'
  | 'heatLossPerLength'
  | 'specificEnthalpy'
  | 'density';

/** Where a pressure is counted from when the unit itself says so ("psig", "psia"). */
export type PressureReference = 'gauge' | 'absolute';

export interface UnitDefinition {
  /** How the unit is written on the screen. */
  readonly symbol: string;
  readonly dimension: Dimension;
  /** SI value of one unit. */
  readonly factor: number;
  /** Added before multiplying, in the unit: distance from absolute zero to the unit's own zero (temperatures). */
  readonly zero?: number;
  readonly reference?: PressureReference;
  /** Symbol of the same unit without a reference: "psi" for "psig". */
  readonly plainSymbol?: string;
  /** Other spellings people type. Case, spaces, dots, brackets and multiplication signs do not matter. */
  readonly spellings: readonly string[];
}

/** Words for a dimension, for refusing one where another belongs. */
export const DIMENSION_NOUNS: Readonly<Record<Dimension, string>> = {
  pressure: 'a pressure',
  length: 'a length',
  massFlow: 'a mass flow',
  temperature: 'a temperature',
  velocity: 'a velocity',
  pressureGradient: 'a pressure drop per length',
  momentumFlux: 'a momentum flux',
  ratio: 'a share',
  heatLossPerLength: 'a heat loss per length',
  specificEnthalpy: 'a specific enthalpy',
  density: 'a density',
};

export const UNITS: readonly UnitDefinition[] = [
  ...pressureUnit({ plain: 'psi', gauge: 'psig', absolute: 'psia' }, PSI_PA, ['lb/in2', 'lbf/in2']),
  ...pressureUnit({ plain: 'kPa', gauge: 'kPa g', absolute: 'kPa abs' }, 1e3),
  ...pressureUnit({ plain: 'bar', gauge: 'bar g', absolute: 'bar a' }, 1e5, ['bars']),
  ...pressureUnit({ plain: 'mbar', gauge: 'mbar g', absolute: 'mbar a' }, 100, ['hPa']),
  ...pressureUnit({ plain: 'Pa', gauge: 'Pa g', absolute: 'Pa abs' }, 1),
  ...pressureUnit({ plain: 'MPa', gauge: 'MPa g', absolute: 'MPa abs' }, 1e6),
  ...pressureUnit({ plain: 'inHg', gauge: 'inHg g', absolute: 'inHg abs' }, INCH_OF_MERCURY_PA, ['"Hg']),
  ...pressureUnit({ plain: 'inH2O', gauge: 'inH2O g', absolute: 'inH2O abs' }, INCH_OF_WATER_PA, [
    'in wg',
    'in wc',
    'inAq',
    '"wg',
    '"wc',
    '"H2O',
  ]),
  ...pressureUnit({ plain: 'ftH2O', gauge: 'ftH2O g', absolute: 'ftH2O abs' }, FOOT_OF_WATER_PA, ['ft wg', 'ft wc']),
  ...pressureUnit({ plain: 'kgf/cm²', gauge: 'kgf/cm² g', absolute: 'kgf/cm² abs' }, KGF_PER_CM2_PA, ['kg/cm2']),
  ...pressureUnit({ plain: 'torr', gauge: 'torr g', absolute: 'torr abs' }, TORR_PA, ['mmHg']),

  unit('length', 'ft', FOOT_M, ['feet', 'foot', "'"]),
  unit('length', 'in', INCH_M, ['inch', 'inches', '"']),
  unit('length', 'm', 1, ['metre', 'metres', 'meter', 'meters']),
  unit('length', 'mm', 1e-3, ['millimetre', 'millimetres', 'millimeter', 'millimeters']),
  unit('length', 'cm', 1e-2),
  unit('length', 'µm', 1e-6, ['um', 'micron', 'microns', 'μm']),
  unit('length', 'yd', 3 * FOOT_M, ['yard', 'yards']),

  unit('massFlow', 'lb/h', POUND_KG / HOUR_S, ['lb/hr', 'lbs/h', 'lbs/hr', 'lbm/h', 'lbm/hr', 'lb/hour', 'pph']),
  unit('massFlow', 'kg/h', 1 / HOUR_S, ['kg/hr', 'kg/hour']),
  unit('massFlow', 'kg/s', 1, ['kg/sec']),
  unit('massFlow', 't/h', 1000 / HOUR_S, ['t/hr', 'tonne/h', 'tonnes/h', 'tonne/hr', 'tonnes/hr', 'tph']),
  unit('massFlow', 'klb/h', (1000 * POUND_KG) / HOUR_S, ['klb/hr', 'klbs/h', 'klbs/hr']),
  unit('massFlow', 'lb/min', POUND_KG / MINUTE_S, ['lbs/min']),
  unit('massFlow', 'lb/s', POUND_KG, ['lb/sec', 'lbs/s', 'lbs/sec']),
  unit('massFlow', 'kg/min', 1 / MINUTE_S),
  unit('massFlow', 'g/s', 1e-3),

  temperatureUnit('°F', RANKINE_K, FAHRENHEIT_ZERO_R, ['F', 'deg F', 'degrees F', 'fahrenheit']),
  temperatureUnit('°C', 1, ICE_POINT_K, ['C', 'deg C', 'degrees C', 'celsius']),
  temperatureUnit('K', 1, 0, ['kelvin', 'deg K']),
  temperatureUnit('°R', RANKINE_K, 0, ['R', 'deg R', 'rankine']),

  unit('velocity', 'ft/min', FOOT_M / MINUTE_S, ['fpm', 'feet/min', 'feet/minute', 'ft/minute']),
  unit('velocity', 'ft/s', FOOT_M, ['fps', 'ft/sec', 'feet/s', 'feet/sec', 'feet/second']),
  unit('velocity', 'm/s', 1, ['m/sec', 'mps']),
  unit('velocity', 'm/min', 1 / MINUTE_S),

  unit('pressureGradient', 'psi/100 ft', PSI_PA / (100 * FOOT_M), ['psi/100 feet', "psi/100'"]),
  unit('pressureGradient', 'psi/ft', PSI_PA / FOOT_M, ['psi/foot']),
  unit('pressureGradient', 'Pa/m', 1),
  unit('pressureGradient', 'kPa/m', 1e3),
  unit('pressureGradient', 'mbar/m', 100),
  unit('pressureGradient', 'bar/m', 1e5),
  unit('pressureGradient', 'bar/100 m', 1e3),

  unit('momentumFlux', 'lb/ft·s²', POUND_KG / FOOT_M, ['lbm/ft s2', 'lb/ft/s2']),
  unit('momentumFlux', 'kg/m·s²', 1, ['kg/m/s2']),

  unit('ratio', '%', 0.01, ['percent', 'pct', 'per cent']),

  unit('heatLossPerLength', 'Btu/h·ft', BTU_J / HOUR_S / FOOT_M, ['Btu/hr ft', 'Btu/h/ft', 'Btu/hr/ft']),
  unit('heatLossPerLength', 'W/m', 1),
  unit('heatLossPerLength', 'W/ft', 1 / FOOT_M),
  unit('heatLossPerLength', 'kW/m', 1e3),

  unit('specificEnthalpy', 'Btu/lb', BTU_J / POUND_KG, ['Btu/lbm']),
  unit('specificEnthalpy', 'kJ/kg', 1e3),
  unit('specificEnthalpy', 'J/kg', 1),
  unit('specificEnthalpy', 'MJ/kg', 1e6),

  unit('density', 'lb/ft³', POUND_KG / FOOT_M ** 3, ['lbm/ft3', 'lb/cu ft', 'pcf']),
  unit('density', 'kg/m³', 1, ['kg/cu m']),
];

/** Spellings that name more than one unit; guessing would be wrong by a tenth or more, so the person is asked. */
const AMBIGUOUS_SPELLINGS: ReadonlyMap<string, string> = new Map(
  ['ton/h', 'tons/h', 'ton/hr', 'tons/hr'].map((spelling) => [
    spelling,
    'A ton can be 2,000 lb, 2,240 lb or 1,000 kg. Write t/h for 1,000 kg an hour, or use lb/h.',
  ]),
);

/** Capitals decide here: MPa is a million pascals, mPa a thousandth of one, and nobody means the second. */
const CASE_TRAPS: ReadonlyMap<string, string> = new Map([
  ['mPa', 'mPa is a thousandth of a pascal. Write MPa for a million pascals.'],
  ['Mbar', 'Mbar is a million bar. Write mbar for a thousandth of a bar.'],
]);

const UNITS_BY_KEY: ReadonlyMap<string, UnitDefinition> = new Map(
  UNITS.flatMap((definition) => unitKeys(definition).map((key) => [key, definition] as const)),
);

const UNITS_BY_SYMBOL: ReadonlyMap<string, UnitDefinition> = new Map(UNITS.map((each) => [each.symbol, each]));

/** All keys a unit answers to, its symbol included. */
export function unitKeys(definition: UnitDefinition): string[] {
  return [...new Set([definition.symbol, ...definition.spellings].map(spellingKey))];
}

/**
 * The unit a typed spelling stands for.
 * @returns the unit; a sentence when the spelling could be several units; undefined when it is none
 */
export function findUnit(spelling: string): UnitDefinition | string | undefined {
  const key = spellingKey(spelling);
  return CASE_TRAPS.get(spelling.trim()) ?? AMBIGUOUS_SPELLINGS.get(key) ?? UNITS_BY_KEY.get(key);
}

/**
 * The unit written with exactly this symbol.
 * @throws RangeError for a symbol the catalogue does not hold: a mistake in the kinds' table
 */
export function unitBySymbol(symbol: string): UnitDefinition {
  const found = UNITS_BY_SYMBOL.get(symbol);
  if (found === undefined) throw new RangeError(`No unit has the symbol "${symbol}"`);
  return found;
}

/** Folds away what people write differently without meaning anything by it. */
function spellingKey(spelling: string): string {
  return spelling
    .toLowerCase()
    .replace(/\s+per\s+/g, '/')
    .replace(/º|˚/g, '°')
    .replace(/²|₂/g, '2')
    .replace(/³/g, '3')
    .replace(/[\s.·⋅*^()[\]]/g, '');
}

function unit(dimension: Dimension, symbol: string, factor: number, spellings: readonly string[] = []): UnitDefinition {
  return { symbol, dimension, factor, spellings };
}

function temperatureUnit(symbol: string, factor: number, zero: number, spellings: readonly string[]): UnitDefinition {
  return { symbol, dimension: 'temperature', factor, zero, spellings };
}

/** One pressure unit in its three forms: silent about its reference, gauge, absolute. */
function pressureUnit(
  symbols: { plain: string; gauge: string; absolute: string },
  factor: number,
  spellings: readonly string[] = [],
): UnitDefinition[] {
  const names = [symbols.plain, ...spellings];
  const withEndings = (...endings: string[]): string[] => names.flatMap((name) => endings.map((end) => name + end));
  const form = { dimension: 'pressure', factor, plainSymbol: symbols.plain } as const;
  return [
    { ...form, symbol: symbols.plain, spellings },
    { ...form, symbol: symbols.gauge, reference: 'gauge', spellings: withEndings('g', 'ga', 'gauge') },
    { ...form, symbol: symbols.absolute, reference: 'absolute', spellings: withEndings('a', 'abs', 'absolute') },
  ];
}
