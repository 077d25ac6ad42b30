import type { Figure, Observable, SpanFigures } from '../shapes/figure';

/** How an observable is charted: its least believable scatter, and the sizes (as logarithms) from which a departure is told. */
export interface Charting {
  /** Standard deviation below which a chart would only watch the model's own errors. */
  floor: number;
  watch: number;
  plan: number;
  go: number;
  /** Directions that mean something by themselves; more water than expected is no fault unless something else moves too. */
  directions: readonly (-1 | 1)[];
  /** How far the theory's dependence on the fall may be off, as a standard error of its exponent. */
  exponent_u: number;
}

const both = [-1, 1] as const;
const down = [-1] as const;
const usual = { watch: Math.log(1.06), plan: Math.log(1.1), go: Math.log(1.33) };

/** The observables that are charted. Sizes: own choice after the effect that a bucket test can still confirm, about 5 %. */
export const charted: Record<Observable, Charting> = {
  beats_per_min: { floor: 0.012, directions: both, exponent_u: 0.12, ...usual },
  delivered_l_per_beat: { floor: 0.02, directions: down, exponent_u: 0.1, ...usual },
  waste_l_per_beat: { floor: 0.02, directions: both, exponent_u: 0.12, ...usual },
  delivery_l_per_day: { floor: 0.02, directions: down, exponent_u: 0.15, ...usual },
  chamber_head_m: {
    floor: 0.008,
    directions: both,
    exponent_u: 0.02,
    watch: Math.log(1.03),
    plan: Math.log(1.06),
    go: Math.log(1.3),
  },
  chamber_ripple_kpa: {
    floor: 0.06,
    directions: both,
    exponent_u: 0.3,
    watch: Math.log(1.3),
    plan: Math.log(2),
    go: Math.log(4),
  },
  tank_against_meter: { floor: 0.03, directions: down, exponent_u: 0, ...usual },
};

export const observables = Object.keys(charted) as Observable[];

/** Litres carried over from a bucket or from theory repeat what was expected: only a meter or the tank is a witness. */
const isWitness = (figure: Figure | null): figure is Figure =>
  figure !== null && (figure.footing === 'metered' || figure.footing === 'from tank');

/** A day's value of an observable, where the sensors are a witness of it and it is above nothing. */
export function witnessed(day: SpanFigures, observable: Observable): number | null {
  const value = (figure: Figure | null) => (isWitness(figure) && figure.value > 0 ? figure.value : null);
  switch (observable) {
    case 'beats_per_min':
      return value(day.beats_per_min_running);
    case 'tank_against_meter': {
      const meter = day.delivery_l_per_day;
      const tank = day.tank_inflow_l_per_day;
      return meter?.footing === 'metered' && tank !== null && meter.value > 0 && tank.value > 0
        ? tank.value / meter.value
        : null;
    }
    default:
      return value(day[observable]);
  }
}

/** Litres a day that arrive at the tank, as far as a sensor is witness: the tank's own inflow where a meter sits at the ram. */
export function arriving(day: SpanFigures): number | null {
  if (day.delivery_l_per_day?.footing === 'metered' && day.tank_inflow_l_per_day !== null)
    return day.tank_inflow_l_per_day.value;
  return isWitness(day.delivery_l_per_day) ? day.delivery_l_per_day.value : null;
}
