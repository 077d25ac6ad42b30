import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import path from 'node:path';
import { expect, test } from 'vitest';
import { receipt } from '../../server/shapes/load';
import { openStore } from '../../server/store/open';
import { writeLog } from '../bench/year-file';
import { clackwatch, fileIn, logText, newFolder, testRam } from '../serve';

function withRam(): string {
  const folder = newFolder();
  const added = clackwatch(
    'rams',
    'add',
    fileIn(folder, 'ram.json', JSON.stringify(testRam)),
    '--data',
    folder,
    '--json',
  );
  expect(added).toMatchObject({ status: 0 });
  return folder;
}

test('the whole job without a browser', () => {
  const folder = withRam();
  const file = fileIn(folder, 'march.csv', logText(12));
  const loaded = clackwatch('load', file, '--ram', 'mill lade', '--data', folder, '--json');
  expect(loaded.status).toBe(0);
  expect(receipt.parse(JSON.parse(loaded.out))).toMatchObject({ rows_new: 1728, ram: 'Mill Lade' });
  const again = JSON.parse(clackwatch('load', file, '--ram', 'Mill Lade', '--data', folder, '--json').out) as {
    rows_new: number;
    rows_known: number;
  };
  expect(again).toMatchObject({ rows_new: 0, rows_known: 1728 });
  const figures = JSON.parse(
    clackwatch(
      'figures',
      '--ram',
      'Mill Lade',
      '--data',
      folder,
      '--from',
      '2026-03-04',
      '--to',
      '2026-03-06',
      '--json',
    ).out,
  ) as { date: string; beats_per_min: { value: number } }[];
  expect(figures.map((day) => day.date)).toEqual(['2026-03-04', '2026-03-05']);
  expect(figures[0]!.beats_per_min.value).toBeCloseTo(60, 3);
  const visit = fileIn(
    folder,
    'visit.json',
    JSON.stringify({ visited_at: '2026-03-05T10:00', bucket_tests: [{ of: 'delivery', litres: 10, seconds: [83] }] }),
  );
  expect(clackwatch('visits', 'add', visit, '--ram', 'Mill Lade', '--data', folder).status).toBe(0);
  expect(JSON.parse(clackwatch('visits', 'list', '--ram', 'Mill Lade', '--data', folder, '--json').out)).toHaveLength(
    1,
  );
  expect(JSON.parse(clackwatch('findings', '--data', folder, '--json').out)).toEqual([]);
  expect(JSON.parse(clackwatch('rams', '--data', folder, '--json').out)).toMatchObject([{ name: 'Mill Lade' }]);
  expect(clackwatch('figures', '--ram', 'Mill Lade', '--data', folder).out).toContain('2026-03-05');
});

test('what is wrong is told in one sentence with status 2', () => {
  const folder = withRam();
  const cases: [string[], RegExp][] = [
    [['load', fileIn(folder, 'empty.csv', ''), '--ram', 'Mill Lade'], /empty\.csv/],
    [['load', 'nowhere.csv', '--ram', 'Mill Lade'], /nowhere\.csv cannot be opened/],
    [['load', fileIn(folder, 'a.csv', logText(1)), '--ram', 'Nobody'], /no ram called "Nobody".*Mill Lade/s],
    [
      [
        'load',
        fileIn(folder, 'when.csv', 'Time,Beat counter\n05/04/2025 00:00,1\n05/04/2025 00:10,600\n'),
        '--ram',
        'Mill Lade',
      ],
      /05\/04\/2025/,
    ],
    [
      ['rams', 'add', fileIn(folder, 'bad.json', JSON.stringify({ ...testRam, name: 'X', fall_m: 40 }))],
      /fall \(40 m\) is not below the lift/,
    ],
    [['rams', 'add', fileIn(folder, 'broken.json', '{')], /broken\.json is not JSON/],
    [['figures', '--ram', 'Mill Lade', '--every', 'fortnight'], /fortnight/],
    [['figures', '--ram', 'Mill Lade', '--speed'], /clackwatch help/],
    [['dance'], /"dance" is not a command/],
  ];
  for (const [args, words] of cases) {
    const done = clackwatch(...args, ...(args[0] === 'dance' ? [] : ['--data', folder]));
    expect(done.status, args.join(' ')).toBe(2);
    expect(done.err).toMatch(words);
    expect(done.err).not.toMatch(/\n\s+at /);
  }
  expect(JSON.parse(clackwatch('figures', '--ram', 'Mill Lade', '--data', folder, '--json').out)).toEqual([]);
});

test('one bad file does not stop the others', () => {
  const folder = withRam();
  const done = clackwatch(
    'load',
    fileIn(folder, 'bad.csv', ''),
    fileIn(folder, 'good.csv', logText(2)),
    '--ram',
    'Mill Lade',
    '--data',
    folder,
    '--json',
  );
  expect(done.status).toBe(2);
  expect(JSON.parse(done.out)).toMatchObject([{ file: 'bad.csv', error: expect.any(String) }, { rows_new: 288 }]);
});

test('a load that is killed half way leaves nothing, and the file loads whole afterwards', async () => {
  const folder = withRam();
  const long = path.join(folder, 'long.csv');
  writeLog(long, Date.UTC(2024, 0, 1), 525_600);
  const child = spawn(process.execPath, ['dist/server/main.js', 'load', long, '--ram', 'Mill Lade', '--data', folder]);
  await new Promise((resolve) => setTimeout(resolve, 450));
  child.kill('SIGKILL');
  await new Promise((resolve) => child.on('exit', resolve));
  const count = () => {
    const db = openStore(folder);
    try {
      return ['load', 'time_block', 'original', 'day_figures'].map((table) =>
        db.prepare(`select count(*) from ${table}`).pluck().get(),
      );
    } finally {
      db.close();
    }
  };
  const left = count();
  // either nothing at all or, on a very fast machine, the whole load: never a part
  expect([0, 1]).toContain(left[0]);
  if (left[0] === 0) expect(left).toEqual([0, 0, 0, 0]);
  expect(clackwatch('load', long, '--ram', 'Mill Lade', '--data', folder).status).toBe(0);
  expect(count()[0]).toBe(1);
});

test('a database of a newer program is refused and left as it is', () => {
  const folder = withRam();
  const db = openStore(folder);
  db.pragma('user_version = 999');
  db.close();
  const done = clackwatch('rams', '--data', folder);
  expect(done.status).toBe(2);
  expect(done.err).toMatch(/newer Clackwatch/);
  expect(existsSync(path.join(folder, 'clackwatch.sqlite'))).toBe(true);
});

test('a folder whose database is something else is told, not overwritten', () => {
  const folder = newFolder();
  fileIn(folder, 'clackwatch.sqlite', 'this is a letter, not a database, and long enough to be looked at '.repeat(20));
  const done = clackwatch('rams', '--data', folder);
  expect(done.status).toBe(2);
  expect(done.err).toMatch(/not a Clackwatch database/);
});
