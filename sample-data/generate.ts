import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { makeRam } from './make-ram';
import { asOf, valley, valleyName } from './valley';

/** Writes sample-data/files/ anew. Nothing in it depends on the clock or on chance. */
const out = new URL('./files/', import.meta.url);
rmSync(out, { recursive: true, force: true });
const truth: Record<string, object> = {};
let bytes = 0;
for (const ram of valley) {
  const made = makeRam(ram);
  const folder = new URL(`${ram.key}/`, out);
  mkdirSync(folder, { recursive: true });
  for (const [name, content] of made.files) {
    writeFileSync(new URL(name, folder), content);
    bytes += content.length;
  }
  truth[ram.key] = made.truth;
  console.log(`${ram.key}: ${[...made.files.keys()].join(', ')}`);
}
const words = 'An invented valley: no such place, no such people. Made by sample-data/generate.ts, which tells how.';
writeFileSync(
  new URL('valley.json', out),
  `${JSON.stringify({ name: valleyName, as_of: asOf, note: words }, null, 2)}\n`,
);
writeFileSync(new URL('truth.json', out), `${JSON.stringify(truth)}\n`);
console.log(`${(bytes / 1e6).toFixed(2)} MB`);
