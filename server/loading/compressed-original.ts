import { Worker } from 'node:worker_threads';
import type { Connection } from '../store/open';
import { OriginalWriter } from '../store/originals';

/**
 * What the compressing thread runs. It stands here as text because the thread needs nothing of the program: reading a file, gzip at its
 * quickest, and handing the pieces over.
 */
const COMPRESS = `
const { parentPort, workerData } = require('node:worker_threads');
const { createReadStream } = require('node:fs');
const { createGzip } = require('node:zlib');
const gzip = createReadStream(workerData, { highWaterMark: 1 << 18 })
  .on('error', (error) => { throw error; })
  .pipe(createGzip({ level: 1, chunkSize: 1 << 18 }));
gzip.on('data', (piece) => parentPort.postMessage(new Uint8Array(piece)));
`;

/**
 * Keeps a file as it came, compressed in a thread of its own while its records are read in this one, within the transaction that the
 * connection is in. Resolves when the last piece is stored; rejects, and stores no more, once the signal aborts.
 */
export function keepCompressed(
  db: Connection,
  file: { path: string; bytes: number; sha256: string },
  signal: AbortSignal,
): Promise<void> {
  const original = new OriginalWriter(db, file.sha256, file.bytes);
  return new Promise((resolve, reject) => {
    const thread = new Worker(COMPRESS, { eval: true, workerData: file.path });
    const fail = (error: unknown) => {
      thread.removeAllListeners('message');
      void thread.terminate();
      reject(error);
    };
    thread.on('message', (piece: Uint8Array) => {
      try {
        original.add(piece);
      } catch (error) {
        fail(error);
      }
    });
    thread.on('error', fail);
    // every piece has been handed over before a thread ends
    thread.on('exit', () => resolve());
    signal.addEventListener('abort', () => fail(signal.reason), { once: true });
  });
}
