import { existsSync } from 'node:fs';
import path from 'node:path';
import compression from 'compression';
import express, { type Express } from 'express';
import { pageInstant } from '../figures/examination';
import { LoadJobs, type LoadRunner } from '../loading/jobs';
import { type Connection, setting } from '../store/open';
import { limitRate, noCrossSiteWrites, ownHostOnly, securityHeaders } from './guards';
import { openapi } from './openapi';
import { answerError, noSuchAddress } from './problems';
import { loadRoutes } from './routes-loads';
import { ramRoutes } from './routes-rams';
import { Uploads } from './uploads';

export interface AppParts {
  db: Connection;
  data_folder: string;
  /** Where the built page lies; the API alone is served where it was not built. */
  web_folder: string;
  run_load: LoadRunner;
  version: string;
  now: () => number;
}

/** The whole server as an Express application: guards first, then the API, then the page. */
export function makeApp({ db, data_folder, web_folder, run_load, version, now }: AppParts): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use(securityHeaders, ownHostOnly, limitRate, noCrossSiteWrites);
  // an event stream must not wait in a compressor's buffer
  app.use(
    compression({
      filter: (request, response) => !request.path.endsWith('/events') && compression.filter(request, response),
    }),
  );
  app.use('/api', express.json({ limit: '1mb' }));
  app.get('/api/status', (_request, response) => {
    response.json({
      version,
      demonstration: setting(db, 'demonstration_as_of') !== null,
      as_of: new Date(pageInstant(db, now())).toISOString(),
    });
  });
  app.get('/api/openapi.json', (_request, response) => {
    response.json(openapi(version));
  });
  app.use('/api', ramRoutes(db, now));
  app.use('/api', loadRoutes(db, data_folder, new Uploads(db, data_folder, now), new LoadJobs(run_load)));
  app.use('/api', noSuchAddress);
  if (existsSync(path.join(web_folder, 'index.html'))) {
    app.use('/assets', express.static(path.join(web_folder, 'assets'), { immutable: true, maxAge: '1y' }));
    app.use(express.static(web_folder));
  }
  app.use(noSuchAddress);
  app.use(answerError);
  return app;
}
