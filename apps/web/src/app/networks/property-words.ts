import { isObject } from '@riseback/network';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { KIND_WORDS, TRAP_TYPE_WORDS } from '../shared/element-words';

interface PropertyFact {
  readonly word: string;
  readonly quantity?: QuantityKind;
}

/** Keys carry their unit, so one table holds for every kind of element. */
const PROPERTIES: ReadonlyMap<string, PropertyFact> = new Map<string, PropertyFact>([
  ['name', { word: 'Name' }],
  ['tag', { word: 'Tag' }],
  ['kind', { word: 'Kind' }],
  ['area', { word: 'Area' }],
  ['note', { word: 'Note' }],
  ['position', { word: 'Place on the drawing' }],
  ['bends', { word: 'Bends' }],
  ['elevationM', { word: 'Elevation', quantity: 'length' }],
  ['inletPressurePa', { word: 'Inlet pressure', quantity: 'pressure' }],
  ['loadKgS', { word: 'Load', quantity: 'massFlow' }],
  ['loadTolerance', { word: 'Load known to', quantity: 'fraction' }],
  ['subcoolingK', { word: 'Subcooling', quantity: 'temperatureDifference' }],
  ['trapType', { word: 'Trap type' }],
  ['trapModel', { word: 'Trap model' }],
  ['discharge', { word: 'Discharge' }],
  ['peakFactor', { word: 'Peak factor', quantity: 'factor' }],
  ['sizingFactor', { word: 'Sizing factor', quantity: 'factor' }],
  ['maximumPressurePa', { word: 'Safety valve set at', quantity: 'pressure' }],
  ['batch', { word: 'Batch' }],
  ['service', { word: 'Service' }],
  ['secondaryInletK', { word: 'heated from', quantity: 'temperature' }],
  ['secondaryOutletK', { word: 'heated to', quantity: 'temperature' }],
  ['pressurePa', { word: 'Pressure', quantity: 'pressure' }],
  ['vented', { word: 'Vented' }],
  ['flowKgS', { word: 'Flow', quantity: 'massFlow' }],
  ['temperatureK', { word: 'Temperature', quantity: 'temperature' }],
  ['availablePressurePa', { word: 'Pressure the pump can give', quantity: 'pressure' }],
  ['from', { word: 'From' }],
  ['to', { word: 'To' }],
  ['lengthM', { word: 'Length', quantity: 'length' }],
  ['riseM', { word: 'rise', quantity: 'length' }],
  ['size', { word: 'Size' }],
  ['insideDiameterM', { word: 'Bore', quantity: 'diameter' }],
  ['roughnessM', { word: 'Roughness', quantity: 'roughness' }],
  ['fittings', { word: 'Fittings' }],
  ['lossCoefficient', { word: 'Further loss coefficient', quantity: 'factor' }],
  ['heatLossWM', { word: 'Heat loss', quantity: 'heatLossPerLength' }],
  ['checkValve', { word: 'Check valve' }],
  ['route', { word: 'Route' }],
  ['capacity', { word: 'Capacity' }],
  ['differentialPa', { word: 'at', quantity: 'pressureDifference' }],
  ['orificeDiameterM', { word: 'Orifice', quantity: 'diameter' }],
  ['maximumDifferentialPa', { word: 'Greatest differential', quantity: 'pressureDifference' }],
  ['bodyPressurePa', { word: 'Body rated to', quantity: 'pressure' }],
  ['bodyTemperatureK', { word: 'Body rated to', quantity: 'temperature' }],
  ['maximumBackPressureFraction', { word: 'Greatest back pressure', quantity: 'fraction' }],
  ['loadFactor', { word: 'Load', quantity: 'fraction' }],
  ['inletPressureFactor', { word: 'Inlet pressure', quantity: 'fraction' }],
  ['state', { word: 'State' }],
  ['node', { word: 'Stands at' }],
  ['pipe', { word: 'Stands on' }],
  ['distanceM', { word: 'Distance along the pipe', quantity: 'length' }],
  ['waterLeg', { word: 'Water leg' }],
  ['rangeLowPa', { word: 'Range from', quantity: 'gaugePressure' }],
  ['rangeHighPa', { word: 'Range to', quantity: 'gaugePressure' }],
  ['accuracy', { word: 'Accuracy, of the span', quantity: 'fraction' }],
  ['resolutionPa', { word: 'Resolution', quantity: 'pressureDifference' }],
  ['calibratedOn', { word: 'Calibrated on' }],
  ['calibrationDueOn', { word: 'Calibration due on' }],
  ['retired', { word: 'Retired' }],
  ['staticLift', { word: 'Static lift' }],
  ['liftRulePaM', { word: 'Rule of lift', quantity: 'pressurePerRise' }],
  ['dropCredit', { word: 'Credit for falls', quantity: 'fraction' }],
  ['friction', { word: 'Friction' }],
  ['voidFraction', { word: 'Void fraction' }],
  ['coincidence', { word: 'Intermittent traps' }],
  ['acceleration', { word: 'Acceleration' }],
  ['atmosphericPressurePa', { word: 'Atmospheric pressure', quantity: 'absolutePressure' }],
  ['ambientTemperatureK', { word: 'Ambient temperature', quantity: 'temperature' }],
  ['site', { word: 'Site conditions' }],
  ['method', { word: 'Method' }],
  ['limits', { word: 'Limits' }],
]);

/** What people call a property. */
export function propertyWord(key: string): string {
  return PROPERTIES.get(key)?.word ?? spaced(key);
}

/** A value of a property in words, numbers in the person's units; what is made of parts is spelled out. */
export function valueWords(key: string, value: unknown, units: DisplayUnits): string {
  if (value === undefined || value === null) return 'Not given';
  if (typeof value === 'boolean') return value ? 'Yes' : 'No';
  if (typeof value === 'number') {
    const quantity = PROPERTIES.get(key)?.quantity;
    return quantity === undefined ? String(value) : formatQuantity(value, quantity, units, { withUnit: true });
  }
  if (typeof value === 'string') return wordOf(key, value);
  if (Array.isArray(value)) {
    return value.length === 0 ? 'None' : value.map((part) => valueWords(key, part, units)).join('; ');
  }
  return isObject(value) ? partsWords(value, units) : '';
}

function partsWords(value: Readonly<Record<string, unknown>>, units: DisplayUnits): string {
  return Object.entries(value)
    .filter(([key, part]) => key !== 'id' && part !== undefined)
    .map(([key, part]) => `${propertyWord(key).toLowerCase()} ${valueWords(key, part, units)}`)
    .join(', ');
}

function wordOf(key: string, value: string): string {
  const words: Readonly<Record<string, string>> =
    key === 'kind' ? KIND_WORDS : key === 'trapType' ? TRAP_TYPE_WORDS : {};
  const known = words[value];
  if (known !== undefined) return known;
  return CODED.has(key) ? spaced(value) : value;
}

/** Keys whose values are codes rather than what a person typed. */
const CODED = new Set([
  'kind',
  'control',
  'discharge',
  'state',
  'friction',
  'staticLift',
  'voidFraction',
  'coincidence',
]);

/** varyingInlet as "varying inlet". */
function spaced(code: string): string {
  return code.replaceAll(
    /([a-z])([A-Z])/g,
    (_all, before: string, after: string) => `${before} ${after.toLowerCase()}`,
  );
}
