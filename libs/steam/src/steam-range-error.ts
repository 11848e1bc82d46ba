export type SteamQuantity = 'pressure' | 'temperature' | 'enthalpy' | 'density';

const UNITS: Readonly<Record<SteamQuantity, string>> = {
  pressure: 'Pa',
  temperature: 'K',
  enthalpy: 'J/kg',
  density: 'kg/m³',
};

/** A state outside what the equations are used for here. Callers add which element of the network it stands at. */
export class SteamRangeError extends Error {
  override readonly name = 'SteamRangeError';

  /**
   * @param quantity what lies outside
   * @param value in Pa absolute, K, J/kg or kg/m³; may be NaN
   * @param low least value allowed
   * @param high greatest value allowed; depends on the pressure for an enthalpy or a boiling liquid's temperature
   * @param subject what the limits hold for, as in "pressure of boiling water"
   */
  constructor(
    readonly quantity: SteamQuantity,
    readonly value: number,
    readonly low: number,
    readonly high: number,
    subject: string,
  ) {
    const unit = UNITS[quantity];
    super(
      `The ${quantity} of ${subject} is ${told(value, low, high)} ${unit}; it must lie between ${sixDigits(low)} and ${sixDigits(high)} ${unit}.`,
    );
  }
}

/** Limits that depend on the pressure come with all their bits; nobody reads more than six digits of them. */
function sixDigits(limit: number): number {
  return Number(limit.toPrecision(6));
}

/** A value that misses its limit by a rounding of arithmetic would else read as if it kept it. */
function told(value: number, low: number, high: number): string {
  const shown = Number(value.toPrecision(9));
  return shown === low || shown === high ? `just beyond ${String(shown)}` : String(shown);
}

/** Refuses NaN too: every comparison with it is false. */
export function requireWithin(
  quantity: SteamQuantity,
  value: number,
  range: readonly [number, number],
  subject: string,
): void {
  if (!(value >= range[0] && value <= range[1]))
    throw new SteamRangeError(quantity, value, range[0], range[1], subject);
}
