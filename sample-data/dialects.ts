import type { LoggerRecord } from './logger';
import { localClock } from './simulate';
import type { DialectName, InventedRam, LoggedSensor } from './valley';

const two = (n: number) => String(n).padStart(2, '0');
const parts = (time_s: number) => {
  const d = localClock(time_s);
  return {
    y: String(d.getUTCFullYear()),
    mo: two(d.getUTCMonth() + 1),
    d: two(d.getUTCDate()),
    h: two(d.getUTCHours()),
    mi: two(d.getUTCMinutes()),
  };
};

/** One download, as the bytes of a file. `number` counts the ram's downloads from 1. */
type Writer = (ram: InventedRam, records: LoggerRecord[], number: number) => { name: string; bytes: Buffer };

const headings = (sensors: LoggedSensor[]) => sensors.map((s) => s.heading);
const numbered = (stem: string, number: number, end: string) => `${stem}-${number}.${end}`;

const utcStamps: Writer = (ram, records, number) => ({
  name: numbered('download', number, 'csv'),
  bytes: Buffer.from(
    [
      `# station ${ram.installation.name}`,
      `# download ${number}, interval ${ram.step_min} min, times in UTC`,
      ['Time (UTC)', ...headings(ram.sensors)].join(','),
      ...records.map((r) =>
        [`${new Date(r.time_s * 1000).toISOString().slice(0, 16)}Z`, ...r.readings.map((v) => v ?? '')].join(','),
      ),
      '',
    ].join('\n'),
  ),
});

const decimalComma: Writer = (ram, records, number) => ({
  name: numbered('QF', number, 'csv'),
  bytes: Buffer.from(
    [
      ['Date', 'Time', ...headings(ram.sensors)].join(';'),
      ...records.map((r) => {
        const p = parts(r.time_s);
        return [`${p.d}/${p.mo}/${p.y}`, `${p.h}:${p.mi}`, ...r.readings.map((v) => (v ?? '').replace('.', ','))].join(
          ';',
        );
      }),
      '',
    ].join('\r\n'),
    'latin1', // the same bytes as Windows-1252 for ° and ³
  ),
});

const daysFirst: Writer = (ram, records, number) => ({
  name: numbered('marrow', number, 'txt'),
  bytes: Buffer.from(
    [
      ['Date and time', ...headings(ram.sensors)].join('\t'),
      ...records.map((r) => {
        const p = parts(r.time_s);
        return [`${p.d}.${p.mo}.${p.y} ${p.h}:${p.mi}`, ...r.readings.map((v) => v ?? '')].join('\t');
      }),
      '',
    ].join('\n'),
  ),
});

const monthsFirst: Writer = (ram, records, number) => ({
  name: numbered('ridge', number, 'csv'),
  bytes: Buffer.from(
    [
      ['Date Time', ...headings(ram.sensors)].map((h) => `"${h}"`).join(','),
      ...records.map((r) => {
        const p = parts(r.time_s);
        const hour = Number(p.h);
        const stamp = `${p.mo}/${p.d}/${p.y} ${two(hour % 12 || 12)}:${p.mi} ${hour < 12 ? 'AM' : 'PM'}`;
        return [stamp, ...r.readings.map((v) => v ?? '')].map((v) => `"${v}"`).join(',');
      }),
      '',
    ].join('\r\n'),
  ),
});

const epochSeconds: Writer = (ram, records, number) => ({
  name: numbered('mill', number, 'log'),
  bytes: Buffer.from(
    [
      'Record of the ram',
      `Site: ${ram.installation.name}`,
      `Readout number: ${number}`,
      `Interval: ${ram.step_min} min`,
      `Records: ${records.length}`,
      'Clock: seconds since 1970, UTC',
      'Memory: wraps when full',
      '----',
      ['Epoch s', ...headings(ram.sensors)].join('|'),
      ...records.map((r) => [r.time_s, ...r.readings.map((v) => v ?? '')].join('|')),
      '',
    ].join('\n'),
  ),
});

const wide: Writer = (ram, records, number) => ({
  name: numbered('garden', number, 'txt'),
  bytes: Buffer.from(
    `\ufeff${[
      ['Stamp', ...headings(ram.sensors)].join('\t'),
      ['', ...ram.sensors.map((s) => s.unit ?? 'count')].join('\t'),
      ...records.map((r) => {
        const p = parts(r.time_s);
        return [`${p.y}-${p.mo}-${p.d} ${p.h}:${p.mi}`, ...r.readings.map((v) => v ?? '')].join('\t');
      }),
      '',
    ].join('\r\n')}`,
    'utf16le',
  ),
});

const aligned: Writer = (ram, records, number) => {
  const heads = headings(ram.sensors);
  const line = (first: string, cells: string[]) =>
    [first.padEnd(16), ...cells.map((c, i) => c.padStart(Math.max(8, heads[i]!.length)))].join(' ');
  return {
    name: numbered('ford', number, 'txt'),
    bytes: Buffer.from(
      [
        line('Date       Time', heads),
        ...records.map((r) => {
          const p = parts(r.time_s);
          return line(
            `${p.y}-${p.mo}-${p.d} ${p.h}:${p.mi}`,
            r.readings.map((v) => v ?? '---'),
          );
        }),
        '',
      ].join('\n'),
    ),
  };
};

const wordy: Writer = (ram, records, number) => {
  const head = ['Timestamp', ...headings(ram.sensors)].join(',');
  const tokens = ['NAN', '---', '-9999'];
  let lost = 0;
  const lines = [head];
  records.forEach((r, i) => {
    const p = parts(r.time_s);
    const stamp = `${p.y}/${p.mo}/${p.d} ${p.h}:${p.mi}`;
    if (i === 0) lines.push(`# visited ${stamp}`);
    if (i === Math.floor(records.length / 2)) lines.push(head);
    if (i === Math.floor(records.length / 3)) lines.push(`${stamp},logger opened by hand, memory at 40 per cent`);
    lines.push([stamp, ...r.readings.map((v) => v ?? tokens[lost++ % 3])].join(','));
  });
  const last = lines.at(-1)!;
  lines[lines.length - 1] = last.slice(0, last.lastIndexOf(',') - 3);
  return { name: numbered('pens', number, 'csv'), bytes: Buffer.from(lines.join('\n')) };
};

export const writers: Record<DialectName, Writer> = {
  'comma, UTC stamps': utcStamps,
  'semicolon, decimal comma': decimalComma,
  'tab, days first': daysFirst,
  'quoted, months first': monthsFirst,
  'bars, epoch seconds': epochSeconds,
  'UTF-16, units row': wide,
  blanks: aligned,
  'comma, words among the records': wordy,
};
