import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { expect, test } from 'vitest';
import { beginLoad } from '../../server/store/loads';
import { type Connection, openStore } from '../../server/store/open';
import { addRam } from '../../server/store/rams';
import { readBuckets } from '../../server/store/series-buckets';
import { channelExtents, readChannels } from '../../server/store/series-read';
import { SeriesWriter, type WrittenChannel } from '../../server/store/series-write';

const START = Date.UTC(2031, 2, 30, 22, 0);
const MINUTE = 60_000;
const asItIs = () => ({ scale: 1, offset: 0 });
const channels: WrittenChannel[] = [
  { channel: 'beat_count', unit: 'count' },
  { channel: 'tank_level', unit: 'm' },
];

function store(): { db: Connection; ramId: number } {
  const db = openStore(mkdtempSync(path.join(tmpdir(), 'clackwatch-store-')));
  const ram = addRam(db, {
    name: 'Test',
    time_zone: 'UTC',
    fall_m: 3,
    lift_m: 30,
    drive_pipe: { length_m: 20, bore_mm: 50 },
    sensors: [],
  });
  return { db, ramId: ram.id };
}

let files = 0;
function load(
  db: Connection,
  ramId: number,
  rows: [minute: number, count: number, level: number][],
  columns = channels,
) {
  const sha = `file-${files++}`;
  db.prepare('insert into original (sha256, bytes) values (?, 1)').run(sha);
  const writer = new SeriesWriter(db, ramId, beginLoad(db, ramId, sha, sha, 'log', 0), columns);
  const values = [Float64Array.from(rows, (r) => r[1]), Float64Array.from(rows, (r) => r[2])].slice(0, columns.length);
  const times = Float64Array.from(rows, (r) => START + r[0] * MINUTE);
  writer.add(rows.length, times, values, new Uint8Array([0, 2]));
  return writer.finish();
}

const read = (db: Connection, ramId: number, channel: 'beat_count' | 'tank_level') =>
  Array.from(readChannels(db, ramId, [channel], START - 1e9, START + 1e9, asItIs).get(channel)?.values ?? []);

test('a record is stored once however many files bring it', () => {
  const { db, ramId } = store();
  const rows: [number, number, number][] = Array.from({ length: 400 }, (_, i) => [i, 100 + i, 1.25]);
  expect(load(db, ramId, rows.slice(0, 300))).toMatchObject({ fresh: 300, known: 0, contradicting: 0 });
  expect(load(db, ramId, rows.slice(200))).toMatchObject({ fresh: 100, known: 100, contradicting: 0 });
  expect(load(db, ramId, rows)).toMatchObject({ fresh: 0, known: 400, contradicting: 0 });
  expect(read(db, ramId, 'beat_count')).toEqual(rows.map((r) => r[1]));
  expect(channelExtents(db, ramId).find((c) => c.channel === 'beat_count')).toMatchObject({ values: 400 });
});

test('of two files that disagree on a record the newer one is read, and it is said', () => {
  const { db, ramId } = store();
  load(db, ramId, [
    [0, 1, 1],
    [1, 2, 1],
    [2, 3, 1],
  ]);
  expect(
    load(db, ramId, [
      [1, 9, 1],
      [3, 4, 1],
    ]),
  ).toMatchObject({ fresh: 1, known: 0, contradicting: 1 });
  expect(read(db, ramId, 'beat_count')).toEqual([1, 9, 3, 4]);
  expect(readBuckets(db, ramId, 'beat_count', START, START + 10 * 86_400_000, 10, asItIs)).toMatchObject({
    max: [9, null],
    min: [1, null],
  });
});

test('a value that was missing is filled in by a later file without being called a contradiction', () => {
  const { db, ramId } = store();
  load(db, ramId, [
    [0, 1, Number.NaN],
    [1, 2, 1.5],
  ]);
  expect(load(db, ramId, [[0, 1, 1.4]])).toMatchObject({ fresh: 1, contradicting: 0 });
  expect(read(db, ramId, 'tank_level')).toEqual([1.4, 1.5]);
});

test('rows out of order and over midnight are read in order', () => {
  const { db, ramId } = store();
  load(db, ramId, [
    [180, 4, 1],
    [60, 2, 1],
    [0, 1, 1],
    [150, 3, 1],
  ]);
  expect(read(db, ramId, 'beat_count')).toEqual([1, 2, 3, 4]);
});

test('two loggers with the same number of rows at other stamps keep their own times', () => {
  const { db, ramId } = store();
  load(
    db,
    ramId,
    [
      [0, 1, 0],
      [1, 2, 0],
      [500, 3, 0],
    ],
    [channels[0]!],
  );
  load(
    db,
    ramId,
    [
      [0, 7, 0],
      [2, 8, 0],
      [500, 9, 0],
    ],
    [{ channel: 'tank_level', unit: 'm' }],
  );
  const both = readChannels(db, ramId, ['beat_count', 'tank_level'], START - 1e9, START + 1e9, asItIs);
  expect(Array.from(both.get('beat_count')!.times_ms, (t) => (t - START) / MINUTE)).toEqual([0, 1, 500]);
  expect(Array.from(both.get('tank_level')!.times_ms, (t) => (t - START) / MINUTE)).toEqual([0, 2, 500]);
});

test('buckets keep every spike and agree with the samples, by day blocks as by samples', () => {
  const { db, ramId } = store();
  const rows: [number, number, number][] = Array.from({ length: 20_000 }, (_, i) => [
    i,
    i,
    i === 7_777 ? 99 : Math.sin(i / 700),
  ]);
  load(db, ramId, rows);
  for (const most of [5, 50, 900]) {
    const end = START + 20_000 * MINUTE;
    const { mean, max, at_ms } = readBuckets(db, ramId, 'tank_level', START, end, most, asItIs);
    expect(at_ms.length).toBeLessThanOrEqual(most + 1);
    expect(Math.max(...max.map((v) => v ?? 0))).toBe(99);
    expect(mean.every((v) => v === null || Math.abs(v) < 100)).toBe(true);
  }
});
