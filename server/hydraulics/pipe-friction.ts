import { requireNotNegative, requirePositive } from './impossible';
import { GRAVITY, WATER_VISCOSITY_M2_PER_S } from './water';

/** Above this Reynolds number flow in a pipe is taken as turbulent (the usual engineering limit). */
const LAMINAR_BELOW = 2300;

/** A pipe and what flows in it. */
export interface PipeFlow {
  length_m: number;
  bore_mm: number;
  flow_lps: number;
  /** Equivalent sand roughness of the wall, mm. */
  roughness_mm: number;
}

/**
 * Darcy friction factor (four times Fanning's), from the Reynolds number and the roughness as a share of the bore.
 * 64/Re below 2300; above it Swamee and Jain's explicit form, within 1 to 3 % of Colebrook for Re 5000 to 10^8.
 * Throws RangeError for a Reynolds number that is not above 0 or a roughness outside 0 to 0.1.
 * Source: Swamee and Jain, J. Hydraulics Div. ASCE 102 (1976), 657 (from memory).
 */
export function darcyFrictionFactor(reynolds: number, relative_roughness: number): number {
  if (!(reynolds > 0 && reynolds < Number.POSITIVE_INFINITY))
    throw new RangeError(`a Reynolds number of ${reynolds}; a number above 0 was expected`);
  if (!(relative_roughness >= 0 && relative_roughness <= 0.1))
    throw new RangeError(`a roughness of ${relative_roughness} of the bore; 0 to 0.1 was expected`);
  if (reynolds < LAMINAR_BELOW) return 64 / reynolds;
  return 0.25 / Math.log10(relative_roughness / 3.7 + 5.74 / reynolds ** 0.9) ** 2;
}

/**
 * Head lost to friction along a full pipe, m, by Darcy and Weisbach, for water at about 20 °C. 0 where nothing flows.
 * Bends, valves and entrance are not in it. Throws RangeError for a bore or length that is not above 0, or a negative flow.
 * Worked check in test/published/pipe-friction.test.ts.
 */
export function frictionHead_m({ length_m, bore_mm, flow_lps, roughness_mm }: PipeFlow): number {
  requirePositive(bore_mm, 'a bore', 'mm');
  requirePositive(length_m, 'a pipe length', 'm');
  requireNotNegative(flow_lps, 'a flow', 'L/s');
  if (flow_lps === 0) return 0;
  const bore_m = bore_mm / 1000;
  const velocity = flow_lps / 1000 / ((Math.PI / 4) * bore_m ** 2);
  const factor = darcyFrictionFactor((velocity * bore_m) / WATER_VISCOSITY_M2_PER_S, roughness_mm / bore_mm);
  return (factor * (length_m / bore_m) * velocity ** 2) / (2 * GRAVITY);
}
