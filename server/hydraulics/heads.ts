import { requireNumber, requirePositive } from './impossible';
import { GRAVITY } from './water';

/** Height of a column of water that exerts a pressure, m, at a density in kg/m³ and standard gravity. Throws RangeError on NaN or a density not above 0. */
export function headOfPressure_m(pressure_kpa: number, density_kg_per_m3: number): number {
  requireNumber(pressure_kpa, 'a pressure', 'kPa');
  requirePositive(density_kg_per_m3, 'a density', 'kg/m³');
  return (pressure_kpa * 1000) / (density_kg_per_m3 * GRAVITY);
}

/** Pressure under a column of water of a height, kPa, at a density in kg/m³ and standard gravity. Throws RangeError on NaN or a density not above 0. */
export function pressureOfHead_kpa(head_m: number, density_kg_per_m3: number): number {
  requireNumber(head_m, 'a head', 'm');
  requirePositive(density_kg_per_m3, 'a density', 'kg/m³');
  return (head_m * density_kg_per_m3 * GRAVITY) / 1000;
}

/**
 * Gauge pressure from an absolute one, kPa: less the air's, from a barometer or `standardAtmosphere_kpa`.
 * Below 0 is a suction and is returned as such. Throws RangeError on a pressure below 0 or NaN.
 */
export function gaugeOfAbsolute_kpa(absolute_kpa: number, air_kpa: number): number {
  if (!(absolute_kpa >= 0 && absolute_kpa < Number.POSITIVE_INFINITY))
    throw new RangeError(`an absolute pressure of ${absolute_kpa} kPa; 0 or more was expected`);
  requirePositive(air_kpa, 'an air pressure', 'kPa');
  return absolute_kpa - air_kpa;
}
