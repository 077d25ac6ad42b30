import { randomUUID } from 'node:crypto';
import { createWriteStream, mkdirSync, readdirSync, rmSync, statSync } from 'node:fs';
import path from 'node:path';
import { type Readable, Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { type Inspection, inspectFile, inspectWith } from '../ingest/inspect';
import { fileSource } from '../ingest/source';
import { sha256Of } from '../loading/file-identity';
import { type FileToLoad, ramContext } from '../loading/load-file';
import type { Upload } from '../shapes/load';
import { UserError } from '../shapes/problem';
import type { FileReading } from '../shapes/reading';
import { loadOfFile } from '../store/loads';
import type { Connection } from '../store/open';
import { findRam } from '../store/rams';

/** Larger than ten years of one-second records of six channels in text would be: such a file is split, or loaded on the command line. */
export const MOST_UPLOAD_BYTES = 2 * 1024 ** 3;

interface Received {
  ram: string;
  file: FileToLoad;
}

/** Files that have been received and wait for their reading to be accepted. They lie in the data folder until they are loaded. */
export class Uploads {
  private readonly received = new Map<string, Received>();
  private readonly folder: string;

  constructor(
    private readonly db: Connection,
    dataFolder: string,
    private readonly now: () => number,
  ) {
    this.folder = path.join(dataFolder, 'incoming');
    mkdirSync(this.folder, { recursive: true });
    // what an earlier run left unaccepted is known to nobody any more
    for (const left of readdirSync(this.folder)) rmSync(path.join(this.folder, left), { force: true });
  }

  /** Takes a file's bytes and looks at it. A file that cannot be read at all is thrown away again. */
  async receive(ramName: string, name: string, body: Readable): Promise<Upload> {
    const ram = findRam(this.db, ramName);
    const id = randomUUID();
    const place = path.join(this.folder, id);
    try {
      await pipeline(body, capped(name), createWriteStream(place));
      const file: FileToLoad = { path: place, name, bytes: statSync(place).size, sha256: await sha256Of(place) };
      const looked = await inspectFile(fileSource(place, name), ramContext(this.db, ram, this.now()));
      this.received.set(id, { ram: ram.key, file });
      return this.describe(id, looked);
    } catch (error) {
      rmSync(place, { force: true });
      throw error;
    }
  }

  async preview(id: string, reading: FileReading | null): Promise<Upload> {
    const { ram, file } = this.find(id);
    const context = ramContext(this.db, findRam(this.db, ram), this.now());
    const source = fileSource(file.path, file.name);
    return this.describe(
      id,
      reading === null ? await inspectFile(source, context) : await inspectWith(source, context, reading),
    );
  }

  find(id: string): Received {
    const found = this.received.get(id);
    if (found === undefined) throw new UserError('That upload is not here any more; drop the file again.', 'not found');
    return found;
  }

  forget(id: string): void {
    const found = this.received.get(id);
    if (found === undefined) return;
    this.received.delete(id);
    rmSync(found.file.path, { force: true });
  }

  private describe(id: string, looked: Inspection): Upload {
    const { ram, file } = this.find(id);
    const found = findRam(this.db, ram);
    return {
      upload_id: id,
      ram: found.name,
      file: file.name,
      bytes: file.bytes,
      sha256: file.sha256,
      already_loaded: loadOfFile(this.db, found.id, file.sha256),
      ...looked,
    };
  }
}

function capped(name: string): Transform {
  let bytes = 0;
  return new Transform({
    transform(chunk: Buffer, _encoding, done) {
      bytes += chunk.length;
      if (bytes > MOST_UPLOAD_BYTES)
        done(
          new UserError(
            `${name} is larger than ${MOST_UPLOAD_BYTES / 1024 ** 3} GiB, the most that is taken here; load it with "clackwatch load", or split it.`,
            'too large',
          ),
        );
      else done(null, chunk);
    },
  });
}
