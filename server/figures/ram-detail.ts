import { dayFigures } from '../shapes/figure';
import type { RamDetail, StoredVisit } from '../shapes/ram';
import { listBursts } from '../store/bursts';
import { latestDays } from '../store/days';
import { listLoads } from '../store/loads';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import { channelExtents, recordExtent } from '../store/series-read';
import { listVisits } from '../store/visits';
import { examinationOf, pageInstant } from './examination';
import { localDate } from './local-days';

/** A day of which less than this is recorded does not stand for "now". */
const GOOD_COVERAGE = 0.75;

/** Everything the ram's page needs but its series. */
export function ramDetailOf(db: Connection, ram: StoredRam, now_ms: number): RamDetail {
  const at_ms = pageInstant(db, now_ms);
  const known = examinationOf(db, ram, at_ms);
  const iso = (ms: number) => new Date(ms).toISOString();
  const extent = recordExtent(db, ram.id);
  const latest = latestDays(db, ram.id, 14).map((body) => dayFigures.parse(JSON.parse(body)));
  return {
    key: ram.key,
    installation: ram.installation,
    condition: known.condition,
    sentence: known.sentence,
    as_of: iso(at_ms),
    first_record_at: extent === null ? null : iso(extent.first_ms),
    last_record_at: extent === null ? null : iso(extent.last_ms),
    channels: channelExtents(db, ram.id).map(({ channel, unit, first_ms, last_ms, values }) => ({
      channel,
      unit,
      first_at: iso(first_ms),
      last_at: iso(last_ms),
      values,
    })),
    set_up_span: known.set_up_spans.at(-1) ?? null,
    latest: latest.findLast((day) => day.coverage >= GOOD_COVERAGE) ?? latest.at(-1) ?? null,
    findings: known.findings,
    visits: visitsOf(db, ram),
    loads: listLoads(db, ram.id),
    bursts: listBursts(db, ram.id).map(({ burst_id, at_ms, beats }) => ({
      burst_id,
      at: iso(at_ms),
      seconds: beats.seconds,
      beats_per_min: beats.beats_per_min?.value ?? null,
    })),
  };
}

/** The visits of a ram, oldest first, with their instant and local date. */
export function visitsOf(db: Connection, ram: StoredRam): StoredVisit[] {
  return listVisits(db, ram.id).map(({ id, at_ms, visit }) => ({
    ...visit,
    visit_id: id,
    at: new Date(at_ms).toISOString(),
    on: localDate(ram.installation.time_zone, at_ms),
  }));
}
