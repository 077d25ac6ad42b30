import { type Installation, installation } from '../shapes/installation';
import { UserError } from '../shapes/problem';
import type { Connection } from './open';

export interface StoredRam {
  id: number;
  key: string;
  name: string;
  installation: Installation;
}

interface RamRow {
  id: number;
  key: string;
  name: string;
  installation: string;
}

const asRam = (row: RamRow): StoredRam => ({
  id: row.id,
  key: row.key,
  name: row.name,
  installation: installation.parse(JSON.parse(row.installation)),
});

export function listRams(db: Connection): StoredRam[] {
  return (db.prepare('select id, key, name, installation from ram order by name').all() as RamRow[]).map(asRam);
}

/** Finds a ram by its name (in any case) or its key; tells which rams there are when it is not found. */
export function findRam(db: Connection, nameOrKey: string): StoredRam {
  const row = db
    .prepare('select id, key, name, installation from ram where name = ? or key = ?')
    .get(nameOrKey, nameOrKey.toLowerCase()) as RamRow | undefined;
  if (row !== undefined) return asRam(row);
  const names = (db.prepare('select name from ram order by name').pluck().all() as string[]).slice(0, 12);
  const known =
    names.length > 0
      ? `Rams here: ${names.join(', ')}.`
      : 'There are no rams here yet; add one with "clackwatch rams add FILE.json" or on the page "Add a ram".';
  throw new UserError(`There is no ram called "${nameOrKey}". ${known}`, 'not found');
}

export function addRam(db: Connection, described: Installation): StoredRam {
  const key = keyOf(described.name);
  const taken = db.prepare('select name from ram where name = ? or key = ?').pluck().get(described.name, key) as
    | string
    | undefined;
  if (taken !== undefined)
    throw new UserError(`There is already a ram called "${taken}". Choose another name.`, 'already there');
  const { lastInsertRowid } = db
    .prepare('insert into ram (key, name, installation, created_at) values (?, ?, ?, ?)')
    .run(key, described.name, JSON.stringify(described), Date.now());
  return { id: Number(lastInsertRowid), key, name: described.name, installation: described };
}

/** Corrects a ram's description; its name and key stay. */
export function describeRamAnew(db: Connection, ram: StoredRam, described: Installation): StoredRam {
  const corrected = { ...described, name: ram.name };
  db.prepare('update ram set installation = ? where id = ?').run(JSON.stringify(corrected), ram.id);
  return { ...ram, installation: corrected };
}

/** The name of a ram as it stands in addresses: lower case, hyphens, letters of any script kept. */
function keyOf(name: string): string {
  const key = name
    .normalize('NFKC')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '');
  return key === '' ? 'ram' : key;
}
