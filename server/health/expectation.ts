import { type CycleConstants, calibrateCycle, ramCycle } from '../hydraulics/ram-cycle';
import type { Expectation, Observable, SpanFigures } from '../shapes/figure';
import type { Installation } from '../shapes/installation';
import { lagOneCorrelation, longRunFactor } from '../statistics/autocorrelation';
import { median, robustSpread } from '../statistics/robust';
import { charted, observables, witnessed } from './observables';
import type { Regime } from './set-up-span';

/** Wave speed where the pipe's own is of no matter: only the recoil depends on it, weakly. */
const WAVE_SPEED_M_PER_S = { stiff: 1350, plastic: 400 };

/** What one observable was over the set-up span, and how it is expected to follow the fall. */
interface Baseline {
  /** Logarithm of the set-up span's median ratio of measured to theory. */
  centre: number;
  /** Exponent of the fall beyond what theory gives, learnt from the span where its falls differ. */
  exponent: number;
  exponent_u: number;
  /** Scatter of single days about the expectation, and that of a lasting shift (the days lean on one another). */
  day_sd: number;
  lasting_sd: number;
}

export interface RegimeModel {
  regime: Regime;
  fall_m: number;
  lift_m: number;
  /** Head that the delivery pipe took over the set-up span: what the chamber stood above the lift. */
  friction_m: number;
  /** Null where theory has no beat with these figures; then beats go with the fall. */
  constants: CycleConstants | null;
  baselines: Partial<Record<Observable, Baseline>>;
}

/** Learns from a set-up span what the ram does: theory calibrated on its medians, then centred, observable by observable. */
export function learn(days: readonly SpanFigures[], regime: Regime, installation: Installation): RegimeModel | null {
  const span = regime.baseline.map((d) => days[d]!);
  const middle = (pick: (day: SpanFigures) => number | null) => {
    const values = span.map(pick).filter((value): value is number => value !== null);
    return values.length > 0 ? median(values) : null;
  };
  const fall_m = middle((day) => day.fall_m?.value ?? null);
  const beats = middle((day) => witnessed(day, 'beats_per_min'));
  if (fall_m === null || fall_m <= 0) return null;
  const lift_m = installation.lift_m;
  const told = (pick: (day: SpanFigures) => SpanFigures['waste_l_per_beat']) =>
    middle((day) => (pick(day)?.footing === 'from theory' ? null : (pick(day)?.value ?? null)));
  const constants =
    beats === null || lift_m <= fall_m
      ? null
      : calibrateCycle(
          installation.drive_pipe,
          {
            fall_m,
            lift_m,
            beats_per_min: beats,
            waste_l_per_beat: told((day) => day.waste_l_per_beat),
            delivered_l_per_beat: told((day) => day.delivered_l_per_beat),
          },
          installation.drive_pipe.material === 'PVC-U' || installation.drive_pipe.material === 'HDPE'
            ? WAVE_SPEED_M_PER_S.plastic
            : WAVE_SPEED_M_PER_S.stiff,
        );
  const head_m = middle((day) => witnessed(day, 'chamber_head_m'));
  const friction_m = head_m === null ? 0 : Math.max(0, head_m - lift_m);
  const model: RegimeModel = { regime, fall_m, lift_m, friction_m, constants, baselines: {} };
  for (const observable of observables) {
    const baseline = baselineOf(span, observable, model, installation);
    if (baseline !== null) model.baselines[observable] = baseline;
  }
  return model;
}

function baselineOf(
  span: readonly SpanFigures[],
  observable: Observable,
  model: RegimeModel,
  installation: Installation,
): Baseline | null {
  const points = span.flatMap((day) => {
    const value = witnessed(day, observable);
    const theory = theoryAt(observable, day.fall_m?.value ?? model.fall_m, model, installation);
    return value === null || theory === null
      ? []
      : [{ ratio: Math.log(value / theory), fall: Math.log((day.fall_m?.value ?? model.fall_m) / model.fall_m) }];
  });
  if (points.length < Math.max(5, span.length / 3)) return null;
  const { floor, exponent_u } = charted[observable];
  const centre = median(points.map((p) => p.ratio));
  const scatter = Math.max(floor, robustSpread(points.map((p) => p.ratio)));
  // the exponent by ridge regression: the theory's own is the prior, and gives way as far as the span's falls differ
  const falls = median(points.map((p) => p.fall));
  const weight = points.reduce((sum, p) => sum + ((p.fall - falls) / scatter) ** 2, 0);
  const pull = points.reduce((sum, p) => sum + ((p.fall - falls) * (p.ratio - centre)) / scatter ** 2, 0);
  const prior = exponent_u > 0 ? 1 / exponent_u ** 2 : Number.POSITIVE_INFINITY;
  const exponent = Number.isFinite(prior) ? pull / (weight + prior) : 0;
  const rest = points.map((p) => p.ratio - centre - exponent * (p.fall - falls));
  const day_sd = Math.max(floor, robustSpread(rest));
  const recentre = centre + median(rest) - exponent * falls;
  const lean = longRunFactor(lagOneCorrelation(rest));
  return {
    centre: recentre,
    exponent,
    exponent_u: Number.isFinite(prior) ? 1 / Math.sqrt(weight + prior) : 0,
    day_sd,
    lasting_sd: day_sd * lean * Math.sqrt(1 + 1 / points.length),
  };
}

