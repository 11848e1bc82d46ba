/**
 * The defined quantities every US customary factor is built from, in SI. Exact by definition except the two marked "conventional",
 * which are fixed by convention to the printed digits.
 *
 * Source: NIST Special Publication 811 (2008), Appendix B.8 and B.9.
 */
export const POUND_KG = 0.45359237;
export const INCH_M = 0.0254;
export const FOOT_M = 0.3048;
/** Standard acceleration of free fall, g_n [m/s²]. */
export const STANDARD_GRAVITY_M_S2 = 9.80665;
/** International Table British thermal unit: 1 Btu/lb is 2326 J/kg exactly. */
export const BTU_J = 2326 * POUND_KG;
/** Pound-force per square inch: lb · g_n / in², 6894.757293168… Pa. */
export const PSI_PA = (POUND_KG * STANDARD_GRAVITY_M_S2) / (INCH_M * INCH_M);
/** Conventional inch of mercury. */
export const INCH_OF_MERCURY_PA = 3386.389;
/** Conventional inch of water (1000 kg/m³, g_n, rounded as printed). */
export const INCH_OF_WATER_PA = 249.0889;
/** Conventional foot of water, as printed. */
export const FOOT_OF_WATER_PA = 2989.067;
/** Standard atmosphere over 760. */
export const TORR_PA = 101_325 / 760;
/** Kilogram-force per square centimetre. */
export const KGF_PER_CM2_PA = STANDARD_GRAVITY_M_S2 * 1e4;
/** Seconds in an hour and a minute. */
export const HOUR_S = 3600;
export const MINUTE_S = 60;
/** Kelvin per degree Fahrenheit or Rankine. */
export const RANKINE_K = 5 / 9;
/** 0 °C on the kelvin scale, and the distance from absolute zero to 0 °F in °F. */
export const ICE_POINT_K = 273.15;
export const FAHRENHEIT_ZERO_R = 459.67;
