/*
 * Thin-plate V-notch weir, fully contracted: flow from head by Kindsvater and Shen, as in ISO 1438 and the water measurement manual
 * of the US Bureau of Reclamation, chapter 7. Coefficients from memory; checks in test/published/weir.test.ts.
 */
import { requireNotNegative } from './impossible';
import { GRAVITY } from './water';

/** Full notch angle in degrees, discharge coefficient, and the small head added for viscosity and surface tension in mm. */
const coefficients: readonly (readonly [number, number, number])[] = [
  [20, 0.5921, 2.72],
  [28, 0.5875, 2.24],
  [45, 0.5802, 1.5],
  [60, 0.5767, 1.127],
  [75, 0.5759, 0.943],
  [90, 0.578, 0.85],
  [100, 0.5808, 0.85],
];
const NARROWEST_DEG = 20;
const WIDEST_DEG = 100;
/** ISO 1438 and the Bureau of Reclamation (0.2 ft): below it the nappe clings to the plate. */
const LEAST_HEAD_M = 0.06;
/** Bureau of Reclamation, fully contracted notches: 1.25 ft. */
const MOST_HEAD_M = 0.381;

/** Flow in L/s = factor × (head + added)^2.5, head and added in m. */
function law(notch_deg: number): { factor: number; added_m: number } {
  if (!(notch_deg >= NARROWEST_DEG && notch_deg <= WIDEST_DEG))
    throw new RangeError(`a notch of ${notch_deg} degrees; ${NARROWEST_DEG} to ${WIDEST_DEG} was expected`);
  const i = Math.max(
    1,
    coefficients.findIndex(([angle]) => angle >= notch_deg),
  );
  const [left, right] = [coefficients[i - 1]!, coefficients[i]!];
  const share = (notch_deg - left[0]) / (right[0] - left[0]);
  const discharge = left[1] + share * (right[1] - left[1]);
  const added_mm = left[2] + share * (right[2] - left[2]);
  const half = (notch_deg / 2) * (Math.PI / 180);
  return {
    factor: 1000 * (8 / 15) * discharge * Math.sqrt(2 * GRAVITY) * Math.tan(half),
    added_m: added_mm / 1000,
  };
}

/**
 * Flow over a V-notch, L/s, from the head over its vertex, m, measured upstream, and the full notch angle, degrees. 0 at no head.
 * Outside the limits of use (`vNotchLimits`) the formula is still evaluated.
 * Throws RangeError for a negative head, NaN or a notch outside 20 to 100 degrees.
 */
export function vNotchFlow_lps(head_m: number, notch_deg: number): number {
  requireNotNegative(head_m, 'a head over the weir', 'm');
  const { factor, added_m } = law(notch_deg);
  return head_m === 0 ? 0 : factor * (head_m + added_m) ** 2.5;
}

/** Head over the vertex that a flow needs, m: the inverse of `vNotchFlow_lps`, 0 for flows too small to stand over the vertex. Same errors. */
export function vNotchHead_m(flow_lps: number, notch_deg: number): number {
  requireNotNegative(flow_lps, 'a flow over the weir', 'L/s');
  const { factor, added_m } = law(notch_deg);
  return Math.max(0, (flow_lps / factor) ** 0.4 - added_m);
}

/** How much the flow changes with the head, L/s per m: times the doubt of the head it gives the doubt of the flow. Same errors. */
export function vNotchSlope_lps_per_m(head_m: number, notch_deg: number): number {
  requireNotNegative(head_m, 'a head over the weir', 'm');
  const { factor, added_m } = law(notch_deg);
  return 2.5 * factor * (head_m + added_m) ** 1.5;
}

/** The limits of use that a head breaks, as sentences; none where the formula holds. Same errors as `vNotchFlow_lps`. */
export function vNotchLimits(head_m: number, notch_deg: number): string[] {
  requireNotNegative(head_m, 'a head over the weir', 'm');
  law(notch_deg);
  const broken: string[] = [];
  if (head_m < LEAST_HEAD_M)
    broken.push(
      `the head is ${head_m} m; below ${LEAST_HEAD_M} m the water clings to the plate and the flow reads wrong`,
    );
  if (head_m > MOST_HEAD_M)
    broken.push(`the head is ${head_m} m; above ${MOST_HEAD_M} m the formula is not established`);
  return broken;
}
