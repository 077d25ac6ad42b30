import { expect, test } from 'vitest';
import { tankCapacity_l, tankPlanArea_m2, tankVolume_l } from '../../server/hydraulics/tank';

test.each([
  // Source: computed, area of a circle's segment; share of the depth and m³, radius 0.6 m, length 2.4 m
  [0.1, 0.141265],
  [0.25, 0.530656],
  [0.3, 0.68487],
  [0.5, 1.357168],
  [0.75, 2.18368],
  [0.9, 2.573071],
  [1, 2.714336],
])('a lying cylinder filled to %f of its depth', (share, cubic_m) => {
  const tank = { shape: 'lying cylinder', diameter_m: 1.2, length_m: 2.4 } as const;
  expect(tankVolume_l(tank, share * 1.2) / 1000).toBeCloseTo(cubic_m, 6);
});

test.each([
  // Source: computed, volume of a frustum of a cone; m and m³
  [0.75, 1.653754],
  [1, 2.272419],
  [1.5, 3.616759],
])('a cone frustum filled to %f m', (depth, cubic_m) => {
  const tank = { shape: 'cone frustum', bottom_diameter_m: 1.6, top_diameter_m: 1.9, height_m: 1.5 } as const;
  expect(tankVolume_l(tank, depth) / 1000).toBeCloseTo(cubic_m, 6);
});

test('an upright cylinder and a box', () => {
  // Source: computed
  const cylinder = { shape: 'upright cylinder', diameter_m: 1.5, height_m: 2 } as const;
  expect(tankVolume_l(cylinder, 1.2)).toBeCloseTo(2120.575, 3);
  expect(tankPlanArea_m2(cylinder, 1) * 10).toBeCloseTo(17.67146, 5);
  const box = { shape: 'box', length_m: 2, width_m: 1.5, height_m: 1.4, overflow_m: 1.2 } as const;
  expect(tankVolume_l(box, 1.2)).toBeCloseTo(3600, 9);
  expect(tankCapacity_l(box)).toBeCloseTo(3600, 9);
});
