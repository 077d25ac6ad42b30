import { expect, test } from 'vitest';
import { calibrationOf } from '../../server/figures/bucket-tests';
import { figuresOfDays } from '../../server/figures/days';
import { deriveFigures } from '../../server/figures/derive';
import { fromAccuracy } from '../../server/figures/measured';
import type { Observation } from '../../server/figures/observation';
import { installation } from '../../server/shapes/installation';
import { visit } from '../../server/shapes/visit';

const ram = installation.parse({
  name: 'Test',
  time_zone: 'UTC',
  fall_m: 4,
  lift_m: 18,
  drive_pipe: { length_m: 20, bore_mm: 100 },
  sensors: [],
});

const DAY_MS = 86_400_000;

function day(change: Partial<Observation>, d = 0): Observation {
  return {
    from_ms: d * DAY_MS,
    to_ms: (d + 1) * DAY_MS,
    date: new Date(d * DAY_MS).toISOString().slice(0, 10),
    coverage: 1,
    beats: 60 * 1440,
    beat_minutes: 1440,
    running_minutes: 1440,
    beats_per_min: { value: 60, u: 0.001, by: 'the counting at both ends' },
    beats_per_min_running: { value: 60, u: 0.001, by: 'the counting at both ends' },
    fall_m: null,
    chamber_head_m: null,
    chamber_ripple_kpa: null,
    meter_lps: null,
    tank_inflow_lps: null,
    waste_lps: null,
    drive_lps: null,
    still: [],
    ...change,
  };
}

const alone = { installation: ram, calibrations: [], recent_delivered_l_per_beat: null };

// Source: a published worked example (Q 30 L/s in all, q 3 L/s, H 4 m, h 18 m): D'Aubuisson 0.45, Rankine 42/108.
test('metered flows give both efficiencies of the published example', () => {
  const figures = deriveFigures(
    day({ meter_lps: fromAccuracy(3, 0.06, 'meter'), drive_lps: fromAccuracy(30, 0.6, 'drive') }),
    alone,
  );
  expect(figures.efficiency_daubuisson!.value).toBeCloseTo(0.45, 9);
  expect(figures.efficiency_rankine!.value).toBeCloseTo(42 / 108, 9);
  expect(figures.efficiency_daubuisson).toMatchObject({ footing: 'metered' });
  expect(figures.drive_l_per_day!.value).toBeCloseTo(30 * 86_400, 3);
});

test('the best footing at hand is taken, and the weaker of two named for what needs both', () => {
  const tank = deriveFigures(day({ tank_inflow_lps: fromAccuracy(0.2, 0.01, 'tank') }), alone);
  expect(tank.delivery_l_per_day).toMatchObject({ footing: 'from tank' });
  expect(tank.waste_l_per_day).toMatchObject({ footing: 'from theory', dominated_by: 'the theory of the cycle' });
  expect(tank.efficiency_daubuisson).toMatchObject({ footing: 'from theory' });
  const both = deriveFigures(
    day({ tank_inflow_lps: fromAccuracy(0.2, 0.01, 'tank'), meter_lps: fromAccuracy(0.25, 0.01, 'meter') }),
    alone,
  );
  expect(both.delivery_l_per_day).toMatchObject({ footing: 'metered' });
  expect(both.tank_inflow_l_per_day!.value).toBeCloseTo(0.2 * 86_400, 6);
});

const tested = calibrationOf(
  visit.parse({
    visited_at: '1970-01-05T10:00:00Z',
    bucket_tests: [
      { of: 'delivery', litres: 20, seconds: [50, 50.4, 49.6] },
      { of: 'waste', litres: 50, seconds: [16, 16.2, 15.8] },
    ],
    counted_beats: { beats: 60, seconds: 60 },
  }),
  4.4 * DAY_MS,
  '1970-01-05',
  undefined,
  ram,
);

test('a bucket test repeats itself at the heads of its day, and names itself as the doubt', () => {
  const figures = deriveFigures(day({}, 4), { ...alone, calibrations: [tested!] });
  expect(figures.delivered_l_per_beat!.value).toBeCloseTo(0.4, 4);
  expect(figures.waste_l_per_beat!.value).toBeCloseTo(50 / 16, 4);
  expect(figures.delivery_l_per_day).toMatchObject({
    footing: 'bucket-scaled',
    dominated_by: 'the bucket test of 1970-01-05',
  });
});

test('with less fall the bucket-scaled waste of a beat rises, because the column takes longer to run up', () => {
  const low = deriveFigures(day({ fall_m: fromAccuracy(3.4, 0.02, 'level') }, 4), {
    ...alone,
    calibrations: [tested!],
  });
  expect(low.waste_l_per_beat!.value).toBeGreaterThan((50 / 16) * 1.05);
  expect(low.delivered_l_per_beat!.value / 0.4).toBeCloseTo(1, 1);
});

test('days on which neither meter nor tank tells carry the litres per beat of the days before', () => {
  const days = [
    ...Array.from({ length: 8 }, (_, d) => day({ tank_inflow_lps: fromAccuracy(0.2, 0.01, 'tank') }, d)),
    day({}, 8),
  ];
  const last = figuresOfDays(days, { installation: ram, calibrations: [] }).at(-1)!;
  expect(last.delivery_l_per_day).toMatchObject({ footing: 'from beats' });
  expect(last.delivery_l_per_day!.value).toBeCloseTo(0.2 * 86_400, 3);
});

test('a stopped ram delivers nothing and has no efficiency, rather than an infinite one', () => {
  const still = { value: 0, u: 0.001, by: 'the counting at both ends' };
  const figures = deriveFigures(
    day({
      beats: 0,
      beats_per_min: still,
      beats_per_min_running: null,
      running_minutes: 0,
      meter_lps: fromAccuracy(0, 0, 'meter'),
      waste_lps: fromAccuracy(0, 0, 'weir'),
    }),
    alone,
  );
  expect(figures).toMatchObject({
    running_share: 0,
    efficiency_daubuisson: null,
    efficiency_rankine: null,
    delivered_l_per_beat: null,
  });
});
