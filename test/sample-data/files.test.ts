import { readdirSync, readFileSync, statSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { makeRam } from '../../sample-data/make-ram';
import { valley } from '../../sample-data/valley';
import { installation } from '../../server/shapes/installation';
import { visit } from '../../server/shapes/visit';

const files = new URL('../../sample-data/files/', import.meta.url);
const json = (path: string) => JSON.parse(readFileSync(new URL(path, files), 'utf8'));

describe('the committed files of the demonstration', () => {
  it('are what the generator makes, byte for byte, at the ram with bursts and a fault', () => {
    const ram = valley.find((r) => r.key === 'marrowfen')!;
    const made = makeRam(ram);
    expect([...made.files.keys()].sort()).toEqual(readdirSync(new URL(`${ram.key}/`, files)).sort());
    for (const [name, bytes] of made.files) {
      // compared as a yes or no: a difference of half a megabyte is nothing to print
      expect(readFileSync(new URL(`${ram.key}/${name}`, files)).equals(bytes), name).toBe(true);
    }
    expect(json('truth.json')[ram.key]).toEqual(JSON.parse(JSON.stringify(made.truth)));
  });

  it.each(valley.map((ram) => ram.key))('describe %s and its visits in the shapes of the program', (key) => {
    const ram = installation.safeParse(json(`${key}/ram.json`));
    expect(ram.error?.issues).toBeUndefined();
    const visits = visit.array().safeParse(json(`${key}/visits.json`));
    expect(visits.error?.issues).toBeUndefined();
    expect(visits.data!.length).toBeGreaterThan(1);
    const ratio = ram.data!.lift_m / ram.data!.fall_m;
    expect(ratio).toBeGreaterThan(5);
    expect(ratio).toBeLessThan(12);
  });

  it('stay under 12 MB together, and each burst under 200 kB', () => {
    let total = 0;
    for (const name of readdirSync(files, { recursive: true, encoding: 'utf8' })) {
      const { size } = statSync(new URL(name, files));
      if (name.includes('burst-')) expect(size).toBeLessThan(200_000);
      total += size;
    }
    expect(total).toBeGreaterThan(1e6);
    expect(total).toBeLessThan(12e6);
  });

  it('tell at least 60 sound days before each fault', () => {
    for (const ram of valley) {
      const began = ram.fault?.began_on ?? ram.stopped?.from;
      if (!began) continue;
      const days = (Date.parse(began.slice(0, 10)) - Date.parse(ram.first)) / 86_400_000;
      expect(days, ram.key).toBeGreaterThanOrEqual(60);
    }
  });
});
