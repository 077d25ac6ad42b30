import type { SpanFigures } from '../shapes/figure';
import { deriveFigures, type Knowledge } from './derive';
import { COVERAGE_95, type Measured } from './measured';
import type { Observation } from './observation';

/** Litres per beat are carried to days without a delivery of their own from this many measured days before. */
const RECENT_DAYS = 30;

/** Figures of every observed day, in order: what meter or tank told of late carries the days on which neither tells. */
export function figuresOfDays(
  days: readonly Observation[],
  known: Omit<Knowledge, 'recent_delivered_l_per_beat'>,
): SpanFigures[] {
  const recent: { value: number; share: number }[] = [];
  return days.map((day) => {
    const figures = deriveFigures(day, { ...known, recent_delivered_l_per_beat: carried(recent) });
    const perBeat = figures.delivered_l_per_beat;
    if (perBeat !== null && (perBeat.footing === 'metered' || perBeat.footing === 'from tank') && perBeat.value > 0) {
      recent.push({ value: perBeat.value, share: (perBeat.high - perBeat.value) / COVERAGE_95 / perBeat.value });
      if (recent.length > RECENT_DAYS) recent.shift();
    }
    return figures;
  });
}

/** The median of the recent litres per beat, as sure as a usual day of them. */
export function carried(recent: readonly { value: number; share: number }[]): Measured | null {
  if (recent.length < 3) return null;
  const middle = (values: number[]) => values.sort((a, b) => a - b)[values.length >> 1]!;
  const value = middle(recent.map((one) => one.value));
  const scatter = 1.4826 * middle(recent.map((one) => Math.abs(one.value - value)));
  return {
    value,
    u: Math.hypot(scatter, value * middle(recent.map((one) => one.share))),
    by: 'the litres per beat of the days before',
  };
}
