import { expect, test } from 'vitest';
import { readCounter } from '../../server/beats/counter';
import { observeBeats } from '../../server/figures/observe-beats';

const STEP = 600_000;
const DAY = 144 * STEP;
const spans = [
  { from_ms: 0, to_ms: DAY },
  { from_ms: DAY, to_ms: 2 * DAY },
];

function counted(beatsPerStep: (i: number) => number, rolls = 65_536) {
  let count = 65_000;
  const times_ms = Float64Array.from({ length: 289 }, (_, i) => i * STEP);
  const values = times_ms.map((_, i) => {
    if (i > 0) count = (count + beatsPerStep(i)) % rolls;
    return count;
  });
  const counter = { times_ms, values };
  return observeBeats({
    counter,
    readings: readCounter(times_ms, values, { rolls_over_at: rolls }),
    perInterval: undefined,
    rate: undefined,
    spans,
    waste: undefined,
    valveBox: undefined,
  });
}

test('a day of steady beats is told to a thousandth, over the roll-over of the counter', () => {
  const [first] = counted(() => 600);
  expect(first!.beats_per_min!.value).toBeCloseTo(60, 6);
  expect(first!.beats_per_min!.u).toBeLessThan(0.003);
  expect(first!.still).toEqual([]);
});

test('a stop is a stretch of its own and does not lower the beats per minute of running', () => {
  const [first, second] = counted((i) => (i > 100 && i <= 160 ? 0 : 600));
  expect(first!.still).toMatchObject([{ from_ms: 100 * STEP, to_ms: 160 * STEP }]);
  expect(first!.beats_per_min!.value).toBeCloseTo((60 * 100) / 144, 3);
  expect(first!.beats_per_min_running!.value).toBeCloseTo(60, 6);
  expect(first!.running_minutes).toBeCloseTo(1000, 6);
  expect(second!.running_minutes).toBeCloseTo(1440 - 160, 6);
});
