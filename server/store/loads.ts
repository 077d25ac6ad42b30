import { type Receipt, receipt } from '../shapes/load';
import { UserError } from '../shapes/problem';
import { type FileReading, fileReading } from '../shapes/reading';
import type { Connection } from './open';

export interface LoadRow {
  load_id: number;
  file: string;
  loaded_at: string;
  rows_new: number;
}

/** The load that brought this very file to this ram, if there was one. */
export function loadOfFile(
  db: Connection,
  ramId: number,
  sha256: string,
): { load_id: number; loaded_at: string } | null {
  const row = db.prepare('select id, loaded_at from load where ram_id = ? and sha256 = ?').get(ramId, sha256) as
    | { id: number; loaded_at: number }
    | undefined;
  return row === undefined ? null : { load_id: row.id, loaded_at: new Date(row.loaded_at).toISOString() };
}

/** Opens a load; its receipt is written when it is finished, in the same transaction. */
export function beginLoad(
  db: Connection,
  ramId: number,
  sha256: string,
  file: string,
  kind: string,
  loaded_at_ms: number,
): number {
  const { lastInsertRowid } = db
    .prepare("insert into load (ram_id, sha256, file, loaded_at, kind, receipt) values (?, ?, ?, ?, ?, '')")
    .run(ramId, sha256, file, loaded_at_ms, kind);
  return Number(lastInsertRowid);
}

export function finishLoad(db: Connection, done: Receipt): void {
  db.prepare('update load set receipt = ? where id = ?').run(JSON.stringify(done), done.load_id);
}

export function loadReceipt(db: Connection, loadId: number): Receipt {
  const body = db.prepare('select receipt from load where id = ?').pluck().get(loadId) as string | undefined;
  if (body === undefined) throw new UserError(`There is no load number ${loadId}.`, 'not found');
  return receipt.parse(JSON.parse(body));
}

export function listLoads(db: Connection, ramId: number): LoadRow[] {
  return db
    .prepare(
      `select id load_id, file, strftime('%Y-%m-%dT%H:%M:%fZ', loaded_at / 1000.0, 'unixepoch') loaded_at, json_extract(receipt, '$.rows_new') rows_new
       from load where ram_id = ? order by id desc`,
    )
    .all(ramId) as LoadRow[];
}

/** Readings accepted for a ram's loggers, newest first. */
export function acceptedReadings(db: Connection, ramId: number): FileReading[] {
  const rows = db
    .prepare('select reading from accepted_reading where ram_id = ? order by accepted_at desc, id desc')
    .pluck()
    .all(ramId) as string[];
  return rows.map((row) => fileReading.parse(JSON.parse(row)));
}

export function rememberReading(db: Connection, ramId: number, reading: FileReading, accepted_at_ms: number): void {
  db.prepare(
    'insert into accepted_reading (ram_id, accepted_at, reading) values (?, ?, ?) on conflict (ram_id, reading) do update set accepted_at = excluded.accepted_at',
  ).run(ramId, accepted_at_ms, JSON.stringify(reading));
}
