import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { expect, test } from 'vitest';

/** Who may import whom, as DEVELOPERS.md draws it. A room may always import itself and `shapes`. */
const mayImport: Record<string, string[]> = {
  shapes: [],
  units: [],
  hydraulics: ['units'],
  beats: ['units', 'hydraulics'],
  statistics: [],
  health: ['hydraulics', 'statistics', 'units'],
  ingest: ['units'],
  store: ['units'],
  figures: ['store', 'units', 'hydraulics', 'beats', 'statistics', 'health'],
  loading: ['ingest', 'store', 'figures', 'beats', 'units'],
  http: ['figures', 'store', 'ingest', 'loading'],
  cli: ['figures', 'store', 'ingest', 'loading', 'http'],
  'main.ts': ['cli', 'loading'],
};

const pureRooms = ['shapes', 'units', 'hydraulics', 'beats', 'statistics', 'health'];

const filesUnder = (folder: string): string[] =>
  readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.tsx?$/.test(name))
    .map((name) => path.join(folder, name));

interface Import {
  from: string;
  typeOnly: boolean;
}

const importsOf = (file: string): Import[] =>
  [
    ...readFileSync(file, 'utf8').matchAll(
      /^(?:import|export)\s+(type\s)?[^;]*?from '([^']+)'|\bimport\('([^']+)'\)/gm,
    ),
  ].map((found) => ({
    from: (found[2] ?? found[3])!,
    typeOnly: found[1] !== undefined,
  }));

function resolve(file: string, from: string): string | null {
  if (!from.startsWith('.')) return null;
  const base = path.normalize(path.join(path.dirname(file), from));
  return [`${base}.ts`, `${base}.tsx`, base].find((candidate) => all.includes(candidate)) ?? base;
}

const server = filesUnder('server');
const web = filesUnder('web');
const all = [...server, ...web];
const roomOf = (file: string): string => file.split(path.sep)[1]!;

test('every room is known to this check', () => {
  expect([...new Set(server.map(roomOf))].sort()).toEqual(Object.keys(mayImport).sort());
});

test('imports go only the way the data flows', () => {
  const wrong = server.flatMap((file) =>
    importsOf(file).flatMap(({ from }) => {
      const target = resolve(file, from);
      if (target === null) return [];
      const room = roomOf(file);
      const other = roomOf(target);
      return target.startsWith('server') && (other === room || other === 'shapes' || mayImport[room]?.includes(other))
        ? []
        : [`${file} imports ${from}`];
    }),
  );
  expect(wrong).toEqual([]);
});

test('pure rooms know no file, database, network or clock', () => {
  const wrong = server
    .filter((file) => pureRooms.includes(roomOf(file)))
    .flatMap((file) => [
      ...importsOf(file).flatMap(({ from }) =>
        from.startsWith('node:') || from === 'better-sqlite3' ? [`${file} imports ${from}`] : [],
      ),
      ...(/\bDate\.now\(|new Date\(\)|performance\.now\(|process\.|fetch\(/.test(readFileSync(file, 'utf8'))
        ? [`${file} looks at a clock or the process`]
        : []),
    ]);
  expect(wrong).toEqual([]);
});

test('only the store speaks SQL, and the page takes nothing but types from the server', () => {
  const binding = server.filter(
    (file) => roomOf(file) !== 'store' && importsOf(file).some(({ from }) => from === 'better-sqlite3'),
  );
  expect(binding).toEqual([]);
  const running = web.flatMap((file) =>
    importsOf(file).flatMap(({ from, typeOnly }) =>
      (resolve(file, from) ?? '').startsWith('server') && !typeOnly ? [`${file} imports ${from}`] : [],
    ),
  );
  expect(running).toEqual([]);
});

test('no imports run in a circle', () => {
  const next = new Map(
    all.map((file) => [
      file,
      importsOf(file)
        .filter((i) => !i.typeOnly)
        .map((i) => resolve(file, i.from))
        .filter((f) => f !== null),
    ]),
  );
  const done = new Set<string>();
  const circles: string[] = [];
  const walk = (file: string, trail: string[]) => {
    if (trail.includes(file)) circles.push([...trail.slice(trail.indexOf(file)), file].join(' → '));
    if (done.has(file) || trail.includes(file)) return;
    for (const other of next.get(file) ?? []) walk(other, [...trail, file]);
    done.add(file);
  };
  for (const file of all) walk(file, []);
  expect(circles).toEqual([]);
});
