import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createGunzip } from 'node:zlib';
import { Router } from 'express';
import { z } from 'zod';
import { traceOf } from '../figures/burst-trace';
import type { LoadJobs } from '../loading/jobs';
import type { LoadProgress } from '../shapes/load';
import { UserError } from '../shapes/problem';
import { fileReading } from '../shapes/reading';
import { readBurst } from '../store/bursts';
import { loadReceipt } from '../store/loads';
import type { Connection } from '../store/open';
import { originalChunks } from '../store/originals';
import { valid } from './problems';
import { MOST_UPLOAD_BYTES, type Uploads } from './uploads';

export const uploadQuery = z.object({ file: z.string().trim().min(1).max(255) });
export const readingBody = z.object({ reading: fileReading.optional() });
const number = z.coerce.number().int().min(1);

/** Uploads, loads, receipts and bursts. */
export function loadRoutes(db: Connection, dataFolder: string, uploads: Uploads, jobs: LoadJobs): Router {
  const routes = Router();
  routes.post('/rams/:ram/uploads', async (request, response) => {
    const { file } = valid(uploadQuery, request.query, 'The name of the file (?file=NAME)');
    const told = Number(request.headers['content-length'] ?? 0);
    if (told > MOST_UPLOAD_BYTES) {
      // answered without reading the body, which would only be thrown away
      response.set('connection', 'close');
      throw new UserError(
        `${file} has ${told} bytes; at most ${MOST_UPLOAD_BYTES} are taken here. Load it with "clackwatch load", or split it.`,
        'too large',
      );
    }
    const upload = await uploads.receive(request.params.ram, file, request);
    response.status(201).location(`/api/uploads/${upload.upload_id}`).json(upload);
  });
  routes.get('/uploads/:upload', async (request, response) => {
    response.json(await uploads.preview(request.params.upload, null));
  });
  routes.post('/uploads/:upload/preview', async (request, response) => {
    const { reading } = valid(readingBody, request.body, 'The reading of the file');
    response.json(await uploads.preview(request.params.upload, reading ?? null));
  });
  routes.post('/uploads/:upload/load', async (request, response) => {
    const { reading } = valid(readingBody, request.body, 'The reading of the file');
    const { ram, file } = uploads.find(request.params.upload);
    const looked = await uploads.preview(request.params.upload, reading ?? null);
    const open = looked.questions.find((question) => question.must_answer);
    if (open !== undefined)
      throw new UserError(`${file.name} cannot be stored before this is answered: ${open.question}`);
    const job = jobs.start({ data_folder: dataFolder, ram, file, reading: looked.reading }, () =>
      uploads.forget(request.params.upload),
    );
    response.status(202).location(`/api/jobs/${job.job_id}`).json(job);
  });
  routes.get('/jobs/:job', (request, response) => {
    response.json(jobOf(jobs, request.params.job));
  });
  routes.get('/jobs/:job/events', (request, response) => {
    const job = jobOf(jobs, request.params.job);
    response.set({ 'content-type': 'text/event-stream', 'cache-control': 'no-store' }).flushHeaders();
    const ended = (progress: LoadProgress) => progress.stage === 'done' || progress.stage === 'failed';
    const tell = (progress: LoadProgress) => {
      response.write(`data: ${JSON.stringify(progress)}\n\n`);
      if (ended(progress)) response.end();
    };
    const stop = jobs.watch(job.job_id, tell);
    response.on('close', stop);
    tell(job);
  });
  routes.get('/loads/:load', (request, response) => {
    response.json(loadReceipt(db, valid(number, request.params.load, 'The number of the load')));
  });
  routes.get('/loads/:load/original', async (request, response) => {
    const receipt = loadReceipt(db, valid(number, request.params.load, 'The number of the load'));
    response.type('application/octet-stream').attachment(receipt.file);
    await pipeline(Readable.from(originalChunks(db, receipt.sha256)), createGunzip(), response);
  });
  routes.get('/bursts/:burst', (request, response) => {
    const burst = readBurst(db, valid(number, request.params.burst, 'The number of the burst'));
    response.json({ beats: burst.beats, trace: traceOf(burst) });
  });
  return routes;
}

function jobOf(jobs: LoadJobs, id: string): LoadProgress {
  const job = jobs.find(id);
  if (job === undefined)
    throw new UserError('That job is not known any more; look at the receipts of the ram.', 'not found');
  return job;
}
