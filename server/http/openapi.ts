import { z } from 'zod';
import { channelName } from '../shapes/channel';
import { dayFigures, spanFigures } from '../shapes/figure';
import { finding } from '../shapes/finding';
import { installation } from '../shapes/installation';
import { loadProgress, receipt, upload } from '../shapes/load';
import { problem } from '../shapes/problem';
import { ramDetail, rounds, storedVisit } from '../shapes/ram';
import { bucketSeries, burstBeats, seasonCharts } from '../shapes/series';
import { visit } from '../shapes/visit';
import { readingBody, uploadQuery } from './routes-loads';
import { figuresQuery, seriesQuery, spanQuery } from './routes-rams';

const name = z.object({ key: z.string(), name: z.string() });
const status = z.object({ version: z.string(), demonstration: z.boolean(), as_of: z.iso.datetime() });
const burstTrace = z.object({
  beats: burstBeats,
  trace: z.object({
    channel: z.string(),
    unit: z.string(),
    at_s: z.array(z.number()),
    min: z.array(z.number().nullable()),
    max: z.array(z.number().nullable()),
  }),
});

interface Operation {
  method: 'get' | 'post' | 'put';
  path: string;
  summary: string;
  query?: z.ZodObject;
  body?: z.ZodType | 'bytes';
  status?: number;
  answer: { name: string; schema: z.ZodType } | 'bytes' | 'events' | 'schema';
}

const shapes = {
  Status: status,
  Rounds: rounds,
  RamNames: z.array(name),
  RamName: name,
  Ram: ramDetail,
  SeasonCharts: seasonCharts,
  Series: bucketSeries,
  Figures: z.array(z.union([dayFigures, spanFigures])),
  Findings: z.array(finding),
  Visits: z.array(storedVisit),
  Visit: storedVisit,
  Upload: upload,
  LoadProgress: loadProgress,
  Receipt: receipt,
  Burst: burstTrace,
} as const;

const answers = (shape: keyof typeof shapes): Operation['answer'] => ({ name: shape, schema: shapes[shape] });

/** Every operation of the API, in the order of the rooms. The same schemas validate the requests. */
const operations: Operation[] = [
  {
    method: 'get',
    path: '/api/status',
    summary: 'Which program, and whether this is the demonstration',
    answer: answers('Status'),
  },
  {
    method: 'get',
    path: '/api/rounds',
    summary: 'All rams, the one that needs a visit first on top',
    answer: answers('Rounds'),
  },
  { method: 'get', path: '/api/findings', summary: 'Findings of all rams', answer: answers('Findings') },
  {
    method: 'get',
    path: '/api/installation-schema',
    summary: 'JSON Schema of the description of a ram',
    answer: 'schema',
  },
  { method: 'get', path: '/api/rams', summary: 'Names and keys of the rams', answer: answers('RamNames') },
  {
    method: 'post',
    path: '/api/rams',
    summary: 'Add a ram',
    body: installation,
    status: 201,
    answer: answers('RamName'),
  },
  {
    method: 'get',
    path: '/api/rams/{ram}',
    summary: 'One ram: installation, condition, latest figures, findings, visits',
    answer: answers('Ram'),
  },
  {
    method: 'put',
    path: '/api/rams/{ram}',
    summary: 'Correct the description of a ram; all its figures are made anew',
    body: installation,
    answer: answers('Ram'),
  },
  {
    method: 'get',
    path: '/api/rams/{ram}/season',
    summary: 'Season charts: daily fall, beats, delivery and efficiency in at most 1,000 buckets',
    query: spanQuery,
    answer: answers('SeasonCharts'),
  },
  {
    method: 'get',
    path: '/api/rams/{ram}/series/{channel}',
    summary: 'One channel in at most 1,000 buckets of least, mean and greatest',
    query: seriesQuery,
    answer: answers('Series'),
  },
  {
    method: 'get',
    path: '/api/rams/{ram}/figures',
    summary: 'Figures by logger interval, hour or local day',
    query: figuresQuery,
    answer: answers('Figures'),
  },
  { method: 'get', path: '/api/rams/{ram}/findings', summary: 'Findings of one ram', answer: answers('Findings') },
  { method: 'get', path: '/api/rams/{ram}/visits', summary: 'Visits of one ram', answer: answers('Visits') },
  {
    method: 'post',
    path: '/api/rams/{ram}/visits',
    summary: 'Enter a visit',
    body: visit,
    status: 201,
    answer: answers('Visit'),
  },
  {
    method: 'post',
    path: '/api/rams/{ram}/uploads',
    summary: 'Send a logger file; nothing is stored yet',
    query: uploadQuery,
    body: 'bytes',
    status: 201,
    answer: answers('Upload'),
  },
  { method: 'get', path: '/api/uploads/{upload}', summary: 'How a received file is read', answer: answers('Upload') },
  {
    method: 'post',
    path: '/api/uploads/{upload}/preview',
    summary: 'Preview a corrected reading',
    body: readingBody,
    answer: answers('Upload'),
  },
  {
    method: 'post',
    path: '/api/uploads/{upload}/load',
    summary: 'Accept the reading and store the file',
    body: readingBody,
    status: 202,
    answer: answers('LoadProgress'),
  },
  { method: 'get', path: '/api/jobs/{job}', summary: 'How far a load has come', answer: answers('LoadProgress') },
  {
    method: 'get',
    path: '/api/jobs/{job}/events',
    summary: 'The same, as it happens (server-sent events)',
    answer: 'events',
  },
  { method: 'get', path: '/api/loads/{load}', summary: 'The receipt of a load', answer: answers('Receipt') },
  { method: 'get', path: '/api/loads/{load}/original', summary: 'The file as it was loaded', answer: 'bytes' },
  { method: 'get', path: '/api/bursts/{burst}', summary: 'A burst: its beats and its trace', answer: answers('Burst') },
];

