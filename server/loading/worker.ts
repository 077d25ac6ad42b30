import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads';
import { UserError } from '../shapes/problem';
import { openStore } from '../store/open';
import { findRam } from '../store/rams';
import type { LoadOrder, LoadRunner } from './jobs';
import { loadFile } from './load-file';

type Message =
  | { kind: 'progress'; stage: 'reading' | 'computing'; share: number; rows: number }
  | { kind: 'done'; load_id: number }
  | { kind: 'failed'; sentence: string };

/** Marks the worker thread's own start; the program's entry file serves both. */
const MARK = 'clackwatch-load';

/** A runner that gives each load a thread of its own, started from the program's entry file. */
export const inWorkerThread =
  (entry: URL): LoadRunner =>
  (order, onProgress) =>
    new Promise((resolve, reject) => {
      const worker = startThread(entry, { mark: MARK, order });
      worker.on('message', (message: Message) => {
        if (message.kind === 'progress') onProgress(message);
        else if (message.kind === 'done') resolve(message.load_id);
        else reject(new UserError(message.sentence));
      });
      worker.on('error', reject);
      worker.on('exit', (code) =>
        reject(new Error(`The load stopped unexpectedly (${code}); nothing of it was stored. Try again.`)),
      );
    });

/** While developing, the entry is TypeScript: the thread learns to read it first. */
function startThread(entry: URL, data: unknown): Worker {
  if (!entry.pathname.endsWith('.ts')) return new Worker(entry, { workerData: data });
  const source = `import('tsx/esm/api').then(({ register }) => { register(); return import(${JSON.stringify(entry.href)}); });`;
  return new Worker(source, { eval: true, workerData: data });
}

/** True in a thread that was started for a load: the caller must then run it and do nothing else. */
export const isLoadThread = (): boolean => !isMainThread && (workerData as { mark?: string } | null)?.mark === MARK;

export async function runLoadThread(): Promise<void> {
  const { order } = workerData as { order: LoadOrder };
  const say = (message: Message) => parentPort!.postMessage(message);
  try {
    const db = openStore(order.data_folder);
    try {
      let told = 0;
      const receipt = await loadFile(db, findRam(db, order.ram), order.file, order.reading, {
        now_ms: Date.now(),
        onProgress: (stage, share, rows) => {
          // four times a second is as often as anybody looks
          if (stage === 'reading' && Date.now() - told < 250) return;
          told = Date.now();
          say({ kind: 'progress', stage, share, rows });
        },
      });
      say({ kind: 'done', load_id: receipt.load_id });
    } finally {
      db.close();
    }
  } catch (error) {
    if (!(error instanceof UserError)) console.error(error);
    say({
      kind: 'failed',
      sentence:
        error instanceof UserError
          ? error.message
          : 'The load failed inside the program; nothing of it was stored. The log has the details.',
    });
  }
}
