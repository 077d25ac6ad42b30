/**
 * npm run bench: speed and memory, as ratios within one run against a general-purpose reference (the sqlite3 shell's .import).
 * Rounds are interleaved and medians told, because the machine is shared. `--no-gibibyte` leaves the 1 GiB file out.
 */
import { spawn, spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { inspectFile } from '../../server/ingest/inspect';
import { readRecords } from '../../server/ingest/read';
import { fileSource } from '../../server/ingest/source';
import { ramContext } from '../../server/loading/load-file';
import { installation } from '../../server/shapes/installation';
import { beginLoad } from '../../server/store/loads';
import { openStore } from '../../server/store/open';
import { addRam } from '../../server/store/rams';
import { SeriesWriter } from '../../server/store/series-write';
import { benchRam, writeLog } from './year-file';

const ROWS = 525_600;
const ROUNDS = 5;
const PROGRAM = 'dist/server/main.js';
const place = mkdtempSync(path.join(tmpdir(), 'clackwatch-bench-'));
const at = (name: string) => path.join(place, name);
const median = (values: number[]) => [...values].sort((a, b) => a - b)[values.length >> 1]!;
const say = (line: string) => process.stdout.write(`${line}\n`);

async function timed(work: () => unknown): Promise<number> {
  const start = performance.now();
  await work();
  return performance.now() - start;
}

function run(...args: string[]): void {
  const done = spawnSync(process.execPath, [PROGRAM, ...args], { encoding: 'utf8' });
  if (done.status !== 0) throw new Error(`clackwatch ${args.join(' ')}: ${done.stderr}`);
}

/** Reading and storing alone, in this process: no original kept, no figures. */
async function readAndStore(file: string, folder: string): Promise<void> {
  const db = openStore(folder);
  const ram = addRam(db, installation.parse(benchRam));
  const context = ramContext(db, ram, Date.UTC(2026, 0, 1));
  const { reading } = await inspectFile(fileSource(file), context);
  db.exec('begin immediate');
  db.prepare("insert into original (sha256, bytes) values ('bench', 0)").run();
  const columns = reading.columns.filter((column) => column.channel !== null);
  const writer = new SeriesWriter(
    db,
    ram.id,
    beginLoad(db, ram.id, 'bench', 'bench', 'log', 0),
    columns.map((column) => ({ channel: column.channel!, unit: column.unit ?? '' })),
  );
  await readRecords(fileSource(file), context, reading, (batch) =>
    writer.add(batch.count, batch.times_ms, batch.values, batch.decimals),
  );
  const { fresh } = writer.finish();
  db.exec('commit');
  db.close();
  if (fresh !== ROWS) throw new Error(`${fresh} rows stored, expected ${ROWS}`);
}

function importWithShell(file: string, database: string): void {
  const done = spawnSync('sqlite3', [database, '.mode csv', `.import ${file} t`], { encoding: 'utf8' });
  if (done.status !== 0) throw new Error(`sqlite3: ${done.stderr || 'not found; apt-get install sqlite3'}`);
}

async function loading(): Promise<void> {
  const file = at('year.csv');
  writeLog(file, Date.UTC(2024, 0, 1), ROWS);
  writeFileSync(at('ram.json'), JSON.stringify(benchRam));
  const times = { shell: [] as number[], stored: [] as number[], whole: [] as number[] };
  for (let round = 0; round < ROUNDS; round++) {
    times.shell.push(await timed(() => importWithShell(file, at(`shell-${round}.db`))));
    times.stored.push(await timed(() => readAndStore(file, at(`stored-${round}`))));
    run('rams', 'add', at('ram.json'), '--data', at(`whole-${round}`));
    times.whole.push(await timed(() => run('load', file, '--ram', 'Bench', '--data', at(`whole-${round}`))));
  }
  const [shell, stored, whole] = [median(times.shell), median(times.stored), median(times.whole)];
  const rate = (ms: number) => `${(ROWS / ms / 1000).toFixed(2)} M rows/s`;
  say(
    `Load of ${ROWS} rows x 7 columns (${(statSync(file).size / 1e6).toFixed(1)} MB), median of ${ROUNDS} interleaved rounds`,
  );
  say(`  sqlite3 .import (text, no index)                 ${shell.toFixed(0)} ms  ${rate(shell)}`);
  say(
    `  reading and storing                              ${stored.toFixed(0)} ms  ${rate(stored)}  ${(shell / stored).toFixed(2)} x .import (aim 3)`,
  );
  say(`  clackwatch load: process start, original kept,`);
  say(
    `    all daily figures and the examination          ${whole.toFixed(0)} ms  ${rate(whole)}  ${(shell / whole).toFixed(2)} x .import (aim 1)`,
  );
  say(
    `  database: ${(statSync(at('stored-0/clackwatch.sqlite')).size / 1e6).toFixed(1)} MB of samples, ${(statSync(at('whole-0/clackwatch.sqlite')).size / 1e6).toFixed(1)} MB with the original and figures, .import ${(statSync(at('shell-0.db')).size / 1e6).toFixed(1)} MB`,
  );
}

async function serving(): Promise<void> {
  const folder = at('decade');
  run('rams', 'add', at('ram.json'), '--data', folder);
  for (let year = 2015; year < 2025; year++) {
    writeLog(at('part.csv'), Date.UTC(year, 0, 1), ROWS);
    run('load', at('part.csv'), '--ram', 'Bench', '--data', folder);
  }
  const server = spawn(process.execPath, [PROGRAM, 'serve', '--data', folder, '--port', '0']);
  const address = await new Promise<string>((resolve) =>
    server.stdout.on('data', (chunk: Buffer) => resolve(/http:\S+/.exec(String(chunk))![0])),
  );
  say('Serving one ram of 1-minute records, median of 20 requests (fetch, parsed)');
  for (const [what, query] of [
    ['season charts, one year', 'season?from=2020-01-01&to=2021-01-01'],
    ['season charts, ten years', 'season'],
    ['tank level, one year', 'series/tank_level?from=2020-01-01&to=2021-01-01'],
    ['tank level, ten years', 'series/tank_level'],
  ] as const) {
    let buckets = 0;
    const times: number[] = [];
    for (let i = 0; i < 20; i++)
      times.push(
        await timed(async () => {
          const body = (await (await fetch(`${address}/api/rams/bench/${query}`)).json()) as { at_ms: number[] };
          buckets = body.at_ms.length;
        }),
      );
    say(
      `  ${what.padEnd(28)} ${median(times).toFixed(1)} ms, slowest ${Math.max(...times).toFixed(1)} ms, ${buckets} buckets (aim: ten years under 100 ms)`,
    );
  }
  server.kill('SIGTERM');
}

async function gibibyte(): Promise<void> {
  const file = at('gibibyte.csv');
  const rows = Math.ceil((2 ** 30 / statSync(at('year.csv')).size) * ROWS * 0.995);
  writeLog(file, Date.UTC(2010, 0, 1), rows, 10);
  run('rams', 'add', at('ram.json'), '--data', at('large'));
  const start = performance.now();
  const child = spawn(process.execPath, [PROGRAM, 'load', file, '--ram', 'Bench', '--data', at('large'), '--json'], {
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  let peak_kb = 0;
  const look = setInterval(() => {
    try {
      peak_kb = Math.max(
        peak_kb,
        Number(/VmHWM:\s+(\d+)/.exec(readFileSync(`/proc/${child.pid}/status`, 'utf8'))?.[1] ?? 0),
      );
    } catch {
      // the process has just ended
    }
  }, 50);
  const status = await new Promise((resolve) => child.on('exit', resolve));
  clearInterval(look);
  say(
    `Load of ${(statSync(file).size / 2 ** 30).toFixed(2)} GiB, ${rows} rows: ${((performance.now() - start) / 1000).toFixed(1)} s, exit status ${status}, peak memory ${(peak_kb / 1024).toFixed(0)} MB (aim: below 300)`,
  );
}

try {
  mkdirSync(place, { recursive: true });
  await loading();
  await serving();
  if (!process.argv.includes('--no-gibibyte')) await gibibyte();
} finally {
  rmSync(place, { recursive: true, force: true });
}
