import { expect, test } from 'vitest';
import { zoneName } from '../../web/dates';
import { change, shownFigure, shownNumber } from '../../web/numbers';
import { drawn, lastDays, moved } from '../../web/ram/season-data';
import { ticksBetween } from '../../web/ram/season-ticks';
import { visitOf } from '../../web/ram/visit-entry';
import { linePath } from '../../web/rounds/line-path';
import { drawable, emptyRam, installationOf } from '../../web/set-up/ram-entry';

const figure = (value: number, low: number, high: number) => ({ value, low, high, footing: 'metered' as const });

test('a figure is shown as far as its interval carries it', () => {
  expect(shownFigure(figure(3.9153, 3.887, 3.943))).toEqual({ value: '3.915', interval: '± 0.028' });
  expect(shownFigure(figure(10_366, 10_100, 10_632))).toEqual({ value: '10\u202f366', interval: '± 266' });
  expect(shownFigure(figure(0.42, 0.36, 0.48), 100)).toEqual({ value: '42.0', interval: '± 6.0' });
  expect(shownFigure(figure(4, 0, 12)).interval).toBe('0.0 to 12.0');
});

test('changes are told as people tell them', () => {
  expect(change(-0.12)).toBe('12 % less');
  expect(change(2.6)).toBe('3.6 times');
  expect(shownNumber(7123.4, 0)).toBe('7123');
});

test('a fixed zone is called by its offset, with the sign people use', () => {
  expect(zoneName('Etc/GMT-3')).toBe('UTC+3');
  expect(zoneName('Etc/GMT+5')).toBe('UTC−5');
  expect(zoneName('Africa/Nairobi')).toBe('Africa/Nairobi');
});

test('the sixty-day line breaks where days are missing', () => {
  expect(linePath([1, 1, null, 1], 30, 11, 1).match(/M/g)).toHaveLength(2);
  expect(linePath([], 30, 11, 1)).toBe('');
});

test('the span of the charts moves and stretches within the record', () => {
  const whole = { from: 0, to: 1000 * 86_400_000 };
  const year = lastDays(whole, 366);
  expect(year.to).toBe(whole.to);
  expect(moved(year, whole, 'later')).toEqual(year);
  const earlier = moved(year, whole, 'earlier');
  expect(earlier.to - earlier.from).toBe(year.to - year.from);
  expect(moved(whole, whole, 'wider')).toEqual(whole);
  expect(moved(year, whole, 'closer').to - moved(year, whole, 'closer').from).toBe((year.to - year.from) / 2);
});

test('an axis of any length has a handful of round dates', () => {
  for (const days of [5, 30, 65, 150, 366, 1000, 2500, 3650]) {
    const ticks = ticksBetween(Date.UTC(2024, 0, 3), Date.UTC(2024, 0, 3) + days * 86_400_000);
    expect(ticks.length).toBeGreaterThan(1);
    expect(ticks.length).toBeLessThan(16);
  }
});

test('efficiencies are drawn in per cent and gaps stay gaps', () => {
  const one = {
    min: [0.4, null],
    mean: [0.5, null],
    max: [0.6, null],
    low: [0.45, null],
    high: [0.55, null],
    expected_low: [null, null],
    expected_high: [null, null],
  };
  const season = {
    from: '',
    to: '',
    days_per_bucket: 1,
    at_ms: [1, 2],
    fall_m: one,
    beats_per_min: one,
    delivery_l_per_day: one,
    efficiency_daubuisson: one,
  };
  expect(drawn(season, 'efficiency_daubuisson').mean).toEqual([
    { x: 1, y: 50 },
    { x: 2, y: null },
  ]);
  expect(drawn(season, 'fall_m').low[0]!.y).toBe(0.45);
  expect(drawn({ ...season, days_per_bucket: 4 }, 'fall_m').low[0]!.y).toBe(0.4);
});

test('a visit is sent without what was left empty, and commas are understood', () => {
  const entry = {
    when: '2031-05-03T10:20',
    who: '',
    delivery: { litres: '10', seconds: ['83,5', '', '84'] },
    waste: { litres: '', seconds: ['', '', ''] },
    beats: '60',
    beatSeconds: '61,2',
    fall: '',
    done: [],
    note: ' ',
  };
  expect(visitOf(entry)).toEqual({
    visited_at: '2031-05-03T10:20',
    bucket_tests: [{ of: 'delivery', litres: 10, seconds: [83.5, 84] }],
    actions: [],
    counted_beats: { beats: 60, seconds: 61.2 },
  });
});

test('an installation is drawn as soon as its heights and drive pipe are there', () => {
  const entry = { ...emptyRam(), name: 'A', fall_m: '3,2', lift_m: '28', drive_length_m: '18', drive_bore_mm: '50' };
  expect(drawable({ ...entry, drive_length_m: '' })).toBeNull();
  expect(drawable(entry)).not.toBeNull();
  expect(installationOf(entry)).toMatchObject({ fall_m: 3.2, lift_m: 28, drive_pipe: { length_m: 18, bore_mm: 50 } });
  expect(installationOf(entry)).not.toHaveProperty('tank');
});
