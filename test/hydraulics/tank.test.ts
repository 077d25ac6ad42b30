import fc from 'fast-check';
import { expect, test } from 'vitest';
import { tankCapacity_l, tankHeight_m, tankPlanArea_m2, tankVolume_l } from '../../server/hydraulics/tank';
import type { Tank } from '../../server/shapes/installation';

const size = fc.double({ min: 0.2, max: 10, noNaN: true });
const rising = fc
  .array(fc.tuple(fc.double({ min: 0.01, max: 1, noNaN: true }), fc.double({ min: 1, max: 500, noNaN: true })), {
    minLength: 2,
    maxLength: 8,
  })
  .map((steps) =>
    steps.map((_, i) => ({
      depth_m: steps.slice(0, i + 1).reduce((sum, [depth]) => sum + depth, 0),
      volume_l: steps.slice(0, i + 1).reduce((sum, [, volume]) => sum + volume, 0),
    })),
  );
const tank: fc.Arbitrary<Tank> = fc.oneof(
  fc.record({ shape: fc.constant('upright cylinder' as const), diameter_m: size, height_m: size }),
  fc.record({ shape: fc.constant('lying cylinder' as const), diameter_m: size, length_m: size }),
  fc.record({ shape: fc.constant('box' as const), length_m: size, width_m: size, height_m: size }),
  fc.record({
    shape: fc.constant('cone frustum' as const),
    bottom_diameter_m: size,
    top_diameter_m: size,
    height_m: size,
  }),
  fc.record({ shape: fc.constant('table' as const), stages: rising }),
);
const share = fc.double({ min: 0, max: 1, noNaN: true });

test('a higher level never means less water', () => {
  fc.assert(
    fc.property(tank, share, share, (tank, a, b) => {
      const height = tankHeight_m(tank);
      const [low, high] = [Math.min(a, b), Math.max(a, b)].map((part) => tankVolume_l(tank, part * height));
      expect(high! - low!).toBeGreaterThanOrEqual(-1e-9 * tankVolume_l(tank, height));
      expect(low!).toBeGreaterThanOrEqual(-1e-9);
    }),
    { numRuns: 1000 },
  );
});

test('the water surface is the slope of the volume', () => {
  fc.assert(
    fc.property(tank, fc.double({ min: 0.05, max: 0.95, noNaN: true }), (tank, part) => {
      const height = tankHeight_m(tank);
      const [at, step] = [part * height, height * 1e-5];
      // a table's surface jumps at its rows
      if (tank.shape === 'table' && tank.stages.some((stage) => Math.abs(stage.depth_m - at) < 2 * step)) return;
      const slope = (tankVolume_l(tank, at + step) - tankVolume_l(tank, at - step)) / (2 * step) / 1000;
      expect(Math.abs(slope / tankPlanArea_m2(tank, at) - 1)).toBeLessThan(1e-4);
    }),
  );
});

test('levels below the floor are empty, above the brim brimful', () => {
  fc.assert(
    fc.property(tank, (tank) => {
      const height = tankHeight_m(tank);
      expect(tankVolume_l(tank, -1)).toBe(tankVolume_l(tank, 0));
      expect(tankVolume_l(tank, 0)).toBeCloseTo(0, 9);
      expect(tankVolume_l(tank, height + 5)).toBe(tankVolume_l(tank, height));
      expect(tankCapacity_l(tank)).toBe(tankVolume_l(tank, height));
    }),
  );
  const table: Tank = {
    shape: 'table',
    stages: [
      { depth_m: 0.2, volume_l: 100 },
      { depth_m: 1, volume_l: 900 },
    ],
  };
  expect(tankVolume_l(table, 0.1)).toBeCloseTo(50, 9);
  expect(tankVolume_l(table, 0.6)).toBeCloseTo(500, 9);
  expect(tankPlanArea_m2(table, 0.6)).toBeCloseTo(1, 9);
  expect(() => tankVolume_l(table, Number.NaN)).toThrow('a depth of water of NaN m');
});
