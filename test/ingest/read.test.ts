import { expect, test } from 'vitest';
import { inspectFile } from '../../server/ingest/inspect';
import { readRecords } from '../../server/ingest/read';
import { guessed, iso, logLines, plainStamp, ramOf, recordsOf, sourceOf, two } from './memory-source';

const header = 'Time,Beat counter,Chamber pressure (kPa),Tank level (m)\n';
const line = (i: number, at: Date) =>
  `${plainStamp(at)},${1000 + i * 600},${(276 + (i % 7) / 10).toFixed(1)},${(1 + i / 1000).toFixed(3)}`;
const log = header + logLines(20, line);

test('every kind of line gets what it deserves, by both engines alike', async () => {
  const text = `${log}2025-04-05 03:20:00,13000,276.1,3.8O
2025-04-05 03:30:00,Battery changed
${header}2025-02-30 03:40:00,13600,NAN,-9999
# the hatch was opened
2025-04-05 03:50:00,13600,NAN,-9999
2025-04-05 04:00:00,13700,276.1,1.023,55
"2025-04-05 04:10:00",13800,"276,2",65535
1999-01-01 00:00,1,2,3
2025-04-05 04:20:00,Err,,---
2025-04-05 04:30:00,open,hatch,x
,,,
2025-04-05 04:40:00,13900`;
  const { records, again } = await guessed(text);
  expect(again).toEqual(records);
  expect(records.refusals).toEqual([
    {
      line: 22,
      reason:
        'Tank level (m) "3.8O" is not a number (letter O?); expected metres such as 1.000; the value was left out, the rest of the row kept',
    },
    { line: 23, reason: 'an event, not a record: Battery changed' },
    {
      line: 25,
      reason:
        'the stamp "2025-02-30 03:40:00" is no date: February 2025 has 28 days; expected one such as 2025-04-05 00:00:00',
    },
    { line: 28, reason: 'it has 5 fields where 4 were expected: 55' },
    {
      line: 29,
      reason:
        'Chamber pressure (kPa) "276,2" is not a number (this file\'s decimal mark is .); expected kPa such as 276.0; the value was left out, the rest of the row kept',
    },
    { line: 30, reason: "the logger's clock was not set: 1998-12-31 21:00 is before 2001" },
    { line: 32, reason: '"open hatch x" stands where numbers were expected: an event or a damaged line' },
    { line: 34, reason: 'the file ends within this line: it has 2 fields where 4 were expected' },
  ]);
  expect(records).toMatchObject({ refused: 6, rows_read: 30, missing: [1, 3, 4] });
  expect(records.notes).toEqual([
    '1 comment line was skipped.',
    '1 repeated header was skipped.',
    '1 row without any value was skipped.',
    '2 values are not numbers and were left out; the rest of their rows was kept.',
  ]);
  expect(records.values.map((column) => column.slice(-4))).toEqual([
    [13_000, 13_600, 13_800, Number.NaN],
    [276.1, Number.NaN, Number.NaN, Number.NaN],
    [Number.NaN, Number.NaN, Number.NaN, Number.NaN],
  ]);
});

test('65535 is a count for a counter and over range for a pressure', async () => {
  const { records, again } = await guessed(
    `Time,Beat counter,Chamber pressure (kPa)\n${logLines(20, (i, at) => `${plainStamp(at)},${65_535 - (19 - i) * 600},${i === 3 ? 65_535 : 276}`)}`,
  );
  expect(records.values[0]!.at(-1)).toBe(65_535);
  expect(records.values[1]![3]).toBeNaN();
  expect(again).toEqual(records);
});

test('after a header with other columns nothing is read until the known header comes back', async () => {
  const other = `Time,Tank level (m),Beat counter,Chamber pressure (kPa)\n${logLines(3, (i, at) => `${plainStamp(at)},1.5,${i},276`, 600, Date.UTC(2025, 3, 6))}`;
  const back = header + logLines(2, line, 600, Date.UTC(2025, 3, 7));
  const { records, again } = await guessed(log + other + back);
  expect(records.times).toHaveLength(22);
  expect(records.refusals.map(({ line: at }) => at)).toEqual([22, 23, 24, 25]);
  expect(records.refusals[0]!.reason).toMatch(
    /another header: the columns change to Time, Tank level \(m\), Beat counter/,
  );
  expect(again).toEqual(records);
});

test('a file that leaves out missing values at the end of its rows is read', async () => {
  const { records, again } = await guessed(
    `Time,Beat counter,Tank level (m)\n${logLines(40, (i, at) => (i % 4 ? `${plainStamp(at)},${i * 600},1.25` : `${plainStamp(at)},${i * 600}`))}`,
  );
  expect(records).toMatchObject({ rows_read: 40, refused: 0, missing: [0, 10] });
  expect(again).toEqual(records);
});

