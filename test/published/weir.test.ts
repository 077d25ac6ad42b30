import { expect, test } from 'vitest';
import { vNotchFlow_lps, vNotchHead_m, vNotchLimits, vNotchSlope_lps_per_m } from '../../server/hydraulics/weir';

test.each([
  // Source: ISO 1438 form (Kindsvater and Shen) with Ce 0.578 and kh 0.85 mm, from memory, computed; beside it the cone
  // equation of the US Bureau of Reclamation, Q(cfs) = 2.49 h(ft)^2.48, from memory: two published forms, m and L/s
  [0.05, 0.796, 0.7968],
  [0.06, 1.247, 1.2523],
  [0.08, 2.5375, 2.5559],
  [0.1, 4.4095, 4.4452],
  [0.12, 6.9314, 6.9865],
  [0.15, 12.0661, 12.1505],
  [0.2, 24.6821, 24.7994],
  [0.25, 43.0266, 43.1299],
  [0.3, 67.7762, 67.7872],
  [0.381, 123.0082, 122.6256],
])('a 90 degree notch under %f m', (head, iso, cone) => {
  expect(Math.abs(vNotchFlow_lps(head, 90) / iso - 1)).toBeLessThan(1e-4);
  expect(Math.abs(vNotchFlow_lps(head, 90) / cone - 1)).toBeLessThan(0.01);
});

test.each([
  // From memory: curve fits of the Kindsvater-Shen coefficients for 60 and 45 degrees (Ce, kh in mm)
  [60, 0.57667, 1.127],
  [45, 0.58017, 1.5],
])('a notch of %i degrees', (notch, discharge, added_mm) => {
  const byHand =
    1000 *
    (8 / 15) *
    discharge *
    Math.sqrt(2 * 9.80665) *
    Math.tan((notch * Math.PI) / 360) *
    (0.12 + added_mm / 1000) ** 2.5;
  expect(Math.abs(vNotchFlow_lps(0.12, notch) / byHand - 1)).toBeLessThan(1e-3);
});

test('half-90 and quarter-90 notches pass about a half and a quarter', () => {
  // Source: BS 3680, 53°8′ and 28°4′, tan(θ/2) = 1/2 and 1/4; coefficients differ by up to 3 %
  const full = vNotchFlow_lps(0.15, 90);
  expect(Math.abs(vNotchFlow_lps(0.15, 53.1301) / full / 0.5 - 1)).toBeLessThan(0.03);
  expect(Math.abs(vNotchFlow_lps(0.15, 28.0725) / full / 0.25 - 1)).toBeLessThan(0.05);
});

test('it is not the circulated formula that lacks (8/15)√2', () => {
  // Source: negative check: C·tan(θ/2)·√g·h^2.5 gives 32.76 L/s at 0.2 m, 33 % too much
  expect(vNotchFlow_lps(0.2, 90)).toBeLessThan(0.77 * 32.76);
});

test('a millimetre at 60 mm of head is 4 % of the flow', () => {
  // Source: computed, u(Q)/Q = 2.5 u(h)/h
  expect((vNotchSlope_lps_per_m(0.06, 90) * 0.001) / vNotchFlow_lps(0.06, 90)).toBeCloseTo(0.041, 3);
  expect(vNotchHead_m(vNotchFlow_lps(0.06, 90), 90)).toBeCloseTo(0.06, 12);
});

test('heads outside the limits of use are named', () => {
  // Source: US Bureau of Reclamation, Water Measurement Manual, chapter 7: above 0.2 ft, up to about 1.25 ft
  expect(vNotchLimits(0.1, 90)).toEqual([]);
  expect(vNotchLimits(0.05, 90)[0]).toMatch(/below 0\.06 m/);
  expect(vNotchLimits(0.5, 90)[0]).toMatch(/above 0\.381 m/);
});
