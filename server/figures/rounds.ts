import { type DayFigures, dayFigures } from '../shapes/figure';
import type { Condition, Finding } from '../shapes/finding';
import type { Rounds, RoundsRow } from '../shapes/ram';
import { chartedDays, latestDays } from '../store/days';
import { type Connection, setting } from '../store/open';
import { listRams, type StoredRam } from '../store/rams';
import { placeOf } from './charted';
import { type Examination, examinationOf, pageInstant } from './examination';

const DAY_MS = 86_400_000;
const SPARK_DAYS = 60;

/** All rams in the order in which they want a visit: stopped and failing before slipping, then by water lost and people served. */
export function roundsOf(db: Connection, now_ms: number): Rounds {
  const at_ms = pageInstant(db, now_ms);
  const rows = listRams(db).map((ram) => rowOf(db, ram, examinationOf(db, ram, at_ms)));
  rows.sort((a, b) => urgency(b) - urgency(a) || a.ram.localeCompare(b.ram));
  return { as_of: new Date(at_ms).toISOString(), demonstration: setting(db, 'demonstration_as_of') !== null, rows };
}

function rowOf(db: Connection, ram: StoredRam, known: Examination): RoundsRow {
  const day = latestDays(db, ram.id, 1).map((body) => dayFigures.parse(JSON.parse(body)))[0];
  return {
    ram: ram.name,
    key: ram.key,
    condition: known.condition,
    sentence: known.sentence,
    finding: gravest(known.findings),
    litres_lost_per_day: known.litres_lost_per_day,
    people_served: ram.installation.people_served ?? null,
    last_record_at: known.last_record_ms === null ? null : new Date(known.last_record_ms).toISOString(),
    days_without_word: known.days_without_word,
    latest: day === undefined ? null : latestOf(day),
    delivery_against_expected: known.delivery_against_expected,
    recent_delivery_l_per_day: recentDelivery(db, ram, known.last_record_ms),
  };
}

const latestOf = ({ date, beats_per_min, delivery_l_per_day, efficiency_daubuisson, fall_m }: DayFigures) => ({
  date,
  beats_per_min,
  delivery_l_per_day,
  efficiency_daubuisson,
  fall_m,
});

const classes = ['watch', 'plan a visit', 'go now'] as const;

/** The open finding of the highest class, the one with most water lost among equals. */
export function gravest(findings: readonly Finding[]): Finding | null {
  const open = findings.filter((finding) => finding.open);
  open.sort(
    (a, b) =>
      classes.indexOf(b.class) - classes.indexOf(a.class) ||
      (b.litres_lost_per_day ?? 0) - (a.litres_lost_per_day ?? 0),
  );
  return open[0] ?? null;
}

const weight: Record<Condition, number> = { stopped: 4, failing: 3, slipping: 2, 'no word': 1, holding: 0 };

function urgency(row: RoundsRow): number {
  const classed = row.finding === null ? 0 : classes.indexOf(row.finding.class) + 1;
  // litres a day times those who depend on them, squeezed so that it orders rams only within a condition
  const loss = Math.max(0, row.litres_lost_per_day ?? 0) * Math.max(1, row.people_served ?? 1);
  return weight[row.condition] * 10 + classed * 2 + loss / (loss + 100_000);
}

function recentDelivery(db: Connection, ram: StoredRam, last_ms: number | null): (number | null)[] {
  if (last_ms === null) return [];
  const from_ms = last_ms - SPARK_DAYS * DAY_MS;
  const days = chartedDays(db, ram.id, from_ms, last_ms + 1);
  const line: (number | null)[] = new Array(SPARK_DAYS).fill(null);
  days.rows.forEach((row, d) => {
    const value = row[placeOf('delivery_l_per_day')]!;
    const place = Math.min(SPARK_DAYS - 1, Math.floor((days.from_ms[d]! - from_ms) / DAY_MS));
    if (!Number.isNaN(value)) line[place] = value;
  });
  return line;
}
