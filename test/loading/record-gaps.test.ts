import { expect, test } from 'vitest';
import { RecordGaps } from '../../server/loading/record-gaps';

const MINUTE = 60_000;

test('a gap is told with both its ends, a late record is not a gap', () => {
  const gaps = new RecordGaps();
  const minutes = [0, 10, 20, 30, 55, 65, 75, 300, 310];
  gaps.add(
    Float64Array.from(minutes, (m) => m * MINUTE),
    minutes.length,
  );
  expect(gaps.usualStep_s()).toBe(600);
  expect(gaps.gaps()).toEqual([
    { from: new Date(75 * MINUTE).toISOString(), to: new Date(300 * MINUTE).toISOString() },
  ]);
});

test('a file with gaps without end keeps the longest', () => {
  const gaps = new RecordGaps();
  let at = 0;
  const times: number[] = [];
  for (let i = 0; i < 4_000; i++) {
    times.push(at, at + MINUTE, at + 2 * MINUTE);
    at += (10 + i) * MINUTE;
  }
  gaps.add(Float64Array.from(times), times.length);
  const told = gaps.gaps();
  expect(told.length).toBeGreaterThan(50);
  expect(told.length).toBeLessThanOrEqual(200);
  expect(Date.parse(told.at(-1)!.to) - Date.parse(told.at(-1)!.from)).toBeGreaterThan(3_900 * MINUTE);
});

test('a file that begins with its newest record has the same step and gaps', () => {
  const gaps = new RecordGaps();
  const minutes = [310, 300, 75, 65, 55, 45, 35];
  gaps.add(
    Float64Array.from(minutes, (m) => m * MINUTE),
    minutes.length,
  );
  expect(gaps.usualStep_s()).toBe(600);
  expect(gaps.gaps()).toEqual([
    { from: new Date(75 * MINUTE).toISOString(), to: new Date(300 * MINUTE).toISOString() },
  ]);
});
