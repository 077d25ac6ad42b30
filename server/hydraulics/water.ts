/** Water at ordinary pressure, and gravity: the constants every other file of this room takes its heads and waves from. */

/** Standard acceleration of free fall, m/s². Exact by convention (3rd CGPM, 1901). Real gravity differs by at most 0.3 %. */
export const GRAVITY = 9.80665;

/** Kinematic viscosity of water at 20 °C, m²/s (IAPWS value as tabulated in handbooks; from memory). */
export const WATER_VISCOSITY_M2_PER_S = 1.0035e-6;

const requireLiquid = (temperature_c: number): void => {
  if (!(temperature_c >= 0 && temperature_c <= 95))
    throw new RangeError(`a water temperature of ${temperature_c} °C; liquid water between 0 and 95 °C was expected`);
};

/**
 * Density of air-free water at 101.325 kPa, kg/m³, from its temperature in °C.
 * The formula is stated for 0 to 40 °C; up to 95 °C it stays within 0.1 % of steam tables, enough for heads.
 * Throws RangeError outside 0 to 95 °C.
 * Source: Tanaka et al., Metrologia 38 (2001), 301 (coefficients from memory, checked in test/published/water.test.ts).
 */
export function waterDensity(temperature_c: number): number {
  requireLiquid(temperature_c);
  const t = temperature_c;
  return 999.97495 * (1 - ((t - 3.983035) ** 2 * (t + 301.797)) / (522_528.9 * (t + 69.34881)));
}

/**
 * Speed of sound in water at 101.325 kPa, m/s, from its temperature in °C.
 * Throws RangeError outside 0 to 95 °C, the range of the formula.
 * Source: Marczak, J. Acoust. Soc. Am. 102 (1997), 2776 (coefficients from memory, checked in test/published/water.test.ts).
 */
export function soundSpeed(temperature_c: number): number {
  requireLiquid(temperature_c);
  const coefficients = [1402.385, 5.038813, -5.799136e-2, 3.287156e-4, -1.398845e-6, 2.78786e-9];
  return coefficients.reduceRight((sum, coefficient) => sum * temperature_c + coefficient, 0);
}
