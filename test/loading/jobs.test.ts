import { expect, test } from 'vitest';
import { LoadJobs, type LoadOrder } from '../../server/loading/jobs';

const order = (name: string): LoadOrder => ({
  data_folder: '',
  ram: 'r',
  file: { path: '', name, bytes: 1, sha256: '' },
  reading: {} as LoadOrder['reading'],
});
const ended = (jobs: LoadJobs, id: string) =>
  new Promise<void>((resolve) => {
    const stop = jobs.watch(id, ({ stage }) => {
      if (stage !== 'done' && stage !== 'failed') return;
      stop();
      resolve();
    });
  });

test('loads run one after another, and one bad file does not stop the next', async () => {
  const running: string[] = [];
  const jobs = new LoadJobs(async ({ file }, onProgress) => {
    running.push(`start ${file.name}`);
    onProgress({ stage: 'reading', share: 0.5, rows: 10 });
    await new Promise((resolve) => setTimeout(resolve, 5));
    running.push(`end ${file.name}`);
    if (file.name === 'bad') throw new Error('the file is bad');
    return 7;
  });
  let swept = 0;
  const bad = jobs.start(order('bad'), () => swept++);
  const good = jobs.start(order('good'), () => swept++);
  expect(good.stage).toBe('waiting');
  await ended(jobs, good.job_id);
  await new Promise((resolve) => setTimeout(resolve, 1));
  expect(running).toEqual(['start bad', 'end bad', 'start good', 'end good']);
  expect(jobs.find(bad.job_id)).toMatchObject({ stage: 'failed', error: 'the file is bad', load_id: null });
  expect(jobs.find(good.job_id)).toMatchObject({ stage: 'done', share: 1, load_id: 7, rows: 10 });
  expect(swept).toBe(2);
});
