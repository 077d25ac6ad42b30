import { describeBurst } from '../beats/describe-burst';
import { unitChange } from '../figures/sensors';
import { readRecords } from '../ingest/read';
import { fileSource } from '../ingest/source';
import { UserError } from '../shapes/problem';
import type { FileReading } from '../shapes/reading';
import type { BurstBeats } from '../shapes/series';
import type { Connection } from '../store/open';
import type { StoredRam } from '../store/rams';
import { type FileToLoad, ramContext } from './load-file';

/** The beats of a burst file, without storing anything. */
export async function beatsOfFile(
  db: Connection,
  ram: StoredRam,
  file: FileToLoad,
  reading: FileReading,
  now_ms: number,
): Promise<BurstBeats> {
  if (reading.kind !== 'burst')
    throw new UserError(
      `${file.name} is a slow log, not a burst: beats are told from pressure at 5 or more samples a second. Load it with "clackwatch load"; its counter gives the beats per minute.`,
    );
  const columns = reading.columns.filter((column) => column.channel !== null);
  const times: number[] = [];
  const values: number[][] = columns.map(() => []);
  await readRecords(fileSource(file.path, file.name), ramContext(db, ram, now_ms), reading, (batch) => {
    for (let i = 0; i < batch.count; i++) {
      times.push(batch.times_ms[i]!);
      for (let c = 0; c < columns.length; c++) values[c]!.push(batch.values[c]![i]!);
    }
  });
  if (times.length < 2) throw new UserError(`${file.name} has no samples that can be read.`, 'cannot be read');
  const inKpa = (channel: 'valve_box_pressure' | 'chamber_pressure') => {
    const c = columns.findIndex((column) => column.channel === channel);
    if (c < 0) return undefined;
    const { scale, offset } = unitChange(ram.installation, channel, columns[c]!.unit ?? 'kPa');
    return Float64Array.from(values[c]!, (value) => value * scale + offset);
  };
  const beats = describeBurst({
    times_s: Float64Array.from(times, (at) => (at - times[0]!) / 1000),
    valve_box_kpa: inKpa('valve_box_pressure'),
    chamber_kpa: inKpa('chamber_pressure'),
  });
  return { at: new Date(times[0]!).toISOString(), ...beats };
}
