import fc from 'fast-check';
import { expect, test } from 'vitest';
import { coverageOf, meansOf, shareOut } from '../../server/figures/spans';

test('what is shared out to spans that tile the time adds up to what there was', () => {
  fc.assert(
    fc.property(
      fc.array(fc.tuple(fc.integer({ min: 1, max: 5_000 }), fc.integer({ min: 0, max: 100 })), {
        minLength: 2,
        maxLength: 60,
      }),
      fc.integer({ min: 100, max: 3_000 }),
      (steps, width) => {
        let at = 0;
        const times = Float64Array.from(steps, ([step]) => (at += step));
        const amounts = Float64Array.from(steps, ([, amount]) => amount);
        const spans = Array.from({ length: Math.ceil((at + 1) / width) }, (_, s) => ({
          from_ms: s * width,
          to_ms: (s + 1) * width,
        }));
        const shared = shareOut(times, amounts, spans);
        const total = (values: Iterable<number>) => [...values].reduce((sum, v) => sum + v, 0);
        expect(total(shared.amount)).toBeCloseTo(total(amounts) - amounts[0]!, 6);
        expect(total(shared.known_ms)).toBeCloseTo(times.at(-1)! - times[0]!, 6);
      },
    ),
  );
});

test('a gap lowers the coverage of its own day only', () => {
  const hour = 3_600_000;
  const times = Float64Array.from({ length: 72 }, (_, h) => h * hour).filter((at) => at < 30 * hour || at > 42 * hour);
  const spans = [0, 1, 2].map((d) => ({ from_ms: d * 24 * hour, to_ms: (d + 1) * 24 * hour }));
  const [first, second, third] = coverageOf([{ times_ms: times, values: times }], spans);
  expect(first).toBe(1);
  expect(second).toBeCloseTo(10 / 24, 1);
  expect(third).toBeGreaterThan(0.95);
});

test('a stamp at midnight closes the day before', () => {
  const series = {
    times_ms: Float64Array.from([0, 5, 10, 15, 20]),
    values: Float64Array.from([100, 1, 3, 5, Number.NaN]),
  };
  expect(
    meansOf(series, [
      { from_ms: 0, to_ms: 10 },
      { from_ms: 10, to_ms: 20 },
    ]),
  ).toEqual([2, 5]);
});
