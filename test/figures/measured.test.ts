import { expect, test } from 'vitest';
import { asFigure, propagate } from '../../server/figures/measured';

// Source: worked example computed from GUM (JCGM 100:2008) 5.1.2, kept with the project's reference pack:
// q 4.2 L/min (2 %), h 30 m (1 %), Q 60 L/min (5 %), H 3.5 m (2 %) → efficiency 0.6, u 0.0349857; the drive flow dominates.
test('a product and quotient propagates as the GUM says', () => {
  const input = (value: number, share: number, by: string) => ({ value, u: value * share, by });
  const found = propagate(
    [input(4.2, 0.02, 'q'), input(30, 0.01, 'h'), input(60, 0.05, 'Q'), input(3.5, 0.02, 'H')],
    (q, h, Q, H) => (q! * h!) / (Q! * H!),
  );
  expect(found!.value).toBeCloseTo(0.6, 9);
  // numeric sensitivities over ±u differ from the analytic ones by terms of third order
  expect(found!.u / 0.0349857).toBeCloseTo(1, 2);
  expect(found!.by).toBe('Q');
});

// Source: same pack: with the drive flow as q + waste (55.8 L/min, 5 %) the uncertainty is 0.0329083.
test('a delivery that stands in both terms is counted once', () => {
  const found = propagate(
    [
      { value: 4.2, u: 0.084, by: 'q' },
      { value: 55.8, u: 2.79, by: 'waste' },
      { value: 30, u: 0.3, by: 'h' },
      { value: 3.5, u: 0.07, by: 'H' },
    ],
    (q, waste, h, H) => (q! * h!) / ((q! + waste!) * H!),
  );
  expect(found!.u / 0.0329083).toBeCloseTo(1, 2);
});

test('an interval does not reach below nothing', () => {
  expect(asFigure({ value: 0.1, u: 1, by: 'x' }, 'metered')).toMatchObject({
    low: 0,
    footing: 'metered',
    dominated_by: 'x',
  });
});
