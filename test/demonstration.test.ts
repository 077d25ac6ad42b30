import { readFileSync } from 'node:fs';
import path from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { dayFigures } from '../server/shapes/figure';
import { type Finding, finding } from '../server/shapes/finding';
import { receipt } from '../server/shapes/load';
import { listLoads, loadReceipt } from '../server/store/loads';
import { openStore } from '../server/store/open';
import { listRams } from '../server/store/rams';
import { clackwatch, newFolder } from './serve';

/** What was put into the invented valley, day by day (sample-data/files/truth.json). */
const days = z.object({
  date: z.array(z.string()),
  beats_per_min: z.array(z.number()),
  delivery_l_per_day: z.array(z.number()),
  delivery_at_ram_l_per_day: z.array(z.number()),
  efficiency_daubuisson: z.array(z.number()),
});
const truthOfRam = z.object({
  fault: z.string().nullable(),
  began_on: z.string().nullable(),
  reached_10_percent_on: z.string().nullable(),
  repaired_on: z.string().nullable(),
  bursts: z.array(z.object({ name: z.string(), beats: z.number(), beats_per_min: z.number() })),
  days,
});
const truth = z.record(z.string(), truthOfRam).parse(JSON.parse(readFileSync('sample-data/files/truth.json', 'utf8')));

const folder = path.join(newFolder(), 'valley');
let findings: Finding[] = [];
beforeAll(() => {
  const made = clackwatch('demo', '--data', folder);
  expect(made.status, made.err).toBe(0);
  findings = z.array(finding).parse(JSON.parse(clackwatch('findings', '--json', '--data', folder).out));
});

const keys = Object.keys(truth);
const dayNumber = (date: string) => Math.round(Date.parse(date) / 86_400_000);
const ofRam = (key: string) => findings.filter((one) => one.ram.toLowerCase().replaceAll(' ', '-') === key);

test('every file of the valley is read without help: no question, few refusals, no column lost', () => {
  const db = openStore(folder);
  try {
    expect(
      listRams(db)
        .map((ram) => ram.key)
        .sort(),
    ).toEqual([...keys].sort());
    for (const { id, key, installation } of listRams(db)) {
      const loads = listLoads(db, id).map((load) => receipt.parse(loadReceipt(db, load.load_id)));
      expect(loads.length, key).toBeGreaterThan(1);
      const logs = loads.filter((load) => load.kind === 'log');
      for (const load of logs) {
        expect(load.rows_new, `${key} ${load.file}`).toBeGreaterThan(1000);
        expect(load.rows_refused, `${key} ${load.file}`).toBeLessThan(30);
        for (const { channel } of installation.sensors.filter((sensor) => sensor.channel !== 'valve_box_pressure'))
          expect(
            load.channels.map((one) => one.channel),
            `${key} ${load.file}`,
          ).toContain(channel);
      }
    }
  } finally {
    db.close();
  }
});

test.each(keys)('%s: the figures of its sound days are those that were put in', (key) => {
  const told = truth[key]!;
  const rows = z
    .array(dayFigures)
    .parse(JSON.parse(clackwatch('figures', '--ram', key, '--json', '--data', folder).out));
  const place = new Map(told.days.date.map((date, i) => [date, i]));
  const errors = { beats: [] as number[], delivery: [] as number[], efficiency: [] as number[] };
  let held = 0;
  let sized = 0;
  for (const row of rows) {
    const i = place.get(row.date);
    if (
      i === undefined ||
      row.coverage < 0.95 ||
      (row.running_share ?? 1) < 0.97 ||
      (told.began_on !== null && row.date >= told.began_on)
    )
      continue;
    if (row.beats_per_min) errors.beats.push(Math.abs(row.beats_per_min.value / told.days.beats_per_min[i]! - 1));
    if (row.delivery_l_per_day && row.delivery_l_per_day.footing !== 'from theory') {
      const due = told.days.delivery_l_per_day[i]!;
      errors.delivery.push(Math.abs(row.delivery_l_per_day.value / due - 1));
      sized++;
      if (row.delivery_l_per_day.low <= due && due <= row.delivery_l_per_day.high) held++;
    }
    if (row.efficiency_daubuisson)
      errors.efficiency.push(Math.abs(row.efficiency_daubuisson.value / told.days.efficiency_daubuisson[i]! - 1));
  }
  const middle = (values: number[]) => [...values].sort((a, b) => a - b)[values.length >> 1]!;
  expect(errors.beats.length).toBeGreaterThan(40);
  expect(middle(errors.beats)).toBeLessThan(0.001);
  expect(middle(errors.delivery)).toBeLessThan(0.03);
  expect(middle(errors.efficiency)).toBeLessThan(0.05);
  expect(held / sized).toBeGreaterThan(0.85);
});

/** Which cause each story should be put down to. */
const cause: Record<string, string> = {
  marrowfen: 'waste valve leaking',
  oskerrin: 'air chamber losing air',
  pellandry: 'delivery valve leaking back',
  vennholt: 'intake or drive pipe blocked',
  drumskel: 'delivery pipe leaking',
  hathrill: 'stopped with the waste valve open',
};

test.each(keys.filter((key) => truth[key]!.fault !== null))(
  '%s: its fault is found in time, dated, and put down to the right cause among the first two',
  (key) => {
    const { began_on, reached_10_percent_on, repaired_on } = truth[key]!;
    const found = ofRam(key);
    expect(found).toHaveLength(1);
    expect(Math.abs(dayNumber(found[0]!.began_on) - dayNumber(began_on!))).toBeLessThanOrEqual(10);
    // the air chamber's truth counts ripple, whose first tenth is within its noise; a doubled ripple is the size that matters there
    const limit = dayNumber(reached_10_percent_on!) + (key === 'oskerrin' ? 28 : 14);
    expect(dayNumber(found[0]!.noticed_on)).toBeLessThanOrEqual(limit);
    expect(dayNumber(found[0]!.noticed_on)).toBeGreaterThanOrEqual(dayNumber(began_on!));
    expect(found[0]!.causes.slice(0, 2).map((one) => one.cause)).toContain(cause[key]);
    expect(found[0]!.open).toBe(repaired_on === null);
  },
);

test('the sound rams stay quiet through their dry seasons', () => {
  for (const key of keys.filter((one) => truth[one]!.fault === null)) expect(ofRam(key)).toEqual([]);
});

test.each(keys.filter((key) => truth[key]!.bursts.length > 0))('%s: the beats of its bursts are counted', (key) => {
  for (const burst of truth[key]!.bursts) {
    const told = JSON.parse(
      clackwatch('beats', `sample-data/files/${key}/${burst.name}`, '--ram', key, '--json', '--data', folder).out,
    ) as { beats: unknown[]; beats_per_min: { value: number } };
    expect(told.beats.length).toBe(burst.beats);
    expect(Math.abs(told.beats_per_min.value / burst.beats_per_min - 1)).toBeLessThan(0.002);
  }
});

test('the demonstration says that somebody should go now, by its exit status', () => {
  expect(clackwatch('findings', '--data', folder).status).toBe(3);
});
