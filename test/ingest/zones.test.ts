import { expect, test } from 'vitest';
import { ZoneOffsets } from '../../server/ingest/zone-offsets';
import { zoneOfHeading, zoneOfPreamble } from '../../server/ingest/zone-words';
import { guessed, iso, ramOf } from './memory-source';

/** UTC and local time as told by Node 20 (ICU 78, tz 2025c) and Python's zoneinfo alike. */
const conversions: [string, string, string][] = [
  ['America/New_York', '2024-03-10T06:59:59Z', '2024-03-10T01:59:59'],
  ['America/New_York', '2024-03-10T07:00:00Z', '2024-03-10T03:00:00'],
  ['America/New_York', '2024-11-03T05:30:00Z', '2024-11-03T01:30:00'],
  ['America/New_York', '2024-11-03T06:30:00Z', '2024-11-03T01:30:00'],
  ['Europe/Paris', '2024-03-31T00:59:59Z', '2024-03-31T01:59:59'],
  ['Europe/Paris', '2024-03-31T01:00:00Z', '2024-03-31T03:00:00'],
  ['Europe/Paris', '2024-10-27T00:30:00Z', '2024-10-27T02:30:00'],
  ['Europe/Paris', '2024-10-27T01:30:00Z', '2024-10-27T02:30:00'],
  ['Asia/Kathmandu', '2024-01-01T00:00:00Z', '2024-01-01T05:45:00'],
  ['Asia/Kathmandu', '1985-12-31T18:29:59Z', '1985-12-31T23:59:59'],
  ['Asia/Kathmandu', '1985-12-31T18:30:00Z', '1986-01-01T00:15:00'],
  ['Asia/Kolkata', '2024-01-01T00:00:00Z', '2024-01-01T05:30:00'],
  ['Africa/Nairobi', '2024-07-01T00:00:00Z', '2024-07-01T03:00:00'],
  ['Africa/Kigali', '2024-07-01T00:00:00Z', '2024-07-01T02:00:00'],
  ['Australia/Lord_Howe', '2024-04-06T14:59:59Z', '2024-04-07T01:59:59'],
  ['Australia/Lord_Howe', '2024-04-06T15:00:00Z', '2024-04-07T01:30:00'],
  ['Australia/Lord_Howe', '2024-10-05T15:29:59Z', '2024-10-06T01:59:59'],
  ['Australia/Lord_Howe', '2024-10-05T15:30:00Z', '2024-10-06T02:30:00'],
  ['Pacific/Apia', '2011-12-30T09:59:59Z', '2011-12-29T23:59:59'],
  ['Pacific/Apia', '2011-12-30T10:00:00Z', '2011-12-31T00:00:00'],
  ['Africa/Casablanca', '2024-03-10T01:59:59Z', '2024-03-10T02:59:59'],
  ['Africa/Casablanca', '2024-03-10T02:00:00Z', '2024-03-10T02:00:00'],
  ['Africa/Casablanca', '2024-04-14T01:59:59Z', '2024-04-14T01:59:59'],
  ['Africa/Casablanca', '2024-04-14T02:00:00Z', '2024-04-14T03:00:00'],
  ['America/Sao_Paulo', '2019-02-17T01:59:59Z', '2019-02-16T23:59:59'],
  ['America/Sao_Paulo', '2019-02-17T02:00:00Z', '2019-02-16T23:00:00'],
  ['America/Asuncion', '2024-10-06T03:59:59Z', '2024-10-05T23:59:59'],
  ['America/Asuncion', '2024-10-06T04:00:00Z', '2024-10-06T01:00:00'],
  ['America/Asuncion', '2025-04-15T00:00:00Z', '2025-04-14T21:00:00'],
  ['America/Santiago', '2024-04-07T02:59:59Z', '2024-04-06T23:59:59'],
  ['America/Santiago', '2024-04-07T03:00:00Z', '2024-04-06T23:00:00'],
  ['America/Santiago', '2024-09-08T03:59:59Z', '2024-09-07T23:59:59'],
  ['America/Santiago', '2024-09-08T04:00:00Z', '2024-09-08T01:00:00'],
  ['Pacific/Auckland', '2024-04-06T13:59:59Z', '2024-04-07T02:59:59'],
  ['Pacific/Auckland', '2024-04-06T14:00:00Z', '2024-04-07T02:00:00'],
  ['Africa/Juba', '2021-01-31T20:59:59Z', '2021-01-31T23:59:59'],
  ['Africa/Juba', '2021-01-31T21:00:00Z', '2021-01-31T23:00:00'],
];

test.each(conversions)('in %s, %s is among the instants of %s', (zone, utc, local) => {
  const at = Date.parse(utc);
  expect(new ZoneOffsets(zone).instants(Date.parse(`${local}Z`))).toContain(at);
});

