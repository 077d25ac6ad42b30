import { closeSync, openSync, writeSync } from 'node:fs';

const MINUTE_MS = 60_000;

/** A description that fits the bench's files. */
export const benchRam = {
  name: 'Bench',
  time_zone: 'UTC',
  fall_m: 3.2,
  lift_m: 28,
  drive_pipe: { length_m: 18, bore_mm: 50, material: 'steel' },
  tank: { shape: 'upright cylinder', diameter_m: 2.5, height_m: 2.2 },
  sensors: [
    { channel: 'beat_count', rolls_over_at: 1_000_000 },
    { channel: 'chamber_pressure', unit: 'kPa' },
    { channel: 'source_level', unit: 'm', height_m: 3 },
    { channel: 'tank_level', unit: 'm' },
    { channel: 'delivery_volume', unit: 'L' },
  ],
};

/**
 * Writes minutes of an invented ram as comma-separated text, seven columns, in chunks.
 * @param rows 525,600 is a year
 * @param step_s seconds between the records
 */
export function writeLog(path: string, start_ms: number, rows: number, step_s = 60): void {
  const file = openSync(path, 'w');
  const two = (n: number) => (n < 10 ? `0${n}` : String(n));
  let lines = ['time,beat count,chamber pressure kPa,source level m,tank level m,delivery meter L,battery V'];
  let tank_m = 1;
  let litres = 0;
  for (let i = 0; i < rows; i++) {
    const at = new Date(start_ms + (i * step_s * MINUTE_MS) / 60);
    const minute = at.getUTCHours() * 60 + at.getUTCMinutes();
    tank_m += ((0.12 * 60 - (minute > 360 && minute < 1260 ? 8.5 : 0)) / 4909) * (step_s / 60);
    if (tank_m > 2.15 || tank_m < 0.2) tank_m = 1;
    litres += 0.12 * step_s;
    const stamp = `${at.getUTCFullYear()}-${two(at.getUTCMonth() + 1)}-${two(at.getUTCDate())} ${two(at.getUTCHours())}:${two(at.getUTCMinutes())}:${two(at.getUTCSeconds())}`;
    lines.push(
      `${stamp},${Math.floor(i * step_s * 0.9) % 1_000_000},${(275 + Math.sin(i / 300) * 3).toFixed(2)},${(0.2 + Math.sin(i / 40_000) * 0.1).toFixed(3)},${tank_m.toFixed(3)},${litres.toFixed(1)},${(3.6 - i * 1e-8).toFixed(2)}`,
    );
    if (lines.length >= 20_000) {
      writeSync(file, `${lines.join('\n')}\n`);
      lines = [];
    }
  }
  if (lines.length > 0) writeSync(file, `${lines.join('\n')}\n`);
  closeSync(file);
}
