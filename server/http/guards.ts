import type { RequestHandler } from 'express';
import { rateLimit } from 'express-rate-limit';
import helmet from 'helmet';
import { sendProblem } from './problems';

/** Only this machine's own names are answered: a foreign Host header is a page elsewhere trying to reach in (DNS rebinding). */
export const ownHostOnly: RequestHandler = (request, response, next) => {
  const host = (request.headers.host ?? '').replace(/:\d+$/, '').toLowerCase();
  if (host === '127.0.0.1' || host === 'localhost' || host === '[::1]') return next();
  sendProblem(
    response,
    403,
    'Refused',
    'Clackwatch answers only on this machine (127.0.0.1 or localhost). Opening it to a network needs accounts, which this version does not have.',
  );
};

/** Writes need a header that a page of another site cannot send without asking, and an origin of our own where one is told. */
export const noCrossSiteWrites: RequestHandler = (request, response, next) => {
  if (request.method === 'GET' || request.method === 'HEAD') return next();
  const { origin } = request.headers;
  const ownOrigin = origin === undefined || origin === `http://${request.headers.host}`;
  const site = request.headers['sec-fetch-site'];
  const ownSite = site === undefined || site === 'same-origin' || site === 'none';
  if (ownOrigin && ownSite && request.headers['x-clackwatch'] === '1') return next();
  sendProblem(
    response,
    403,
    'Refused',
    'A change must come from Clackwatch itself or carry the header "x-clackwatch: 1".',
  );
};

export const securityHeaders = helmet({
  contentSecurityPolicy: {
    useDefaults: false,
    directives: {
      defaultSrc: ["'self'"],
      imgSrc: ["'self'", 'data:', 'blob:'],
      objectSrc: ["'none'"],
      baseUri: ["'none'"],
      formAction: ["'self'"],
      frameAncestors: ["'none'"],
    },
  },
  // plain http on the loopback: nothing to promise about https
  strictTransportSecurity: false,
});

export const limitRate = rateLimit({
  windowMs: 60_000,
  limit: 1_200,
  standardHeaders: 'draft-8',
  legacyHeaders: false,
  handler: (_request, response) =>
    sendProblem(response, 429, 'Too many requests', 'More than 1,200 requests in a minute; wait a little.'),
});