/** The OpenAPI 3.1 document of the API. */
export function openapi(version: string): object {
  const registry = z.registry<{ id: string }>();
  for (const [id, schema] of Object.entries(shapes)) registry.add(schema, { id });
  registry.add(problem, { id: 'Problem' });
  const { schemas } = z.toJSONSchema(registry, { uri: (id) => `#/components/schemas/${id}`, io: 'output' });
  const paths: Record<string, Record<string, object>> = {};
  for (const operation of operations) {
    paths[operation.path] ??= {};
    paths[operation.path]![operation.method] = describe(operation);
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Clackwatch',
      version,
      description:
        'Keeps watch over installed hydraulic rams through their logger files. Every write carries the header "x-clackwatch: 1".',
    },
    paths,
    components: {
      schemas: Object.fromEntries(Object.entries(schemas).map(([id, schema]) => [id, withoutIds(schema)])),
    },
  };
}

function describe(operation: Operation): object {
  const inPath = [...operation.path.matchAll(/\{(\w+)\}/g)].map(([, parameter]) => ({
    name: parameter,
    in: 'path',
    required: true,
    schema: parameter === 'channel' ? withoutIds(z.toJSONSchema(channelName)) : { type: 'string' },
  }));
  const query = operation.query === undefined ? [] : queryParameters(operation.query);
  const write =
    operation.method === 'get' ? [] : [{ name: 'x-clackwatch', in: 'header', required: true, schema: { const: '1' } }];
  return {
    summary: operation.summary,
    operationId: `${operation.method}${operation.path
      .replace(/^\/api/, '')
      .replace(/[^a-z]+(\w)/g, (_, letter: string) => letter.toUpperCase())
      .replace(/\W/g, '')}`,
    parameters: [...inPath, ...query, ...write],
    ...(operation.body === undefined ? {} : { requestBody: { required: true, content: bodyContent(operation.body) } }),
    responses: {
      [operation.status ?? 200]: { description: 'As asked', content: answerContent(operation.answer) },
      default: {
        description: 'A problem document (RFC 9457)',
        content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
      },
    },
  };
}

const bodyContent = (body: z.ZodType | 'bytes') =>
  body === 'bytes'
    ? { 'application/octet-stream': { schema: { type: 'string', format: 'binary' } } }
    : { 'application/json': { schema: withoutIds(z.toJSONSchema(body, { io: 'input' })) } };

function answerContent(answer: Operation['answer']): object {
  if (answer === 'bytes') return { 'application/octet-stream': { schema: { type: 'string', format: 'binary' } } };
  if (answer === 'events') return { 'text/event-stream': { schema: { type: 'string' } } };
  if (answer === 'schema') return { 'application/json': { schema: { type: 'object' } } };
  return { 'application/json': { schema: { $ref: `#/components/schemas/${answer.name}` } } };
}

function queryParameters(query: z.ZodObject): object[] {
  const { properties = {}, required = [] } = z.toJSONSchema(query, { io: 'input' }) as {
    properties?: Record<string, object>;
    required?: string[];
  };
  return Object.entries(properties).map(([parameter, schema]) => ({
    name: parameter,
    in: 'query',
    required: required.includes(parameter),
    schema,
  }));
}

/** Inside an OpenAPI document the schemas are addressed by their place, not by identifiers of their own. */
function withoutIds(schema: object): object {
  const { $schema: _s, $id: _i, id: _d, ...rest } = schema as Record<string, unknown>;
  return rest;
}
