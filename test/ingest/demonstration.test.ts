import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { expect, test } from 'vitest';
import { inspectFile } from '../../server/ingest/inspect';
import { fileSource } from '../../server/ingest/source';
import { installation } from '../../server/shapes/installation';
import type { FileReading } from '../../server/shapes/reading';
import { ramOf, recordsOf } from './memory-source';

const base = 'sample-data/files';
const folders = existsSync(base)
  ? readdirSync(base).filter((name) => existsSync(path.join(base, name, 'ram.json')))
  : [];
const burstChannels = ['valve_box_pressure', 'chamber_pressure'];

test('the demonstration has files to read', () => {
  expect(folders.length).toBe(8);
});

test.each(folders)(
  'the files of %s are read without a question, each first by itself and then by memory',
  async (folder) => {
    const ram = installation.parse(JSON.parse(readFileSync(path.join(base, folder, 'ram.json'), 'utf8')));
    const sensors = ram.sensors.map((sensor) => sensor.channel).sort();
    const files = readdirSync(path.join(base, folder)).filter((name) => !name.endsWith('.json'));
    const remembered: FileReading[] = [];
    for (const file of files) {
      const source = fileSource(path.join(base, folder, file));
      const context = ramOf({ time_zone: ram.time_zone, sensors: ram.sensors, now_ms: Date.UTC(2027, 0, 1) });
      const alone = await inspectFile(source, context);
      expect(alone.questions, file).toEqual([]);
      const channels = alone.reading.columns.flatMap((column) => column.channel ?? []).sort();
      expect(channels, file).toEqual(alone.reading.kind === 'burst' ? [...burstChannels].sort() : sensors);
      const known = await inspectFile(source, { ...context, remembered });
      expect(known.reading, file).toEqual(alone.reading);
      remembered.unshift(known.reading);
      const fast = await recordsOf(source, alone.reading, context, 'scanner');
      if (file === files[0]) expect(await recordsOf(source, alone.reading, context, 'general'), file).toEqual(fast);
      expect(fast.refused / fast.rows_read, file).toBeLessThan(0.001);
      expect(fast.times.length, file).toBeGreaterThan(1000);
    }
  },
);
