import { spawn, spawnSync } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Installation } from '../server/shapes/installation';

const PROGRAM = 'dist/server/main.js';

/** A ram that fits the files of `logText`. */
export const testRam = {
  name: 'Mill Lade',
  time_zone: 'Etc/GMT-3',
  fall_m: 3.2,
  lift_m: 28,
  people_served: 120,
  drive_pipe: { length_m: 18, bore_mm: 50, material: 'steel' },
  tank: { shape: 'upright cylinder', diameter_m: 2.5, height_m: 2.2 },
  sensors: [
    { channel: 'beat_count', rolls_over_at: 65_536 },
    { channel: 'chamber_pressure', unit: 'kPa' },
    { channel: 'tank_level', unit: 'm' },
  ],
} satisfies Partial<Installation>;

export const newFolder = (): string => mkdtempSync(path.join(tmpdir(), 'clackwatch-test-'));

export function fileIn(folder: string, name: string, text: string | Uint8Array): string {
  const place = path.join(folder, name);
  writeFileSync(place, text);
  return place;
}

/** A plain log in 10-minute steps: 60 beats a minute, a tank that fills and is drawn from at noon. */
export function logText(days: number, firstDay = 1): string {
  const lines = ['Time,Beat counter,Chamber pressure (kPa),Tank level (m)'];
  let tank_m = 0.8;
  for (let i = 0; i < days * 144; i++) {
    const at = new Date(Date.UTC(2026, 2, firstDay) + i * 600_000);
    const hour = at.getUTCHours();
    tank_m += ((0.12 - (hour >= 10 && hour < 14 ? 0.72 : 0)) * 0.6) / 4.909;
    lines.push(
      `${at.toISOString().slice(0, 16).replace('T', ' ')},${(1000 + (firstDay - 1) * 86_400 + i * 600) % 65_536},${(276 + (i % 7) * 0.1).toFixed(1)},${tank_m.toFixed(3)}`,
    );
  }
  return `${lines.join('\n')}\n`;
}

/** Runs one command of the built program. */
export function clackwatch(...args: string[]): { status: number | null; out: string; err: string } {
  const done = spawnSync(process.execPath, [PROGRAM, ...args], { encoding: 'utf8' });
  return { status: done.status, out: done.stdout, err: done.stderr };
}

export interface Served {
  address: string;
  stop(): Promise<void>;
}

/** Starts the built program on a free port, as a person does. */
export async function serve(...args: string[]): Promise<Served> {
  const child = spawn(process.execPath, [PROGRAM, 'serve', '--port', '0', ...args], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const address = await new Promise<string>((resolve, reject) => {
    child.stdout.on('data', (chunk: Buffer) => {
      const found = /http:\/\/\S+/.exec(String(chunk));
      if (found) resolve(found[0]);
    });
    child.on('exit', (code) => reject(new Error(`the server ended with status ${code}`)));
  });
  return {
    address,
    stop: async () => {
      child.kill('SIGTERM');
      await once(child, 'exit');
    },
  };
}
