import type { Installation } from '../server/shapes/installation';
import type { Random } from './random';

type Shape = NonNullable<Installation['tank']>;

/** Litres in the tank at a depth. */
export function litresAt(tank: Shape, depth_m: number): number {
  switch (tank.shape) {
    case 'upright cylinder':
      return (Math.PI / 4) * tank.diameter_m ** 2 * depth_m * 1000;
    case 'box':
      return tank.length_m * tank.width_m * depth_m * 1000;
    case 'lying cylinder': {
      const r = tank.diameter_m / 2;
      const y = Math.min(Math.max(depth_m, 0), 2 * r);
      const segment = r * r * Math.acos((r - y) / r) - (r - y) * Math.sqrt(Math.max(0, 2 * r * y - y * y));
      return segment * tank.length_m * 1000;
    }
    default:
      throw new Error(`no tank of shape ${tank.shape} in this valley`);
  }
}

/** Depth at a content, by halving. */
export function depthAt(tank: Shape, litres: number): number {
  let low = 0;
  let high = tank.overflow_m ?? 0;
  for (let i = 0; i < 40; i++) {
    const middle = (low + high) / 2;
    if (litresAt(tank, middle) < litres) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

const bump = (hour: number, at: number, width: number) => Math.exp(-(((hour - at) / width) ** 2) / 2);
const share = (hour: number) =>
  hour < 5 || hour >= 22 ? 0.004 : bump(hour, 7.2, 1.3) + 0.28 * bump(hour, 12.5, 2) + 0.95 * bump(hour, 18, 1.5);
const wholeDay = Array.from({ length: 96 }, (_, i) => share(i / 4) / 4).reduce((a, b) => a + b, 0);

/** People at the taps: a morning and an evening, less when the tank stood low at dawn. */
export class Demand {
  private today = 1;
  private dawn = 0.7;
  private mood = 0;
  constructor(
    private readonly random: Random,
    private readonly usual_l_per_day: number,
  ) {}

  newDay(filled: number): void {
    this.dawn = filled;
    this.mood = 0.6 * this.mood + 0.05 * this.random.normal();
    this.today = Math.max(0.3, 0.55 + 0.55 * this.dawn + this.mood);
  }

  /** Litres a second asked for at an hour of the day. */
  at(hour: number): number {
    return Math.max(
      0,
      ((this.usual_l_per_day * this.today * share(hour)) / wholeDay / 3600) * (1 + 0.15 * this.random.normal()),
    );
  }
}
