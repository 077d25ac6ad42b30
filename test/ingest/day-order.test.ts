import { expect, test } from 'vitest';
import { inspectFile, inspectWith } from '../../server/ingest/inspect';
import { guessed, iso, logLines, ramOf, recordsOf, sourceOf, two } from './memory-source';

const dayFirst = (at: Date) =>
  `${two(at.getUTCDate())}/${two(at.getUTCMonth() + 1)}/${at.getUTCFullYear()} ${at.toISOString().slice(11, 16)}`;
const monthFirst = (at: Date) =>
  `${two(at.getUTCMonth() + 1)}/${two(at.getUTCDate())}/${at.getUTCFullYear()} ${at.toISOString().slice(11, 16)}`;
const log = (rows: number, stamp: (at: Date) => string, from: number, step_s = 600) =>
  `Time,Beat counter\n${logLines(rows, (i, at) => `${stamp(at)},${1000 + i * 600}`, step_s, from)}`;

test('a field above 12 anywhere in the file decides', async () => {
  const { reading, records } = await guessed(log(300, dayFirst, Date.UTC(2025, 3, 12)));
  expect(reading.time.day_order).toBe('day first');
  expect(iso(records.times[0]!)).toBe('2025-04-11T21:00:00.000Z');
  expect((await guessed(log(300, monthFirst, Date.UTC(2025, 3, 12)))).reading.time.day_order).toBe('month first');
});

test('a midnight decides: time runs on by a step, not by a month', async () => {
  // 5 and 6 April, or May 4 and June 4
  expect((await guessed(log(200, dayFirst, Date.UTC(2025, 3, 5)))).reading.time.day_order).toBe('day first');
  expect((await guessed(log(200, monthFirst, Date.UTC(2025, 3, 5)))).reading.time.day_order).toBe('month first');
});

test('a file of one day is asked about in plain words, and nothing can be read before the answer', async () => {
  const source = sourceOf(log(20, dayFirst, Date.UTC(2025, 3, 5)));
  const looked = await inspectFile(source, ramOf());
  expect(looked.reading.time.day_order).toBeNull();
  expect(looked.questions).toEqual([
    {
      about: 'day order',
      question: "05/04/2025: is that 5 April or May 4? The file's other dates do not tell.",
      column: null,
      choices: [
        { label: 'day first (5 April)', value: 'day first' },
        { label: 'month first (May 4)', value: 'month first' },
      ],
      must_answer: true,
    },
  ]);
  expect(looked.preview[0]).toMatchObject({ words: ['05/04/2025 00:00', '1000'], at: null, refused: null });
  await expect(recordsOf(source, looked.reading)).rejects.toThrow(
    /line 2: "05\/04\/2025 00:00" may be day first or month first/,
  );
  const answered = { ...looked.reading, time: { ...looked.reading.time, day_order: 'month first' as const } };
  const after = await inspectWith(source, ramOf(), answered);
  expect(after.questions).toEqual([]);
  expect(after.preview[0]!.at).toBe('2025-05-03T21:00:00.000Z');
});

test('the same day in either order needs no answer', async () => {
  const { questions, records } = await guessed(log(20, dayFirst, Date.UTC(2025, 4, 5)));
  expect(questions).toEqual([]);
  expect(iso(records.times[0]!)).toBe('2025-05-04T21:00:00.000Z');
});

test('the decision may lie beyond the head of a large file', async () => {
  // a day of one-second stamps, too long for the head, then the thirteenth
  const text = log(100_000, dayFirst, Date.UTC(2025, 0, 12), 1);
  expect(text.length).toBeGreaterThan(1 << 20);
  const looked = await inspectFile(sourceOf(text), ramOf());
  expect(looked.reading.time.day_order).toBe('day first');
});

test('a file holds no records from the future', async () => {
  const now_ms = Date.UTC(2025, 3, 20);
  const { reading } = await guessed(log(20, dayFirst, Date.UTC(2025, 3, 5)), ramOf({ now_ms }));
  expect(reading.time.day_order).toBe('day first');
});

test('dates with dots are day first; two-digit years first are told by the days running on', async () => {
  const dotted = log(20, (at) => dayFirst(at).replaceAll('/', '.'), Date.UTC(2025, 3, 5));
  expect((await guessed(dotted)).reading.time.day_order).toBe('day first');
  const yearFirst = log(400, (at) => at.toISOString().slice(2, 16).replace('T', ' '), Date.UTC(2025, 3, 5));
  const { reading, records } = await guessed(yearFirst);
  expect(reading.time.day_order).toBe('year first');
  expect(iso(records.times[0]!)).toBe('2025-04-04T21:00:00.000Z');
});

test('the order accepted for an earlier file is taken where the file does not tell', async () => {
  const long = await inspectFile(sourceOf(log(300, monthFirst, Date.UTC(2025, 3, 12))), ramOf());
  const { reading, remembered, questions } = await guessed(
    log(20, monthFirst, Date.UTC(2025, 3, 5)),
    ramOf({ remembered: [long.reading] }),
  );
  expect({ order: reading.time.day_order, remembered, questions }).toEqual({
    order: 'month first',
    remembered: true,
    questions: [],
  });
});

test('once decided, a row that contradicts is refused', async () => {
  const text = log(300, dayFirst, Date.UTC(2025, 3, 12)).replace('13/04/2025 00:10', '04/13/2025 00:10');
  const { records, again } = await guessed(text);
  expect(records.refusals).toEqual([
    {
      line: 147,
      reason:
        'the stamp "04/13/2025 00:10" has month 13; the other dates of this file are day first; expected one such as 12/04/2025 00:00',
    },
  ]);
  expect(again).toEqual(records);
});
