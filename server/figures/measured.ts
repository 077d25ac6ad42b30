import type { Figure, Footing } from '../shapes/figure';

/**
 * A quantity with its standard uncertainty and the name of the input that contributes most to it. The sensors' accuracies
 * are taken as systematic: averaging many readings does not shrink them.
 */
export interface Measured {
  value: number;
  /** Standard uncertainty, in the unit of the value. */
  u: number;
  /** What dominates the uncertainty, in words. */
  by: string;
}

/** Half-width of a 95 % interval in standard uncertainties, normal distribution (GUM, JCGM 100:2008, table G.1). */
export const COVERAGE_95 = 1.96;

/** An accuracy stated as plus or minus at 95 %. */
export const fromAccuracy = (value: number, accuracy: number, by: string): Measured => ({
  value,
  u: accuracy / COVERAGE_95,
  by,
});

/**
 * First-order propagation through any function of independent inputs (GUM, JCGM 100:2008, 5.1.2), with the sensitivities taken
 * numerically over one standard uncertainty to either side (5.1.3, note 2). Null where the function has no value there.
 */
export function propagate(inputs: readonly Measured[], law: (...values: number[]) => number | null): Measured | null {
  const values = inputs.map((input) => input.value);
  const value = law(...values);
  if (value === null || !Number.isFinite(value)) return null;
  let variance = 0;
  let most = 0;
  let by = '';
  for (const [i, input] of inputs.entries()) {
    if (input.u === 0) continue;
    const at = (shift: number) => law(...values.map((v, k) => (k === i ? v + shift : v))) ?? value;
    const part = (at(input.u) - at(-input.u)) / 2;
    variance += part * part;
    if (Math.abs(part) > most) {
      most = Math.abs(part);
      by = input.by;
    }
  }
  return { value, u: Math.sqrt(variance), by };
}

/** A figure as shown: value, 95 % interval (not below 0 for what cannot be negative), footing, dominating input. */
export function asFigure(measured: Measured | null, footing: Footing, factor = 1): Figure | null {
  if (measured === null) return null;
  const value = measured.value * factor;
  const reach = COVERAGE_95 * measured.u * Math.abs(factor);
  return {
    value,
    low: value >= 0 ? Math.max(0, value - reach) : value - reach,
    high: value + reach,
    footing,
    dominated_by: measured.by,
  };
}
