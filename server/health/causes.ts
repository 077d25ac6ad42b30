import type { Observable } from '../shapes/figure';
import type { Cause } from '../shapes/finding';
import type { Signature } from './signatures';

/** A measured shift of an observable's logarithm, with its standard error. */
export interface Shift {
  observable: Observable;
  size: number;
  u: number;
}

/** How far a signature's own shape may be off, as a share of each shift, and for what should not move at all. */
const SHAPE_DOUBT = 0.35;
const STILL_DOUBT = 0.015;
/** Severities tried, in steps of a quarter of a signature's own size, up to this many times it. */
const MOST_SEVERITY = 4;
/** A lone observable that moves while all it should drag along stands still may be its sensor. */
const SENSOR_PRIOR = 0.12;
const NOTHING_PRIOR = 0.05;
/** Likelihood of any pattern at all, for what the known causes do not explain: a spread of a third. */
const ANY_SPREAD = 0.33;
/** Causes less than this many times unlikelier than the first are not told apart from it. */
const TIE = 2.5;

/**
 * Ranks the causes by how well each explains the measured shifts, with the severity that suits it best. Delivery per day is left out where beats and
 * litres per beat are both there: it is their product and would count twice.
 */
export function rankCauses(
  measured: readonly Shift[],
  signatures: readonly Signature[],
): { causes: { cause: Cause; probability: number }[]; tied: Cause[] } {
  const has = (observable: Observable) => measured.some((shift) => shift.observable === observable);
  const shifts = measured.filter(
    (shift) => shift.observable !== 'delivery_l_per_day' || !(has('beats_per_min') && has('delivered_l_per_beat')),
  );
  const weights = new Map<Cause, number>();
  const add = (cause: Cause, logLikelihood: number, prior: number) => {
    const weight = logLikelihood + Math.log(prior);
    weights.set(cause, Math.max(weights.get(cause) ?? Number.NEGATIVE_INFINITY, weight));
  };
  for (const { cause, shifts: expected, prior } of signatures) {
    let best = Number.NEGATIVE_INFINITY;
    for (let severity = 0.25; severity <= MOST_SEVERITY; severity += 0.25)
      best = Math.max(
        best,
        logLikelihood(shifts, (observable) => (expected[observable] ?? 0) * severity),
      );
    if (shifts.some((shift) => Math.abs(expected[shift.observable] ?? 0) > 0.005)) add(cause, best, prior);
  }
  if (shifts.length > 1)
    for (const lone of shifts)
      add(
        'sensor in doubt',
        logLikelihood(shifts, (observable) => (observable === lone.observable ? lone.size : 0)),
        SENSOR_PRIOR,
      );
  add(
    'not told by these sensors',
    shifts.reduce((sum, { size, u }) => sum + gaussian(size, Math.hypot(u, ANY_SPREAD)), 0),
    NOTHING_PRIOR,
  );
  const most = Math.max(...weights.values());
  const total = [...weights.values()].reduce((sum, weight) => sum + Math.exp(weight - most), 0);
  const causes = [...weights]
    .map(([cause, weight]) => ({ cause, probability: Math.round((Math.exp(weight - most) / total) * 1000) / 1000 }))
    .sort((a, b) => b.probability - a.probability)
    .filter(({ probability }, i) => i < 2 || probability >= 0.02);
  const first = causes[0]!;
  const alike = causes.filter(({ probability }) => probability * TIE >= first.probability).map(({ cause }) => cause);
  return { causes, tied: alike.length > 1 ? alike : [] };
}

function logLikelihood(shifts: readonly Shift[], expected: (observable: Observable) => number): number {
  return shifts.reduce((sum, { observable, size, u }) => {
    const due = expected(observable);
    return sum + gaussian(size - due, Math.hypot(u, SHAPE_DOUBT * due, STILL_DOUBT));
  }, 0);
}

const gaussian = (off: number, sd: number): number => -0.5 * (off / sd) ** 2 - Math.log(sd);
