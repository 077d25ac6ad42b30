import type { z } from 'zod';
import type { SeasonCharts, seasonFigure } from '../shapes/series';
import { chartedDays } from '../store/days';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import { recordExtent } from '../store/series-read';
import { type ChartedFigure, placeOf } from './charted';

const DAY_MS = 86_400_000;
const MOST_BUCKETS = 1000;

/** The season charts of a ram over a span (all of its record where none is given): days, or buckets of days when there are more than a thousand. */
export function seasonOf(
  db: Connection,
  ram: StoredRam,
  span: { from_ms: number | null; to_ms: number | null },
): SeasonCharts {
  const extent = recordExtent(db, ram.id);
  const from_ms = span.from_ms ?? extent?.first_ms ?? 0;
  const to_ms = span.to_ms ?? (extent === null ? 0 : extent.last_ms + 1);
  const days = chartedDays(db, ram.id, from_ms - DAY_MS, to_ms);
  const per = Math.max(1, Math.ceil((to_ms - from_ms) / DAY_MS / MOST_BUCKETS));
  const groups = groupDays(days.from_ms, per);
  const figure = (name: ChartedFigure) => bucketed(days.rows, groups, placeOf(name));
  return {
    from: new Date(from_ms).toISOString(),
    to: new Date(to_ms).toISOString(),
    days_per_bucket: per,
    at_ms: groups.map((group) => group.at_ms),
    fall_m: figure('fall_m'),
    beats_per_min: figure('beats_per_min'),
    delivery_l_per_day: figure('delivery_l_per_day'),
    efficiency_daubuisson: figure('efficiency_daubuisson'),
  };
}

interface Group {
  at_ms: number;
  /** Rows of the group; none for the break that stands where days are missing. */
  rows: number[];
}

function groupDays(from_ms: number[], per: number): Group[] {
  const groups: Group[] = [];
  const first = from_ms[0] ?? 0;
  let open = Number.NaN;
  from_ms.forEach((at, d) => {
    // half a day of slack: local days are 23 or 25 hours long twice a year
    const place = Math.floor((at - first + DAY_MS / 2) / DAY_MS / per);
    if (place !== open) {
      if (place > open + 1) groups.push({ at_ms: first + (open + 1) * per * DAY_MS + DAY_MS / 2, rows: [] });
      groups.push({ at_ms: first + (place + 0.5) * per * DAY_MS, rows: [] });
      open = place;
    }
    groups.at(-1)!.rows.push(d);
  });
  return groups;
}

function bucketed(rows: Float64Array[], groups: Group[], place: number): z.infer<typeof seasonFigure> {
  const column = (offset: number, pick: (values: number[]) => number) =>
    groups.map((group) => {
      const values = group.rows.map((row) => rows[row]![place + offset]!).filter((value) => !Number.isNaN(value));
      return values.length === 0 ? null : round(pick(values));
    });
  const mean = (values: number[]) => values.reduce((sum, v) => sum + v, 0) / values.length;
  return {
    min: column(0, (values) => Math.min(...values)),
    mean: column(0, mean),
    max: column(0, (values) => Math.max(...values)),
    low: column(1, mean),
    high: column(2, mean),
    expected_low: column(3, mean),
    expected_high: column(4, mean),
  };
}

/** Six significant digits are more than any sensor here has, and halve what a phone must fetch. */
const round = (value: number) => Number(value.toPrecision(6));
