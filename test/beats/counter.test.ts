import fc from 'fast-check';
import { expect, test } from 'vitest';
import { readCounter } from '../../server/beats/counter';

const every = (minutes: number, count: number) => Float64Array.from({ length: count }, (_, i) => i * minutes * 60_000);
const read = (counts: number[], minutes = 10, rolls_over_at?: number) =>
  readCounter(every(minutes, counts.length), Float64Array.from(counts), { rolls_over_at });

test('a counter that passes its end goes on from nothing', () => {
  expect(Array.from(read([65_000, 65_500, 464, 964]).beats).slice(1)).toEqual([500, 500, 500]);
  expect(read([9_400, 9_900, 400]).events).toEqual([{ index: 2, kind: 'roll-over' }]);
  expect(read([4_500, 4_900, 300], 10, 5_000).beats[2]).toBe(400);
});

// Source: the case 483 → 310 after a power cut, read in a published field account (the project's practice notes).
test('a counter that returns to an older saved value leaves a gap, not a spike', () => {
  const { beats, events } = read([100, 483, 310, 700]);
  expect(beats[2]).toBeNaN();
  expect(beats[3]).toBe(390);
  expect(events[0]!.index).toBe(2);
});

test('a counter reset to nothing leaves a gap', () => {
  const { beats, events } = read([120_345, 120_945, 12, 600]);
  expect(beats[2]).toBeNaN();
  expect(events).toEqual([{ index: 2, kind: 'reset' }]);
});

test('readings that are missing in between are bridged, in proportion to time', () => {
  expect(Array.from(read([0, Number.NaN, Number.NaN, 1800]).beats).slice(1)).toEqual([600, 600, 600]);
});

test('no counter, however it jumps, gives a negative step or more than a ram can beat', () => {
  fc.assert(
    fc.property(
      fc.array(fc.oneof(fc.integer({ min: 0, max: 70_000 }), fc.constant(Number.NaN)), { minLength: 2, maxLength: 80 }),
      (counts) => {
        for (const step of read(counts).beats) if (!Number.isNaN(step)) expect(step >= 0 && step <= 1501).toBe(true);
      },
    ),
  );
});

test('whatever the modulus, a ram that beats on is counted whole', () => {
  fc.assert(
    fc.property(
      fc.constantFrom(10_000, 65_536, 100_000, 1_000_000),
      fc.integer({ min: 0, max: 9_999 }),
      fc.array(fc.integer({ min: 0, max: 1500 }), { minLength: 1, maxLength: 200 }),
      (modulus, start, steps) => {
        let count = start;
        const counts = [start, ...steps.map((step) => (count = (count + step) % modulus))];
        expect(Array.from(read(counts, 10, modulus).beats).slice(1)).toEqual(steps);
      },
    ),
  );
});
