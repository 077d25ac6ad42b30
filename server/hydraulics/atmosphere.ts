const SEA_LEVEL_KPA = 101.325;
const SEA_LEVEL_K = 288.15;
const LAPSE_K_PER_M = 0.0065;
/** g·M/(R·lapse) of the standard atmosphere. */
const EXPONENT = 5.25588;

/**
 * Air pressure of the standard atmosphere at an altitude, kPa absolute. Weather moves the real one by 2 to 3 kPa, 0.3 m of water.
 * Throws RangeError outside −1000 to 11 000 m, the lowest layer.
 * Source: ISO 2533 and US Standard Atmosphere 1976 (from memory); altitude is taken as geopotential, 0.1 % apart at 6000 m.
 */
export function standardAtmosphere_kpa(altitude_m: number): number {
  if (!(altitude_m >= -1000 && altitude_m <= 11_000))
    throw new RangeError(`an altitude of ${altitude_m} m; -1000 to 11000 m was expected`);
  return SEA_LEVEL_KPA * (1 - (LAPSE_K_PER_M * altitude_m) / SEA_LEVEL_K) ** EXPONENT;
}
