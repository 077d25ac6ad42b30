import { readdirSync, readFileSync, renameSync, rmSync, statSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import { instantOf } from '../figures/local-days';
import { inspectFile } from '../ingest/inspect';
import { fileSource } from '../ingest/source';
import { installation } from '../shapes/installation';
import { visit } from '../shapes/visit';
import { keepSetting, openStore, storeExists } from '../store/open';
import { addRam } from '../store/rams';
import { addVisit } from '../store/visits';
import { sha256Of } from './file-identity';
import { loadFile, ramContext } from './load-file';

const valley = z.object({ name: z.string(), as_of: z.iso.datetime() });

/**
 * Makes the demonstration database from the sample files, through the ordinary load, unless it is there. It is made beside its
 * place and moved in when it is whole, so that a start that was broken off begins afresh.
 */
export async function makeDemonstration(samples: string, folder: string, tell: (line: string) => void): Promise<void> {
  if (storeExists(folder)) return;
  const building = `${folder}.building`;
  rmSync(building, { recursive: true, force: true });
  const { name, as_of } = valley.parse(JSON.parse(readFileSync(path.join(samples, 'valley.json'), 'utf8')));
  const now_ms = new Date(as_of).getTime();
  const rams = readdirSync(samples).filter((entry) => statSync(path.join(samples, entry)).isDirectory());
  const files = rams.flatMap((ram) => logsOf(path.join(samples, ram)));
  const db = openStore(building);
  try {
    keepSetting(db, 'demonstration_as_of', as_of);
    let done = 0;
    for (const key of rams) {
      const place = path.join(samples, key);
      const ram = addRam(db, installation.parse(JSON.parse(readFileSync(path.join(place, 'ram.json'), 'utf8'))));
      for (const entered of z.array(visit).parse(JSON.parse(readFileSync(path.join(place, 'visits.json'), 'utf8'))))
        addVisit(db, ram.id, instantOf(entered.visited_at, ram.installation.time_zone), entered);
      for (const file of logsOf(place)) {
        const source = fileSource(file);
        const { reading } = await inspectFile(source, ramContext(db, ram, now_ms));
        await loadFile(
          db,
          ram,
          { path: file, name: path.basename(file), bytes: source.bytes, sha256: await sha256Of(file) },
          reading,
          { now_ms },
        );
        done++;
        tell(`Making the demonstration of ${name}: ${done} of ${files.length} files (${ram.name})`);
      }
    }
  } finally {
    db.close();
  }
  rmSync(folder, { recursive: true, force: true });
  renameSync(building, folder);
}

const logsOf = (folder: string): string[] =>
  readdirSync(folder)
    .filter((name) => !name.endsWith('.json'))
    .sort()
    .map((name) => path.join(folder, name));
