import type { Connection } from './open';

/** What the samples of a local day say, before any expectation: kept so that only touched days are read again. */
export interface ObservationRow {
  date: string;
  from_ms: number;
  body: string;
}

export function keepObservations(db: Connection, ramId: number, rows: ObservationRow[]): void {
  const put = db.prepare('insert or replace into day_observation (ram_id, date, from_ms, body) values (?, ?, ?, ?)');
  for (const row of rows) put.run(ramId, row.date, row.from_ms, row.body);
}

export function forgetObservations(db: Connection, ramId: number): void {
  db.prepare('delete from day_observation where ram_id = ?').run(ramId);
}

export function listObservations(db: Connection, ramId: number): string[] {
  return db.prepare('select body from day_observation where ram_id = ? order by date').pluck().all(ramId) as string[];
}

/** A day's figures: the charted numbers side by side as float64 for quick season charts, the whole as JSON. */
export interface DayRow {
  date: string;
  from_ms: number;
  charted: Float64Array;
  body: string;
}

export function replaceDays(db: Connection, ramId: number, rows: DayRow[]): void {
  db.prepare('delete from day_figures where ram_id = ?').run(ramId);
  const put = db.prepare('insert into day_figures (ram_id, date, from_ms, charted, body) values (?, ?, ?, ?, ?)');
  for (const { date, from_ms, charted, body } of rows)
    put.run(ramId, date, from_ms, Buffer.from(charted.buffer, charted.byteOffset, charted.byteLength), body);
}

export function listDays(db: Connection, ramId: number, from_ms: number, to_ms: number): string[] {
  return db
    .prepare('select body from day_figures where ram_id = ? and from_ms >= ? and from_ms < ? order by date')
    .pluck()
    .all(ramId, from_ms, to_ms) as string[];
}

export function latestDays(db: Connection, ramId: number, count: number): string[] {
  const rows = db
    .prepare('select body from day_figures where ram_id = ? order by date desc limit ?')
    .pluck()
    .all(ramId, count) as string[];
  return rows.reverse();
}

/** The charted numbers of each day: starts of the days and one row of float64 per day. */
export function chartedDays(
  db: Connection,
  ramId: number,
  from_ms: number,
  to_ms: number,
): { from_ms: number[]; rows: Float64Array[] } {
  const found = db
    .prepare('select from_ms, charted from day_figures where ram_id = ? and from_ms >= ? and from_ms < ? order by date')
    .raw()
    .all(ramId, from_ms, to_ms) as [number, Buffer][];
  return {
    from_ms: found.map(([at]) => at),
    rows: found.map(([, blob]) => new Float64Array(new Uint8Array(blob).buffer)),
  };
}

/** What the last examination of a ram found, with the number of the method that found it. */
export function keepExamination(db: Connection, ramId: number, method: number, body: string): void {
  db.prepare('insert or replace into examination (ram_id, method, body) values (?, ?, ?)').run(ramId, method, body);
}

export function readExamination(db: Connection, ramId: number): { method: number; body: string } | null {
  return (
    (db.prepare('select method, body from examination where ram_id = ?').get(ramId) as
      | { method: number; body: string }
      | undefined) ?? null
  );
}
