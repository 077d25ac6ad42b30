import type { DayFigures, SpanFigures } from '../shapes/figure';
import { UserError } from '../shapes/problem';
import { listDays, listObservations } from '../store/days';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import { readChannels, recordExtent } from '../store/series-read';
import { carried } from './days';
import { deriveFigures } from './derive';
import { COVERAGE_95 } from './measured';
import type { Observation } from './observation';
import { observe, observedChannels } from './observe';
import { knownFromVisits } from './recompute';
import { unitChange } from './sensors';
import type { Span } from './spans';

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;
/** More rows than this are asked for in pieces. */
const MOST_ROWS = 20_000;

export const everyChoices = ['interval', 'hour', 'day'] as const;
export type Every = (typeof everyChoices)[number];

/** Figures of a ram between two instants (its whole record where none is given) by logger interval, hour or local day. */
export function figuresOf(
  db: Connection,
  ram: StoredRam,
  span: { from_ms: number | null; to_ms: number | null },
  every: Every,
): (SpanFigures | DayFigures)[] {
  const extent = recordExtent(db, ram.id);
  if (extent === null) return [];
  const from_ms = span.from_ms ?? extent.first_ms - DAY_MS;
  const to_ms = span.to_ms ?? extent.last_ms + DAY_MS;
  if (every === 'day') return listDays(db, ram.id, from_ms, to_ms).map((body) => JSON.parse(body) as DayFigures);
  const series = readChannels(db, ram.id, observedChannels, from_ms - DAY_MS, to_ms + DAY_MS, (channel, unit) =>
    unitChange(ram.installation, channel, unit),
  );
  const stamps =
    [...series.values()].map((one) => one.times_ms).sort((a, b) => b.length - a.length)[0] ?? new Float64Array();
  const spans =
    every === 'hour'
      ? hours(Math.max(from_ms, extent.first_ms), Math.min(to_ms, extent.last_ms))
      : intervals(stamps, from_ms, to_ms);
  if (spans.length > MOST_ROWS)
    throw new UserError(
      `That is ${spans.length} rows; at most ${MOST_ROWS} are given at once. Ask for a shorter span, or for every hour or day.`,
      'too large',
    );
  const days = listObservations(db, ram.id).map((body) => JSON.parse(body) as Observation);
  const { calibrations } = knownFromVisits(db, ram, days);
  const knowledge = {
    installation: ram.installation,
    calibrations,
    recent_delivered_l_per_beat: recentBefore(db, ram, to_ms),
  };
  return observe(series, spans, ram.installation)
    .filter((seen) => seen.coverage > 0)
    .map((seen) => deriveFigures(seen, knowledge));
}

function hours(from_ms: number, to_ms: number): Span[] {
  const spans: Span[] = [];
  for (let at = Math.floor(from_ms / HOUR_MS) * HOUR_MS; at < to_ms; at += HOUR_MS)
    spans.push({ from_ms: at, to_ms: at + HOUR_MS });
  return spans;
}

function intervals(stamps: Float64Array, from_ms: number, to_ms: number): Span[] {
  const spans: Span[] = [];
  for (let i = 1; i < stamps.length; i++)
    if (stamps[i]! > from_ms && stamps[i]! <= to_ms) spans.push({ from_ms: stamps[i - 1]!, to_ms: stamps[i]! });
  return spans;
}

/** Litres per beat that meter or tank told in the thirty days before an instant. */
function recentBefore(db: Connection, ram: StoredRam, to_ms: number) {
  const recent = listDays(db, ram.id, to_ms - 30 * DAY_MS, to_ms)
    .map((body) => (JSON.parse(body) as DayFigures).delivered_l_per_beat)
    .filter(
      (figure) =>
        figure !== null && (figure.footing === 'metered' || figure.footing === 'from tank') && figure.value > 0,
    )
    .map((figure) => ({ value: figure!.value, share: (figure!.high - figure!.value) / COVERAGE_95 / figure!.value }));
  return carried(recent);
}
