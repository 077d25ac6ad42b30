import { expect, test } from 'vitest';
import { lagOneCorrelation, longRunFactor } from '../../server/statistics/autocorrelation';
import { Cusum } from '../../server/statistics/cusum';
import { median, quantile, robustSpread } from '../../server/statistics/robust';
import { averageRunLength, decisionInterval } from '../../server/statistics/run-length';
import { random } from '../beats/simulated-burst';

// Source: NIST/SEMATECH e-Handbook of Statistical Methods 6.3.2.3: target 325, k 0.3175, h 4.1959, first signal at group 14.
test('the handbook series signals at its fourteenth group, with the handbook sums', () => {
  const series = [
    324.925, 324.675, 324.725, 324.35, 325.35, 325.225, 324.125, 324.525, 325.225, 324.6, 324.625, 325.15, 328.325,
    327.25, 327.825, 328.5, 326.675, 327.775, 326.875, 328.35,
  ];
  const chart = new Cusum(0.3175, 4.1959);
  const signals = series.map((x) => ({ signal: chart.add(x - 325), high: chart.high, low: chart.low }));
  expect(signals.findIndex((one) => one.signal !== 0)).toBe(13);
  expect(signals[13]!.high).toBeCloseTo(4.94, 3);
  expect(signals[19]!.high).toBeCloseTo(19.035, 3);
  expect(signals[7]!.low).toBeCloseTo(0.715, 3);
  // Page's estimate: the side last stood at 0 at group 12
  const again = new Cusum(0.3175, 4.1959);
  for (const x of series.slice(0, 14)) again.add(x - 325);
  expect(again.runLength(1)).toBe(2);
});

// Source: Lucas & Crosier 1982, table 1 (second-hand) and values computed by numeric integration for the reference pack.
test.each([
  [4, 168],
  [5, 465.444],
])('the run length on target for h %d is the published one within 2 %%', (h, published) => {
  expect(averageRunLength(h, 0.5) / published).toBeGreaterThan(0.98);
  expect(averageRunLength(h, 0.5) / published).toBeLessThan(1.02);
});

// Source: design table of the reference pack (two-sided, k ½), computed by numeric integration: 370 → 4.774, 1000 → 5.757, 10000 → 8.053.
test.each([
  [370, 4.774],
  [1000, 5.757],
  [10_000, 8.053],
])('a wanted run length of %d gives the published decision interval', (runLength, h) => {
  expect(decisionInterval(runLength, 0.5)).toBeCloseTo(h, 1);
});

test('by simulation the chart runs as long as its decision interval promises', () => {
  const next = random(12);
  const normal = () => Math.sqrt(-2 * Math.log(next() + 1e-12)) * Math.cos(2 * Math.PI * next());
  let values = 0;
  const runs = 1500;
  for (let run = 0; run < runs; run++) {
    const chart = new Cusum(0.5, 4);
    do values++;
    while (chart.add(normal()) === 0);
  }
  // Source: Lucas & Crosier 1982: 168; three standard errors of a geometric mean of 1500 runs are 8 %.
  expect(values / runs / 168).toBeGreaterThan(0.92);
  expect(values / runs / 168).toBeLessThan(1.08);
});

// Source: NIST/SEMATECH e-Handbook 7.2.6.2 (percentiles; the type-7 value is computed in the reference pack).
test('quantiles are those of the handbook by interpolation of type 7', () => {
  const x = [95.1772, 95.1567, 95.1937, 95.1959, 95.1442, 95.061, 95.1591, 95.1195, 95.1065, 95.0925, 95.199, 95.1682];
  expect(quantile(x, 0.9)).toBeCloseTo(95.19568, 5);
  expect(median([3, 1, 2])).toBe(2);
  expect(median([])).toBeNaN();
});

// Source: Grubbs example of the same handbook (1.3.5.17.1); the modified z of 245.57 is 29.9627 with 0.6745/MAD (Iglewicz & Hoaglin).
test('the robust spread is not moved by one wild value', () => {
  const x = [199.31, 199.53, 200.19, 200.82, 201.92, 201.95, 202.18, 245.57];
  expect((245.57 - median(x)) / robustSpread(x)).toBeCloseTo(29.9627, 2);
});

test('values that lean on one another scatter more in the long run', () => {
  const next = random(5);
  let state = 0;
  const leaning = Array.from({ length: 20_000 }, () => (state = 0.5 * state + next() - 0.5));
  expect(lagOneCorrelation(leaning)).toBeCloseTo(0.5, 1);
  // AR(1), φ 0.5: √((1 + φ) / (1 − φ)) = √3
  expect(longRunFactor(0.5)).toBeCloseTo(Math.sqrt(3), 9);
});
