import { examine } from '../health/examine';
import { actionsThatChangeTheRam } from '../shapes/visit';
import { forgetObservations, keepExamination, keepObservations, listObservations, replaceDays } from '../store/days';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import { readChannels, recordExtent } from '../store/series-read';
import { listVisits } from '../store/visits';
import { type BucketCalibration, calibrationOf } from './bucket-tests';
import { chartedRow } from './charted';
import { figuresOfDays } from './days';
import { type LocalDay, localDate, localDays } from './local-days';
import type { Observation } from './observation';
import { observe, observedChannels } from './observe';
import { unitChange } from './sensors';
import { findStops } from './stops';

/** Number of the method that makes the figures: raise it when a change makes stored results stale. */
export const METHOD = 1;

const DAY_MS = 86_400_000;
/** Days are observed a month at a time, so that memory does not grow with the record. */
const DAYS_AT_ONCE = 31;

/**
 * Reads the samples of the touched local days again, then makes figures and findings anew from what is observed of all days.
 * Run inside the transaction of whatever changed. Returns how many days were read again.
 *
 * @param touched UTC span whose records changed, or 'all' after the installation was corrected
 */
export function recompute(db: Connection, ram: StoredRam, touched: { from_ms: number; to_ms: number } | 'all'): number {
  const extent = recordExtent(db, ram.id);
  if (touched === 'all') forgetObservations(db, ram.id);
  let days = 0;
  if (extent !== null) {
    const from_ms = touched === 'all' ? extent.first_ms : touched.from_ms;
    const to_ms = touched === 'all' ? extent.last_ms : touched.to_ms;
    const all = localDays(ram.installation.time_zone, from_ms, to_ms + 1);
    days = all.length;
    for (let first = 0; first < all.length; first += DAYS_AT_ONCE)
      observeDays(db, ram, all.slice(first, first + DAYS_AT_ONCE));
  }
  refreshFigures(db, ram);
  return days;
}

function observeDays(db: Connection, ram: StoredRam, days: LocalDay[]): void {
  const from_ms = days[0]!.from_ms;
  const to_ms = days.at(-1)!.to_ms;
  // a day to either side: counters and meters are read as steps between records
  const series = readChannels(db, ram.id, observedChannels, from_ms - DAY_MS, to_ms + DAY_MS, (channel, unit) =>
    unitChange(ram.installation, channel, unit),
  );
  const seen = observe(series, days, ram.installation).filter((day) => day.coverage > 0);
  keepObservations(
    db,
    ram.id,
    seen.map((day) => ({ date: day.date!, from_ms: day.from_ms, body: JSON.stringify(day) })),
  );
}

/** Figures, expectation and findings of every day from what was observed: quick, because no sample is read. */
export function refreshFigures(db: Connection, ram: StoredRam): void {
  const { installation } = ram;
  const days = listObservations(db, ram.id).map((body) => JSON.parse(body) as Observation);
  const { set_up_anew_on, calibrations } = knownFromVisits(db, ram, days);
  const figures = figuresOfDays(days, { installation, calibrations });
  const lastRecord_ms = recordExtent(db, ram.id)?.last_ms ?? null;
  const found = examine({
    ram: ram.name,
    installation,
    days: figures,
    set_up_anew_on,
    set_up_span: null,
    stops: findStops(days, lastRecord_ms, installation),
  });
  replaceDays(
    db,
    ram.id,
    figures.map((day, d) => {
      const expected = found.expected[d] ?? {};
      return {
        date: day.date!,
        from_ms: days[d]!.from_ms,
        charted: chartedRow(day, expected),
        body: JSON.stringify({ ...day, expected }),
      };
    }),
  );
  const { expected: _, ...kept } = found;
  keepExamination(db, ram.id, METHOD, JSON.stringify(kept));
}

/** What the visits tell: the days on which the ram was set up anew, and the bucket tests with the log of their day. */
export function knownFromVisits(db: Connection, ram: StoredRam, days: readonly Observation[]) {
  const byDate = new Map(days.map((day) => [day.date, day]));
  const kept = listVisits(db, ram.id).map(({ at_ms, visit }) => ({
    at_ms,
    visit,
    on: localDate(ram.installation.time_zone, at_ms),
  }));
  const calibrations = kept
    .map(({ at_ms, visit, on }) => calibrationOf(visit, at_ms, on, byDate.get(on), ram.installation))
    .filter((one): one is BucketCalibration => one !== null);
  const set_up_anew_on = kept
    .filter(
      ({ visit }) =>
        visit.opens_set_up_span ?? visit.actions.some((action) => actionsThatChangeTheRam.includes(action)),
    )
    .map(({ on }) => on);
  return { set_up_anew_on, calibrations };
}
