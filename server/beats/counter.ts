/** No ram beats faster: a step that would need more is not believed. Rams beat 20 to 150 times a minute at the extremes. */
export const MOST_BEATS_PER_MIN = 150;

/** Sizes at which counters roll over: four to six decimal digits, and two to four bytes. */
const usualModuli = [10_000, 65_536, 100_000, 1_000_000, 16_777_216, 4_294_967_296];

export interface CounterEvent {
  index: number;
  kind: 'roll-over' | 'reset' | 'returned to an older value' | 'too fast';
}

/**
 * Beats in the interval ending at each reading of a running counter; NaN where unknown. A counter that falls has rolled over if
 * a modulus (stated, or a usual one not far above the last count) gives a step that a ram can beat; otherwise it was reset or returned to an
 * older saved value, and the step is a gap: never negative, never a spike. Where readings between are missing, the step is
 * spread over them by time.
 *
 * @param times_ms rising; @param counts NaN where missing; @param options rolls_over_at the count at which it starts again from 0
 */
export function readCounter(
  times_ms: Float64Array,
  counts: Float64Array,
  options: { rolls_over_at?: number | undefined },
): { beats: Float64Array; events: CounterEvent[] } {
  const beats = new Float64Array(counts.length).fill(Number.NaN);
  const events: CounterEvent[] = [];
  const moduli = options.rolls_over_at === undefined ? usualModuli : [options.rolls_over_at];
  let last = -1;
  let highest = 0;
  for (let i = 0; i < counts.length; i++) {
    const now = counts[i]!;
    if (Number.isNaN(now)) continue;
    if (last >= 0) {
      const before = counts[last]!;
      const elapsed_ms = times_ms[i]! - times_ms[last]!;
      // one beat more than the rate allows: both ends of an interval may catch one
      const most = (MOST_BEATS_PER_MIN * elapsed_ms) / 60_000 + 1;
      let step = now - before;
      if (step < 0) {
        const modulus = moduli.find(
          (one) =>
            before < one && now + one - before <= most && (options.rolls_over_at !== undefined || one - before <= most),
        );
        if (modulus !== undefined) {
          step += modulus;
          events.push({ index: i, kind: 'roll-over' });
        } else events.push({ index: i, kind: now > most && now < highest ? 'returned to an older value' : 'reset' });
      } else if (step > most) events.push({ index: i, kind: 'too fast' });
      if (step >= 0 && step <= most) {
        if (i === last + 1) beats[i] = step;
        else for (let k = last + 1; k <= i; k++) beats[k] = (step * (times_ms[k]! - times_ms[k - 1]!)) / elapsed_ms;
      }
    }
    if (now > highest) highest = now;
    last = i;
  }
  return { beats, events };
}