test('thousands are read where the column shows them, and refused where it does not', async () => {
  const grouped = await guessed(
    `Time;Beat counter;Tank level (m)\n${logLines(40, (i, at) => `${plainStamp(at)};${(900 + i * 600).toLocaleString('en-US')};1.25`)}`,
  );
  expect(grouped.records.values[0]!.slice(0, 3)).toEqual([900, 1500, 2100]);
  expect(grouped.again).toEqual(grouped.records);
  const mixed = await guessed(
    `Time;Beat counter;Tank level (m)\n${logLines(40, (i, at) => `${plainStamp(at)};${i === 5 ? '3,900' : 900 + i * 600};1.25`)}`,
  );
  expect(mixed.records.values[0]![5]).toBeNaN();
  expect(mixed.records.refusals).toMatchObject([
    { line: 7, reason: expect.stringContaining('"3,900" is not a number') },
  ]);
});

test('a logger whose clock falls back by years is told, not believed', async () => {
  const reset = logLines(3, line, 600, Date.UTC(2010, 0, 1));
  const { records, again } = await guessed(log + reset + logLines(2, line, 600, Date.UTC(2025, 3, 8)));
  expect(records.times).toHaveLength(22);
  expect(records.refusals).toMatchObject([
    { line: 22, reason: expect.stringContaining('fell back by more than a year, to 2009-12-31 21:00') },
    { line: 23 },
    { line: 24 },
  ]);
  expect(again).toEqual(records);
});

test('one damaged stamp far ahead does not put the records after it out of belief', async () => {
  const { records, again } = await guessed(log.replace('2025-04-05 01:00:00', '2026-11-05 01:00:00'));
  expect(records).toMatchObject({ rows_read: 20, refused: 0 });
  expect(again).toEqual(records);
});

test('a burst counts from the start that its preamble names', async () => {
  const samples = Array.from({ length: 400 }, (_, i) => `${(i * 0.005).toFixed(3)},${(30 + (i % 50)).toFixed(2)}`).join(
    '\n',
  );
  const { reading, questions, records, again } = await guessed(
    `Burst start: 2025-05-03 10:12:13\nt_s,valve box kPa\n${samples}\n`,
  );
  expect(questions).toEqual([]);
  expect(reading).toMatchObject({
    kind: 'burst',
    time: { form: 'seconds from start', start_at: '2025-05-03T07:12:13.000Z' },
  });
  expect(records.times[1]).toBeCloseTo(Date.UTC(2025, 4, 3, 7, 12, 13) + 5, 6);
  expect(again).toEqual(records);
});

test('a burst that does not tell its start is asked for it', async () => {
  const samples = Array.from({ length: 60 }, (_, i) => `${i * 10},3.${i % 10}`).join('\n');
  const text = `t (ms),valve box kPa\n${samples}\n`;
  const looked = await inspectFile(sourceOf(text), ramOf());
  expect(looked.questions).toMatchObject([{ about: 'start of burst', must_answer: true }]);
  await expect(recordsOf(sourceOf(text), looked.reading)).rejects.toThrow(/State the start/);
  const started = { ...looked.reading, time: { ...looked.reading.time, start_at: '2025-05-03T07:12:13Z' } };
  const records = await recordsOf(sourceOf(text), started);
  expect(iso(records.times.at(-1)!)).toBe('2025-05-03T07:12:13.590Z');
});

test('samples that share a whole second are spread evenly over it', async () => {
  const samples = Array.from(
    { length: 100 },
    (_, i) => `2025-05-03 10:12:${two(13 + Math.floor((i + 7) / 20))};${(30 + (i % 7)).toFixed(2)}`,
  ).join('\n');
  const { reading, records, again } = await guessed(`time;valve box (kPa)\n${samples}\n`);
  expect(reading.kind).toBe('burst');
  const steps = records.times.slice(1).map((at, i) => at - records.times[i]!);
  for (const step of steps) expect(step).toBeCloseTo(50, 6);
  expect(iso(records.times[0]!)).toBe('2025-05-03T07:12:13.350Z');
  expect(records.notes).toEqual(['100 samples share their stamps with others and were spread evenly over them.']);
  expect(again).toEqual(records);
});

test('batches are small, and progress counts the bytes', async () => {
  const text = header + logLines(30_000, line, 60);
  const source = sourceOf(text);
  const { reading } = await guessed(text);
  const counts: number[] = [];
  let bytes = 0;
  await readRecords(
    source,
    ramOf(),
    reading,
    (batch) => counts.push(batch.count),
    (read) => {
      bytes = read;
    },
  );
  expect(Math.max(...counts)).toBe(8192);
  expect(counts.reduce((sum, count) => sum + count)).toBe(30_000);
  expect(bytes).toBe(source.bytes);
});
