import fc from 'fast-check';
import { expect, test } from 'vitest';
import { decodeChannel, decodeTimes, encodeChannel, encodeTimes } from '../../server/store/blocks';

const DAY_MS = 86_400_000;

test('stamps of any day come back exactly', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 0, max: 40_000 }),
      fc.constantFrom(1, 100, 1_000, 60_000),
      fc.uniqueArray(fc.integer({ min: 0, max: DAY_MS - 1 }), { minLength: 1, maxLength: 200 }),
      (day, resolution, offsets) => {
        const times = Float64Array.from(
          new Set(offsets.map((o) => day * DAY_MS + Math.floor(o / resolution) * resolution)),
        ).sort();
        expect(decodeTimes(encodeTimes(times), times.length)).toEqual(times);
      },
    ),
  );
});

test('values come back exactly, missing ones and odd ones among them', () => {
  const written = fc.oneof(
    fc.integer({ min: -2_000_000_000, max: 2_000_000_000 }).map((n) => n / 1_000),
    fc.constant(Number.NaN),
    fc.double({ noNaN: true }),
    fc.integer({ min: 0, max: 2 ** 40 }),
  );
  fc.assert(
    fc.property(fc.array(written, { maxLength: 300 }), fc.integer({ min: 0, max: 6 }), (values, decimals) => {
      const column = Float64Array.from(values, (v) => (Object.is(v, -0) ? 0 : v));
      expect(decodeChannel(encodeChannel(column, decimals), column.length)).toEqual(column);
    }),
  );
});

test('a steady day of a three-decimal channel takes about a byte a value', () => {
  const values = Float64Array.from({ length: 1440 }, (_, i) => 120 + Math.round(Math.sin(i / 50) * 50) / 1000);
  expect(encodeChannel(values, 3).length).toBeLessThan(1440 * 1.2);
});
