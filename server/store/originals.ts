import type { Connection } from './open';

/** Keeps the uploaded file as it came, gzip-compressed, in chunks, under its SHA-256, inside the load's own transaction. */
export class OriginalWriter {
  private place = 0;
  private readonly insert;

  constructor(
    db: Connection,
    private readonly sha256: string,
    bytes: number,
  ) {
    db.prepare('insert into original (sha256, bytes) values (?, ?)').run(sha256, bytes);
    this.insert = db.prepare('insert into original_chunk (sha256, place, data) values (?, ?, ?)');
  }

  add(chunk: Uint8Array): void {
    this.insert.run(this.sha256, this.place++, chunk);
  }
}

export function originalIsKept(db: Connection, sha256: string): boolean {
  return db.prepare('select 1 from original where sha256 = ?').get(sha256) !== undefined;
}

/** The gzip chunks of a kept original, in order. */
export function* originalChunks(db: Connection, sha256: string): Generator<Buffer> {
  const count = db.prepare('select count(*) from original_chunk where sha256 = ?').pluck().get(sha256) as number;
  const read = db.prepare('select data from original_chunk where sha256 = ? and place = ?').pluck();
  for (let place = 0; place < count; place++) yield read.get(sha256, place) as Buffer;
}
