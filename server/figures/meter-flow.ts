import type { ChannelName } from '../shapes/channel';
import type { Installation } from '../shapes/installation';
import { fromAccuracy, type Measured } from './measured';
import { accuracyOf, sensorOf } from './sensors';
import { meansOf, type Series, type Span, shareOut } from './spans';

/** No ram's delivery is believed above this; a larger step of a meter is a replaced register or a slip, not water. */
const MOST_LPS = 100;

/** Delivery by a meter in each span, L/s: from a running total (litres) where there is one, else from a flow. */
export function meterFlow(
  volume: Series | undefined,
  flow: Series | undefined,
  spans: readonly Span[],
  installation: Installation,
): (Measured | null)[] {
  if (volume !== undefined) {
    const steps = meterSteps(volume, sensorOf(installation, 'delivery_volume')?.rolls_over_at ?? null);
    const { amount, known_ms } = shareOut(volume.times_ms, steps, spans);
    return spans.map((_, s) => {
      if (known_ms[s]! <= 0) return null;
      const value = (amount[s]! / known_ms[s]!) * 1000;
      return fromAccuracy(value, registerAccuracy(value, known_ms[s]! / 1000, installation), 'the delivery meter');
    });
  }
  return meansOf(flow, spans).map((value) =>
    value === null ? null : fromAccuracy(value, accuracyOf(installation, 'delivery_flow', value), 'the delivery meter'),
  );
}

/** Litres through the meter in the interval ending at each record. A register that falls gives a gap, never a negative or a spike. */
function meterSteps({ times_ms, values }: Series, rolls_over_at: number | null): Float64Array {
  const steps = new Float64Array(values.length).fill(Number.NaN);
  let last = -1;
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i]!)) continue;
    if (last >= 0) {
      let step = values[i]! - values[last]!;
      if (step < 0 && rolls_over_at !== null) step += rolls_over_at;
      const most = (MOST_LPS * (times_ms[i]! - times_ms[last]!)) / 1000;
      if (step >= 0 && step <= most) spread(steps, times_ms, last, i, step);
    }
    last = i;
  }
  return steps;
}

/** Where readings between two records are missing, what passed is spread evenly over the stretch. */
function spread(steps: Float64Array, times_ms: Float64Array, from: number, to: number, amount: number): void {
  const total = times_ms[to]! - times_ms[from]!;
  for (let i = from + 1; i <= to; i++) steps[i] = (amount * (times_ms[i]! - times_ms[i - 1]!)) / total;
}

/** Gain of a mechanical or pulse meter, plus or minus at 95 % (common practice, no source: 2 to 5 %). */
const METER_SHARE = 0.02;

/** Accuracy of a flow told by a register, L/s: the meter's gain, and the reading of the register at both ends where that is stated. */
function registerAccuracy(value_lps: number, seconds: number, installation: Installation): number {
  const channel: ChannelName = 'delivery_volume';
  const reading_l = sensorOf(installation, channel)?.accuracy === undefined ? 0 : accuracyOf(installation, channel, 0);
  return Math.hypot(METER_SHARE * value_lps, (Math.SQRT2 * reading_l) / seconds);
}
