import { request } from 'node:http';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { dayFigures } from '../../server/shapes/figure';
import { loadProgress, receipt, upload } from '../../server/shapes/load';
import { problem } from '../../server/shapes/problem';
import { ramDetail, rounds } from '../../server/shapes/ram';
import { bucketSeries, seasonCharts } from '../../server/shapes/series';
import { logText, newFolder, type Served, serve, testRam } from '../serve';

let served: Served;
beforeAll(async () => {
  served = await serve('--data', newFolder());
});
afterAll(() => served.stop());

const get = (address: string) => fetch(`${served.address}/api${address}`);
const post = (address: string, body: unknown, headers: Record<string, string> = {}) =>
  fetch(`${served.address}/api${address}`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', 'x-clackwatch': '1', ...headers },
    body: JSON.stringify(body),
  });
const send = (ram: string, name: string, bytes: string | Uint8Array<ArrayBuffer>) =>
  fetch(`${served.address}/api/rams/${ram}/uploads?file=${encodeURIComponent(name)}`, {
    method: 'POST',
    headers: { 'content-type': 'application/octet-stream', 'x-clackwatch': '1' },
    body: bytes,
  });

async function problemOf(response: Response) {
  expect(response.headers.get('content-type')).toContain('application/problem+json');
  return problem.parse(await response.json());
}

async function loaded(uploadId: string) {
  const job = loadProgress.parse(await (await post(`/uploads/${uploadId}/load`, {})).json());
  const events = await (await get(`/jobs/${job.job_id}/events`)).text();
  return loadProgress.parse(
    JSON.parse(
      events
        .trim()
        .split('\n\n')
        .at(-1)!
        .replace(/^data: /, ''),
    ),
  );
}

test('the whole way: add a ram, send a file, look, load, read figures', async () => {
  const added = await post('/rams', testRam);
  expect(added.status).toBe(201);
  const sent = await send('mill-lade', 'march.csv', logText(12));
  expect(sent.status).toBe(201);
  const looked = upload.parse(await sent.json());
  expect(looked.reading.columns.map((c) => c.channel)).toEqual(
    expect.arrayContaining(['beat_count', 'chamber_pressure', 'tank_level']),
  );
  expect(looked.already_loaded).toBeNull();
  const done = await loaded(looked.upload_id);
  expect(done).toMatchObject({ stage: 'done', error: null });
  const got = receipt.parse(await (await get(`/loads/${done.load_id}`)).json());
  expect(got).toMatchObject({ rows_read: 1728, rows_new: 1728, rows_refused: 0, gaps: [], step_s: 600 });

  const days = (await (await get('/rams/mill-lade/figures?every=day')).json()) as unknown[];
  const fifth = dayFigures.parse(days[5]);
  expect(fifth.beats_per_min!.value).toBeCloseTo(60, 3);
  expect(fifth.delivery_l_per_day!.footing).toBe('from tank');
  expect(fifth.delivery_l_per_day!.value / (0.12 * 86_400)).toBeCloseTo(1, 1);
  expect(ramDetail.parse(await (await get('/rams/mill-lade')).json()).latest).not.toBeNull();
  expect(rounds.parse(await (await get('/rounds')).json()).rows).toHaveLength(1);
  expect(seasonCharts.parse(await (await get('/rams/mill-lade/season')).json()).at_ms.length).toBeGreaterThan(10);
  const series = bucketSeries.parse(await (await get('/rams/mill-lade/series/tank_level?buckets=100')).json());
  expect(series.at_ms.length).toBeLessThanOrEqual(100);
  const original = await (await get(`/loads/${done.load_id}/original`)).text();
  expect(original).toBe(logText(12));
});

test('the same file again adds nothing and says so; the remembered reading is used for the next', async () => {
  const again = upload.parse(await (await send('mill-lade', 'again.csv', logText(12))).json());
  expect(again.already_loaded).not.toBeNull();
  expect(await loaded(again.upload_id)).toMatchObject({
    stage: 'failed',
    error: expect.stringContaining('nothing to add'),
  });
  const next = upload.parse(await (await send('mill-lade', 'more.csv', logText(6, 10))).json());
  expect(next.remembered).toBe(true);
  const done = await loaded(next.upload_id);
  const got = receipt.parse(await (await get(`/loads/${done.load_id}`)).json());
  expect(got.rows_new + got.rows_known + got.rows_contradicting).toBe(864);
});

test('a visit with its buckets changes the footing of the waste', async () => {
  const entered = await post('/rams/mill-lade/visits', {
    visited_at: '2026-03-05T10:00',
    bucket_tests: [
      { of: 'delivery', litres: 10, seconds: [83, 84, 83.5] },
      { of: 'waste', litres: 20, seconds: [20.1, 20.0, 20.3] },
    ],
    counted_beats: { beats: 60, seconds: 60 },
  });
  expect(entered.status).toBe(201);
  const day = dayFigures.parse(
    ((await (await get('/rams/mill-lade/figures?from=2026-03-06&to=2026-03-07')).json()) as unknown[])[0],
  );
  expect(day.waste_l_per_day).toMatchObject({ footing: 'bucket-scaled' });
  expect(day.efficiency_daubuisson!.value).toBeGreaterThan(0.3);
  expect(day.efficiency_daubuisson!.value).toBeGreaterThan(day.efficiency_rankine!.value);
});

