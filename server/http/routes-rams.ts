import { Router } from 'express';
import { z } from 'zod';
import { channelSeriesOf } from '../figures/channel-series';
import { examinationOf, pageInstant } from '../figures/examination';
import { instantOf } from '../figures/local-days';
import { ramDetailOf, visitsOf } from '../figures/ram-detail';
import { recompute, refreshFigures } from '../figures/recompute';
import { roundsOf } from '../figures/rounds';
import { seasonOf } from '../figures/season';
import { everyChoices, figuresOf } from '../figures/span-figures';
import { channelName } from '../shapes/channel';
import { installation } from '../shapes/installation';
import { visit } from '../shapes/visit';
import type { Connection } from '../store/open';
import { addRam, describeRamAnew, findRam, listRams } from '../store/rams';
import { addVisit } from '../store/visits';
import { valid } from './problems';

const instant = z.iso.datetime({ offset: true }).or(z.iso.date());
export const spanQuery = z.object({ from: instant.optional(), to: instant.optional() });
export const seriesQuery = spanQuery.extend({ buckets: z.coerce.number().int().min(10).max(1000).default(1000) });
export const figuresQuery = spanQuery.extend({ every: z.enum(everyChoices).default('day') });

/** Rounds, rams, visits, figures and findings. */
export function ramRoutes(db: Connection, now: () => number): Router {
  const routes = Router();
  const spanOf = (query: z.infer<typeof spanQuery>, zone: string) => ({
    from_ms: query.from === undefined ? null : instantOf(query.from, zone),
    to_ms: query.to === undefined ? null : instantOf(query.to, zone),
  });

  routes.get('/rounds', (_request, response) => {
    response.json(roundsOf(db, now()));
  });
  routes.get('/findings', (_request, response) => {
    const at_ms = pageInstant(db, now());
    response.json(listRams(db).flatMap((ram) => examinationOf(db, ram, at_ms).findings));
  });
  routes.get('/rams', (_request, response) => {
    response.json(listRams(db).map(({ key, name }) => ({ key, name })));
  });
  routes.get('/installation-schema', (_request, response) => {
    response.json(z.toJSONSchema(installation, { io: 'input' }));
  });
  routes.post('/rams', (request, response) => {
    const ram = addRam(db, valid(installation, request.body, 'The description of the ram'));
    response
      .status(201)
      .location(`/api/rams/${encodeURIComponent(ram.key)}`)
      .json({ key: ram.key, name: ram.name });
  });
  routes.get('/rams/:ram', (request, response) => {
    response.json(ramDetailOf(db, findRam(db, request.params.ram), now()));
  });
  routes.put('/rams/:ram', (request, response) => {
    const ram = findRam(db, request.params.ram);
    const described = valid(installation, request.body, 'The description of the ram');
    db.transaction(() => recompute(db, describeRamAnew(db, ram, described), 'all'))();
    response.json(ramDetailOf(db, findRam(db, ram.key), now()));
  });
  routes.get('/rams/:ram/season', (request, response) => {
    const ram = findRam(db, request.params.ram);
    response.json(seasonOf(db, ram, spanOf(valid(spanQuery, request.query, 'The span'), ram.installation.time_zone)));
  });
  routes.get('/rams/:ram/series/:channel', (request, response) => {
    const ram = findRam(db, request.params.ram);
    const channel = valid(channelName, request.params.channel, `The channel "${request.params.channel}"`);
    const query = valid(seriesQuery, request.query, 'The span');
    response.json(channelSeriesOf(db, ram, channel, spanOf(query, ram.installation.time_zone), query.buckets));
  });
  routes.get('/rams/:ram/figures', (request, response) => {
    const ram = findRam(db, request.params.ram);
    const query = valid(figuresQuery, request.query, 'The span');
    response.json(figuresOf(db, ram, spanOf(query, ram.installation.time_zone), query.every));
  });
  routes.get('/rams/:ram/findings', (request, response) => {
    response.json(examinationOf(db, findRam(db, request.params.ram), pageInstant(db, now())).findings);
  });
  routes.get('/rams/:ram/visits', (request, response) => {
    response.json(visitsOf(db, findRam(db, request.params.ram)));
  });
  routes.post('/rams/:ram/visits', (request, response) => {
    const ram = findRam(db, request.params.ram);
    const entered = valid(visit, request.body, 'The visit');
    const at_ms = instantOf(entered.visited_at, ram.installation.time_zone);
    const kept = db.transaction(() => {
      const added = addVisit(db, ram.id, at_ms, entered);
      refreshFigures(db, ram);
      return added;
    })();
    response.status(201).json(visitsOf(db, ram).find((one) => one.visit_id === kept.id));
  });
  return routes;
}
