/** Flows and heads of a running ram. Heads are heights above the waste valve outlet, not above the source. */
export interface RamFlow {
  delivery_lps: number;
  /** Water lost at the waste valve; all that comes down the drive pipe is waste and delivery together. */
  waste_lps: number;
  fall_m: number;
  lift_m: number;
}

const isPossible = ({ delivery_lps, waste_lps, fall_m, lift_m }: RamFlow): boolean =>
  delivery_lps >= 0 && waste_lps >= 0 && fall_m > 0 && lift_m > 0 && Number.isFinite(delivery_lps + waste_lps + lift_m);

/**
 * D'Aubuisson efficiency: energy of the delivered water over energy of all the water supplied, q·h / ((Q + q)·H).
 *
 * Above 1 is no ram but a wrong input (waste taken for drive flow, a head from the wrong datum) and is returned for the caller to
 * see. Null where no water is supplied, a flow is negative, a head is not above 0, or any is not a number.
 * Source: D'Aubuisson's definition as in hydraulics textbooks; worked checks in test/published/efficiency.test.ts.
 */
export function efficiencyDAubuisson(flow: RamFlow): number | null {
  const supplied = (flow.waste_lps + flow.delivery_lps) * flow.fall_m;
  return isPossible(flow) && supplied > 0 ? (flow.delivery_lps * flow.lift_m) / supplied : null;
}

/**
 * Rankine efficiency: net lift of the delivered water over energy of the wasted water, q·(h − H) / (Q·H).
 * Never above D'Aubuisson's while that is below 1.
 *
 * Null where nothing is wasted, the lift is below the fall, a flow is negative, a head is not above 0, or any is not a number.
 * Source: Rankine's definition as in hydraulics textbooks; worked checks in test/published/efficiency.test.ts.
 */
export function efficiencyRankine(flow: RamFlow): number | null {
  const { delivery_lps, waste_lps, fall_m, lift_m } = flow;
  const driven = waste_lps * fall_m;
  return isPossible(flow) && driven > 0 && lift_m >= fall_m ? (delivery_lps * (lift_m - fall_m)) / driven : null;
}