/** What theory alone gives for an observable at a fall; 1 where it says nothing and the set-up span's own level is expected. */
function theoryAt(
  observable: Observable,
  fall_m: number,
  model: RegimeModel,
  installation: Installation,
): number | null {
  const { constants, lift_m, friction_m, fall_m: usual_m } = model;
  if (observable === 'chamber_ripple_kpa' || observable === 'tank_against_meter') return 1;
  if (fall_m <= 0 || fall_m >= lift_m) return null;
  const cycle = constants === null ? null : ramCycle(installation.drive_pipe, { fall_m, lift_m }, constants);
  if (cycle === null) {
    if (constants !== null) return null;
    const share = fall_m / usual_m;
    return observable === 'beats_per_min' || observable === 'delivery_l_per_day'
      ? share
      : observable === 'waste_l_per_beat'
        ? 1 / share
        : 1;
  }
  if (observable === 'delivery_l_per_day') return cycle.delivery_lps * 86_400;
  if (observable === 'chamber_head_m')
    return lift_m + friction_m * (cycle.delivery_lps / usualDelivery(model, installation)) ** FRICTION_POWER;
  return cycle[observable];
}

/** Friction in a delivery pipe between smooth (1.75) and rough (2) turbulent flow. */
const FRICTION_POWER = 1.85;

function usualDelivery({ constants, fall_m, lift_m }: RegimeModel, installation: Installation): number {
  return ramCycle(installation.drive_pipe, { fall_m, lift_m }, constants!)?.delivery_lps ?? Number.NaN;
}

export interface Due {
  /** Logarithm of what is expected. */
  log: number;
  /** Standard deviation of a single day about it, and of a lasting shift. */
  day_sd: number;
  lasting_sd: number;
  /** The doubt of the theory at this fall alone. */
  theory_sd: number;
}

/** How far a fall that nobody measures may lie from the stated one, as a standard error of its logarithm (common practice, no source). */
const UNSEEN_FALL_U = 0.08;

/** How an observable goes with the fall when nothing else changes: exponents of the reference's model of two rams (8.2). */
const fallExponent: Partial<Record<Observable, number>> = {
  beats_per_min: 1,
  delivery_l_per_day: 1.05,
  waste_l_per_beat: 0.95,
  delivered_l_per_beat: 0.08,
  chamber_head_m: 0.08,
};

/** What is expected of an observable on a day; null where nothing is. */
export function dueOn(
  day: SpanFigures,
  observable: Observable,
  model: RegimeModel,
  installation: Installation,
): Due | null {
  const baseline = model.baselines[observable];
  const fall_m = day.fall_m?.value ?? model.fall_m;
  const theory = theoryAt(observable, fall_m, model, installation);
  if (baseline === undefined || theory === null) return null;
  const fall = Math.log(fall_m / model.fall_m);
  const unseen = day.fall_m?.footing === 'metered' ? 0 : UNSEEN_FALL_U * (fallExponent[observable] ?? 0);
  const theory_sd = Math.hypot(fall * baseline.exponent_u, unseen);
  return {
    log: Math.log(theory) + baseline.centre + baseline.exponent * fall,
    day_sd: Math.hypot(baseline.day_sd, theory_sd),
    lasting_sd: Math.hypot(baseline.lasting_sd, theory_sd),
    theory_sd,
  };
}

/** The expectation as shown: value and 95 % interval. */
export function shownExpectation(due: Due): Expectation {
  return {
    value: Math.exp(due.log),
    low: Math.exp(due.log - 1.96 * due.day_sd),
    high: Math.exp(due.log + 1.96 * due.day_sd),
  };
}
