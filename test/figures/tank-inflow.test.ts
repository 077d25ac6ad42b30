import { expect, test } from 'vitest';
import { tankInflow } from '../../server/figures/tank-inflow';
import { installation } from '../../server/shapes/installation';

const DAY_MS = 86_400_000;
const ram = installation.parse({
  name: 'Test',
  time_zone: 'UTC',
  fall_m: 3,
  lift_m: 30,
  drive_pipe: { length_m: 20, bore_mm: 50 },
  tank: { shape: 'upright cylinder', diameter_m: 2.5, height_m: 2.2, overflow_m: 2.0 },
  sensors: [{ channel: 'tank_level', unit: 'm', accuracy: 0.005 }],
});
const AREA_M2 = (Math.PI * 2.5 ** 2) / 4;

/** Seeded (mulberry32), so that a failure can be looked at again. */
function random(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}

/** A day's level in 10-minute steps with a steady inflow and draw-offs by hours, read to half a centimetre. */
function day(inflow_lps: number, draw: (hour: number, random: () => number) => number, seed: number, start_m = 0.8) {
  const next = random(seed);
  const count = 145;
  let depth_m = start_m;
  const times_ms = Float64Array.from({ length: count }, (_, i) => i * 600_000);
  const values = times_ms.map((at) => {
    const shown = Math.round((depth_m + (next() - 0.5) * 0.004) / 0.005) * 0.005;
    depth_m = Math.min(
      2.0,
      Math.max(0, depth_m + ((inflow_lps - draw((at / 3_600_000) % 24, next)) * 600) / 1000 / AREA_M2),
    );
    return shown;
  });
  return { times_ms, values };
}

const mornings = (hour: number, next: () => number) =>
  hour > 5.5 && hour < 9
    ? next() * 0.6
    : hour > 16 && hour < 19.5
      ? next() * 0.5
      : hour > 9 && hour < 16
        ? next() < 0.3
          ? 0.3
          : 0
        : 0;

test('the inflow is found within 3 % while people draw morning and evening', () => {
  const errors = Array.from({ length: 40 }, (_, seed) => {
    const found = tankInflow(day(0.12, mornings, seed + 1), { from_ms: 0, to_ms: DAY_MS }, ram);
    return Math.abs(found!.value / 0.12 - 1);
  }).sort((a, b) => a - b);
  expect(errors[20]!).toBeLessThan(0.03);
  expect(errors[37]!).toBeLessThan(0.1);
});

test('a tank that stands full tells nothing while it spills, and the rest of the day is used', () => {
  const found = tankInflow(
    day(0.15, () => 0, 7, 0.9),
    { from_ms: 0, to_ms: DAY_MS },
    ram,
  );
  expect(found!.value).toBeGreaterThan(0.15 * 0.95);
  expect(found!.value).toBeLessThan(0.15 * 1.05);
  expect(
    tankInflow(
      day(0.15, () => 0, 7, 2.0),
      { from_ms: 0, to_ms: DAY_MS },
      ram,
    ),
  ).toBeNull();
});

test('without a tank, or with too little of a record, there is no figure', () => {
  expect(
    tankInflow(
      day(0.1, () => 0, 1),
      { from_ms: 0, to_ms: DAY_MS },
      { ...ram, tank: undefined },
    ),
  ).toBeNull();
  expect(
    tankInflow(
      day(0.1, () => 0, 1),
      { from_ms: 0, to_ms: 3_600_000 },
      ram,
    ),
  ).toBeNull();
});
