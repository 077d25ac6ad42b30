import { randomUUID } from 'node:crypto';
import { EventEmitter } from 'node:events';
import type { LoadProgress } from '../shapes/load';
import type { FileReading } from '../shapes/reading';
import type { FileToLoad } from './load-file';

export interface LoadOrder {
  data_folder: string;
  ram: string;
  file: FileToLoad;
  reading: FileReading;
}

/** Runs one load away from the requests and reports how far it is. Rejects with the sentence for the person. */
export type LoadRunner = (
  order: LoadOrder,
  onProgress: (progress: Pick<LoadProgress, 'stage' | 'share' | 'rows'>) => void,
) => Promise<number>;

/** Finished jobs are remembered for an hour, so that a page that was closed can still ask. */
const REMEMBER_MS = 3_600_000;

/** Loads one after another, in the order in which they were asked for; one bad file does not stop the others. */
export class LoadJobs {
  private readonly jobs = new Map<string, LoadProgress>();
  private readonly events = new EventEmitter().setMaxListeners(0);
  private last: Promise<void> = Promise.resolve();

  constructor(private readonly run: LoadRunner) {}

  start(order: LoadOrder, afterwards: () => void): LoadProgress {
    const job: LoadProgress = {
      job_id: randomUUID(),
      ram: order.ram,
      file: order.file.name,
      stage: 'waiting',
      share: 0,
      rows: 0,
      load_id: null,
      error: null,
    };
    this.jobs.set(job.job_id, job);
    this.last = this.last.then(() => this.work(job.job_id, order).finally(afterwards));
    return job;
  }

  find(jobId: string): LoadProgress | undefined {
    return this.jobs.get(jobId);
  }

  /** Calls back on every change of a job until the returned function is called. */
  watch(jobId: string, tell: (progress: LoadProgress) => void): () => void {
    this.events.on(jobId, tell);
    return () => this.events.off(jobId, tell);
  }

  private async work(jobId: string, order: LoadOrder): Promise<void> {
    try {
      const load_id = await this.run(order, (progress) => this.change(jobId, progress));
      this.change(jobId, { stage: 'done', share: 1, load_id });
    } catch (error) {
      this.change(jobId, { stage: 'failed', error: error instanceof Error ? error.message : String(error) });
    }
    setTimeout(() => this.jobs.delete(jobId), REMEMBER_MS).unref();
  }

  private change(jobId: string, change: Partial<LoadProgress>): void {
    const job = this.jobs.get(jobId);
    if (job === undefined) return;
    const next = { ...job, ...change };
    this.jobs.set(jobId, next);
    this.events.emit(jobId, next);
  }
}
