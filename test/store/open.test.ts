import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { expect, test } from 'vitest';
import { migrations } from '../../server/store/migrations';
import { keepSetting, openStore, setting } from '../../server/store/open';
import { addRam, findRam, listRams } from '../../server/store/rams';

const folder = () => mkdtempSync(path.join(tmpdir(), 'clackwatch-open-'));
const described = {
  name: 'Höhe 3',
  time_zone: 'UTC',
  fall_m: 3,
  lift_m: 30,
  drive_pipe: { length_m: 20, bore_mm: 50 },
  sensors: [],
};

test('a database is made once and opened again as it was', () => {
  const place = folder();
  const first = openStore(place);
  addRam(first, described);
  keepSetting(first, 'demonstration_as_of', '2031-01-01T00:00:00Z');
  first.close();
  const again = openStore(place);
  expect(again.pragma('user_version', { simple: true })).toBe(migrations.length);
  expect(again.pragma('journal_mode', { simple: true })).toBe('wal');
  expect(listRams(again).map((ram) => ram.key)).toEqual(['höhe-3']);
  expect(setting(again, 'demonstration_as_of')).toBe('2031-01-01T00:00:00Z');
});

test('a ram is found by its name in any case and by its key, and a name is given once', () => {
  const db = openStore(folder());
  addRam(db, { ...described, name: 'Upper Ford' });
  expect(findRam(db, 'upper ford').name).toBe('Upper Ford');
  expect(findRam(db, 'UPPER-FORD').name).toBe('Upper Ford');
  expect(() => addRam(db, { ...described, name: 'UPPER FORD' })).toThrow(/already a ram called "Upper Ford"/);
  expect(() => findRam(db, 'Lower Ford')).toThrow(/Rams here: Upper Ford/);
});