/** From the same two references. */
test.each([
  ['America/New_York', '2024-03-10T02:30:00', 0],
  ['America/New_York', '2024-11-03T01:30:00', 2],
  ['Europe/Paris', '2024-03-31T02:30:00', 0],
  ['Europe/Paris', '2024-10-27T02:30:00', 2],
  ['Australia/Lord_Howe', '2024-04-07T01:45:00', 2],
  ['Australia/Lord_Howe', '2024-10-06T02:15:00', 0],
  ['Pacific/Apia', '2011-12-30T12:00:00', 0],
  ['America/Sao_Paulo', '2019-02-16T23:30:00', 2],
  ['America/Asuncion', '2024-10-06T00:30:00', 0],
  ['America/Santiago', '2024-09-08T00:30:00', 0],
  ['America/Santiago', '2024-04-06T23:30:00', 2],
  ['Asia/Kathmandu', '1986-01-01T00:05:00', 0],
  ['Africa/Casablanca', '2024-03-10T02:30:00', 2],
  ['Africa/Casablanca', '2024-04-14T02:30:00', 0],
])('in %s, %s happens %i times', (zone, local, times) => {
  expect(new ZoneOffsets(zone).instants(Date.parse(`${local}Z`))).toHaveLength(times);
});

const paris = ramOf({ time_zone: 'Europe/Paris' });
const log = (stamps: string[]) =>
  `Time,Beat counter\n${stamps.map((stamp, i) => `${stamp},${1000 + i * 600}`).join('\n')}\n`;
/** Local stamps from one instant on, as a clock in Paris writes them. */
function parisStamps(fromUtc: string, count: number, step_min: number): { text: string; at: string }[] {
  const clock = new Intl.DateTimeFormat('sv-SE', { timeZone: 'Europe/Paris', dateStyle: 'short', timeStyle: 'medium' });
  return Array.from({ length: count }, (_, i) => {
    const at = Date.parse(fromUtc) + i * step_min * 60_000;
    return { text: clock.format(at), at: iso(at) };
  });
}

test.each([10, 15, 60])(
  'the hour that comes twice is told apart by the order of the records, every %i minutes',
  async (step) => {
    const stamps = parisStamps('2024-10-26T22:00:00Z', 48, step);
    for (const ordered of [stamps, [...stamps].reverse()]) {
      const { records, again } = await guessed(log(ordered.map(({ text }) => text)), paris);
      expect(records.times.map(iso)).toEqual(ordered.map(({ at }) => at));
      expect(records).toMatchObject({ refused: 0, notes: [] });
      expect(again).toEqual(records);
    }
  },
);

test('records on both sides of the hour that is left out are an hour apart on the clock and none in truth', async () => {
  const stamps = parisStamps('2024-03-30T23:00:00Z', 40, 10);
  const { records } = await guessed(log(stamps.map(({ text }) => text)), paris);
  expect(records.times.map(iso)).toEqual(stamps.map(({ at }) => at));
});

test('a stamp in the hour that does not exist is refused, and the fixed offset is offered', async () => {
  const { records, again } = await guessed(
    log(['2024-03-31 01:50', '2024-03-31 02:00', '2024-03-31 02:10', '2024-03-31 03:00']),
    paris,
  );
  expect(records.refusals).toEqual([
    { line: 3, reason: '2024-03-31 02:00 does not exist in Europe/Paris: the clocks went forward over it' },
    { line: 4, reason: '2024-03-31 02:10 does not exist in Europe/Paris: the clocks went forward over it' },
  ]);
  expect(records.notes.join()).toMatch(/does not follow summer time, state its zone as a fixed offset/);
  expect(again).toEqual(records);
});

test('a clock that does not fall back is noticed', async () => {
  const stamps = Array.from({ length: 30 }, (_, i) =>
    new Date(Date.UTC(2024, 9, 27, 0, i * 10)).toISOString().slice(0, 16).replace('T', ' '),
  );
  const { records } = await guessed(log(stamps), paris);
  expect(records.notes.join()).toMatch(/comes twice in Europe\/Paris on 2024-10-27 is written once/);
});

test.each([
  ['Time (UTC)', 'utc'],
  ['Date Time, GMT+03:00', '+03:00'],
  ['TIMESTAMP UTC-3', '-03:00'],
  ['Zeit [UTC+5:45]', '+05:45'],
  ['Time Africa/Nairobi', 'Africa/Nairobi'],
  ['Time (local)', null],
  ['Augmented', null],
])('the heading "%s" states the zone %s', (heading, zone) => {
  expect(zoneOfHeading(heading)).toBe(zone);
});

test('a zone in the preamble is read; one that is not understood is asked', async () => {
  expect(zoneOfPreamble(['Site: A', 'Time zone: UTC+2'])).toEqual({ zone: '+02:00', unknown: null });
  const text = `Timezone;EAT\n${log(['2026-01-01 00:00', '2026-01-01 00:10', '2026-01-01 00:20']).replaceAll(',', ';')}`;
  const { questions, reading } = await guessed(text);
  expect(reading.time.zone).toBe('ram');
  expect(questions).toMatchObject([{ about: 'time zone', question: expect.stringContaining('"EAT"') }]);
});
