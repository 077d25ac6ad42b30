import fc from 'fast-check';
import { expect, test } from 'vitest';
import { installation } from '../../server/shapes/installation';
import { layOut, stretched } from '../../web/ram/section-geometry';

const ram = (fall_m: number, lift_m: number, drive_m: number, delivery_m: number | null) =>
  installation.parse({
    name: 'Test',
    time_zone: 'UTC',
    fall_m,
    lift_m,
    drive_pipe: { length_m: drive_m, bore_mm: 50 },
    ...(delivery_m === null ? {} : { delivery_pipe: { length_m: delivery_m, bore_mm: 25 } }),
    tank: { shape: 'upright cylinder', diameter_m: 2, height_m: 2 },
    sensors: [],
  });
const margin = { top: 40, right: 20, bottom: 80, left: 100 };

test('fall and lift stand in the drawing in their true proportion', () => {
  const at = layOut(ram(4, 20, 16, 120), 1000, 460, margin);
  const fall = at.ground - at.source.y;
  const lift = at.ground - at.outlet.y;
  expect(lift / fall).toBeCloseTo(5, 9);
  // the drive pipe runs to scale: a 16 m pipe on 4 m of fall covers √(16² − 4²) m
  expect((at.valve.x - at.source.x) / at.drive).toBeCloseTo(Math.sqrt(16 ** 2 - 4 ** 2), 9);
  expect((at.outlet.x - at.valve.x) / at.delivery).toBeCloseTo(Math.sqrt(120 ** 2 - 20 ** 2), 9);
  expect(at.deliveryIsStated).toBe(true);
});

test('no installation is drawn out of its frame', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0.4, max: 30, noNaN: true }),
      fc.double({ min: 1.05, max: 30, noNaN: true }),
      fc.double({ min: 1, max: 40, noNaN: true }),
      fc.option(fc.double({ min: 1, max: 5000, noNaN: true })),
      (fall, ratio, drive, delivery) => {
        const lift = Math.min(500, fall * ratio);
        const at = layOut(ram(fall, lift, fall * drive, delivery), 1000, 460, margin);
        for (const x of [at.source.x, at.valve.x, at.outlet.x, at.tank.right]) expect(x >= 99 && x <= 981).toBe(true);
        for (const y of [at.source.y, at.outlet.y, at.tank.floor]) expect(y >= 39 && y <= 381).toBe(true);
      },
    ),
  );
});

test('the stretch between heights and lengths is said as people say it', () => {
  expect(stretched(10, 10)).toBe('heights and lengths alike');
  expect(stretched(30, 10)).toBe('heights × 3.0');
  expect(stretched(10, 200)).toBe('lengths × 20');
});