test('what cannot be gets one sentence and changes nothing', async () => {
  const before = await (await get('/rams')).json();
  for (const [body, words] of [
    [{ ...testRam, name: 'A', fall_m: 30, lift_m: 28 }, /fall \(30 m\) is not below the lift/],
    [{ ...testRam, name: 'B', drive_pipe: { length_m: 18, bore_mm: -50 } }, /bore is -50; it must be above 0 mm/],
    [{ ...testRam, name: 'C', time_zone: 'Nowhere/Here' }, /is not an IANA zone/],
  ] as const) {
    const answer = await post('/rams', body);
    expect(answer.status).toBe(400);
    expect((await problemOf(answer)).detail).toMatch(words);
  }
  const twice = await post('/rams', testRam);
  expect(twice.status).toBe(409);
  const unknown = await get('/rams/nobody');
  expect(unknown.status).toBe(404);
  expect((await problemOf(unknown)).detail).toContain('Rams here: Mill Lade');
  const notJson = await fetch(`${served.address}/api/rams`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', 'x-clackwatch': '1' },
    body: '{"name":',
  });
  expect(notJson.status).toBe(400);
  await problemOf(notJson);
  expect(await (await get('/rams')).json()).toEqual(before);
});

test('files that cannot be read are refused with the reason, and the server keeps running', async () => {
  for (const [name, bytes, words] of [
    ['empty.csv', '', /empty/i],
    [
      'picture.png',
      new Uint8Array([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 0, 1, 2, 3]),
      /picture\.png/,
    ],
    ['notime.csv', 'level,volts\n1.2,3.6\n1.3,3.6\n1.4,3.5\n', /time/i],
  ] as const) {
    const answer = await send('mill-lade', name, bytes);
    expect(answer.status, name).toBe(422);
    expect((await problemOf(answer)).detail).toMatch(words);
  }
  expect((await get('/status')).status).toBe(200);
});

test('a date that the file does not tell must be answered before anything is stored', async () => {
  const text = `Time,Beat counter,Tank level (m)\n${['00:00', '00:10', '00:20', '00:30'].map((t, i) => `05/04/2025 ${t},${i * 600},1.2`).join('\n')}\n`;
  const looked = upload.parse(await (await send('mill-lade', 'when.csv', text)).json());
  const question = looked.questions.find((one) => one.about === 'day order')!;
  expect(question.must_answer).toBe(true);
  const refused = await post(`/uploads/${looked.upload_id}/load`, {});
  expect(refused.status).toBe(400);
  const reading = { ...looked.reading, time: { ...looked.reading.time, day_order: 'month first' } };
  const corrected = upload.parse(await (await post(`/uploads/${looked.upload_id}/preview`, { reading })).json());
  expect(corrected.preview[0]!.at).toBe('2025-05-03T21:00:00.000Z');
});

test('only this machine is answered, and only its own page may write', async () => {
  const foreign = await new Promise<number>((resolve) => {
    const { hostname, port } = new URL(served.address);
    request({ hostname, port, path: '/api/rounds', headers: { host: 'elsewhere.example' } }, (response) =>
      resolve(response.statusCode!),
    ).end();
  });
  expect(foreign).toBe(403);
  expect(
    (
      await fetch(`${served.address}/api/rams`, {
        method: 'POST',
        headers: { 'content-type': 'application/json' },
        body: '{}',
      })
    ).status,
  ).toBe(403);
  expect((await post('/rams', testRam, { origin: 'http://elsewhere.example' })).status).toBe(403);
  expect((await post('/rams', testRam, { 'sec-fetch-site': 'cross-site' })).status).toBe(403);
  const page = await fetch(`${served.address}/`);
  expect(page.headers.get('content-security-policy')).toContain("default-src 'self'");
  expect(page.headers.get('x-content-type-options')).toBe('nosniff');
  expect(page.headers.get('x-powered-by')).toBeNull();
});

test('a name that climbs out of the folder stays a name', async () => {
  const sent = await send('mill-lade', '../../escape.csv', logText(1, 25));
  expect(sent.status).toBe(201);
  expect(upload.parse(await sent.json()).file).toBe('../../escape.csv');
});

test('the OpenAPI document describes every route', async () => {
  const document = (await (await get('/openapi.json')).json()) as {
    openapi: string;
    paths: Record<string, Record<string, { operationId: string }>>;
    components: { schemas: Record<string, object> };
  };
  expect(document.openapi).toBe('3.1.0');
  const ids = Object.values(document.paths).flatMap((path) =>
    Object.values(path).map((operation) => operation.operationId),
  );
  expect(new Set(ids).size).toBe(ids.length);
  expect(Object.keys(document.paths)).toEqual(
    expect.arrayContaining(['/api/rounds', '/api/rams/{ram}/season', '/api/uploads/{upload}/load']),
  );
  const text = JSON.stringify(document);
  for (const [, name] of text.matchAll(/#\/components\/schemas\/(\w+)/g))
    expect(document.components.schemas).toHaveProperty(name!);
  expect(text).not.toContain('__shared');
});
