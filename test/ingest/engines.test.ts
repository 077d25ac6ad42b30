import fc from 'fast-check';
import { expect, test } from 'vitest';
import { inspectFile } from '../../server/ingest/inspect';
import type { FileReading } from '../../server/shapes/reading';
import { iso, plainStamp, ramOf, recordsOf, sourceOf, two } from './memory-source';

const channels = ['chamber_pressure', 'tank_level', 'water_temperature'] as const;
const labels = ['Chamber pressure (kPa)', 'Tank level (m)', 'Water temperature (degC)'];

interface Table {
  rows: (number | null)[][];
  decimals: number[];
  step_s: number;
  from_ms: number;
}

const table: fc.Arbitrary<Table> = fc
  .record({
    decimals: fc.array(fc.integer({ min: 0, max: 4 }), { minLength: 3, maxLength: 3 }),
    step_s: fc.constantFrom(1, 60, 600, 86_400),
    from_ms: fc.integer({ min: Date.UTC(2015, 0, 1) / 1000, max: Date.UTC(2026, 0, 1) / 1000 }).map((s) => s * 1000),
    cells: fc.array(
      fc.array(fc.option(fc.integer({ min: -99_999, max: 99_999 }), { freq: 12 }), { minLength: 3, maxLength: 3 }),
      { minLength: 13, maxLength: 60 },
    ),
  })
  .map(({ cells, decimals, ...rest }) => ({
    ...rest,
    decimals,
    // -999 and -9999 mean missing, and so does 65535 in these channels
    rows: cells.map((row) => row.map((cell, c) => (cell === null ? null : codeless(cell / 10 ** decimals[c]!)))),
  }));

const codeless = (value: number): number => (value === -999 || value === -9999 || value === 65_535 ? value - 1 : value);

interface Dialect {
  delimiter: ',' | ';' | '\t' | '|' | ' ';
  mark: '.' | ',';
  encoding: FileReading['encoding'];
  lineEnd: '\n' | '\r\n' | '\r';
  quotes: 'none' | 'all' | 'labels';
  stamp: 'iso' | 'T' | 'dotted' | 'american' | 'two columns' | 'epoch' | 'serial';
  missing: '' | 'NAN' | '-9999' | '---';
  bom: boolean;
  comments: boolean;
  lastLineEnd: boolean;
}

const dialect: fc.Arbitrary<Dialect> = fc
  .record({
    delimiter: fc.constantFrom(',', ';', '\t', '|', ' '),
    mark: fc.constantFrom('.', ','),
    encoding: fc.constantFrom('utf-8', 'utf-16le', 'utf-16be', 'windows-1252'),
    lineEnd: fc.constantFrom('\n', '\r\n', '\r'),
    quotes: fc.constantFrom('none', 'all', 'labels'),
    stamp: fc.constantFrom('iso', 'T', 'dotted', 'american', 'two columns', 'epoch', 'serial'),
    missing: fc.constantFrom('', 'NAN', '-9999', '---'),
    bom: fc.boolean(),
    comments: fc.boolean(),
    lastLineEnd: fc.constant(true),
  } satisfies { [K in keyof Dialect]: fc.Arbitrary<Dialect[K]> })
  .filter(({ delimiter, mark, quotes }) => !(delimiter === ',' && mark === ',' && quotes !== 'all'))
  .map((one) =>
    one.delimiter === ' '
      ? {
          ...one,
          quotes: one.quotes === 'none' ? ('labels' as const) : one.quotes,
          missing: one.missing === '' ? ('---' as const) : one.missing,
        }
      : one,
  );

function stampCells(at: Date, form: Dialect['stamp'], mark: string): string[] {
  const text = plainStamp(at);
  const [day, month, year] = [two(at.getUTCDate()), two(at.getUTCMonth() + 1), at.getUTCFullYear()];
  const hour = at.getUTCHours();
  switch (form) {
    case 'iso':
      return [text];
    case 'T':
      return [text.replace(' ', 'T')];
    case 'dotted':
      return [`${day}.${month}.${year} ${text.slice(11)}`];
    case 'american':
      return [
        `${at.getUTCMonth() + 1}/${at.getUTCDate()}/${year} ${hour % 12 === 0 ? 12 : hour % 12}${text.slice(13)} ${hour < 12 ? 'AM' : 'PM'}`,
      ];
    case 'two columns':
      return [`${year}/${month}/${day}`, text.slice(11)];
    case 'epoch':
      return [String(at.getTime() / 1000)];
    default:
      return [(at.getTime() / 86_400_000 + 25_569).toFixed(8).replace('.', mark)];
  }
}

function written({ rows, decimals, step_s, from_ms }: Table, d: Dialect): { bytes: Buffer; reading: FileReading } {
  const needsQuotes = (cell: string) => d.quotes === 'all' || (d.delimiter === ' ' && cell.includes(' '));
  const quoted = (cell: string, isLabel = false) =>
    needsQuotes(cell) || (isLabel && d.quotes === 'labels') ? `"${cell}"` : cell;
  const gap = d.delimiter === ' ' ? '   ' : d.delimiter;
  const stampLabels = d.stamp === 'two columns' ? ['Date', 'Time'] : ['Time'];
  const lines = [[...stampLabels, ...labels].map((label) => quoted(label, true)).join(gap)];
  for (const [i, row] of rows.entries()) {
    const stamp = stampCells(new Date(from_ms + i * step_s * 1000), d.stamp, d.mark);
    const cells = row.map((value, c) => (value === null ? d.missing : value.toFixed(decimals[c]).replace('.', d.mark)));
    lines.push([...stamp, ...cells].map((cell) => quoted(cell)).join(gap));
    if (d.comments && i % 7 === 3) lines.push('# the hatch was opened');
  }
  const text = lines.join(d.lineEnd) + (d.lastLineEnd ? d.lineEnd : '');
  const isWide = d.encoding.startsWith('utf-16');
  const withMark = d.bom && d.encoding !== 'windows-1252' ? `\ufeff${text}` : text;
  const little = Buffer.from(withMark, isWide ? 'utf16le' : 'latin1');
  const bytes =
    d.encoding === 'utf-16be' ? little.swap16() : d.encoding === 'utf-8' ? Buffer.from(withMark, 'utf8') : little;
  const shift = stampLabels.length;
  const reading: FileReading = {
    kind: 'log',
    encoding: d.encoding,
    delimiter: d.delimiter,
    decimal_mark: d.mark,
    header_line: 1,
    units_line: null,
    first_record_line: 2,
    time: {
      columns: stampLabels.map((_, i) => i),
      form: d.stamp === 'epoch' ? 'epoch seconds' : d.stamp === 'serial' ? 'spreadsheet days' : 'fields',
      day_order:
        d.stamp === 'dotted'
          ? 'day first'
          : d.stamp === 'american'
            ? 'month first'
            : d.stamp === 'epoch' || d.stamp === 'serial'
              ? null
              : 'year first',
      zone: 'utc',
      stamp_marks: 'end',
      start_at: null,
    },
    columns: [
      ...stampLabels.map((label, index) => ({ index, label, channel: null, unit: null })),
      ...labels.map((label, c) => ({ index: shift + c, label, channel: channels[c]!, unit: ['kPa', 'm', 'degC'][c]! })),
    ],
  };
  return { bytes, reading };
}

test('any table in any dialect is read back equal by both engines, whatever pieces it comes in', async () => {
  await fc.assert(
    fc.asyncProperty(table, dialect, fc.constantFrom(7, 61, 4096), async (one, d, piece) => {
      const { bytes, reading } = written(one, d);
      const source = sourceOf(bytes, 'any.csv', piece);
      const expected = {
        times: one.rows.map((_, i) => iso(one.from_ms + i * one.step_s * 1000)),
        values: channels.map((_, c) =>
          one.rows.map((row) => (row[c] === null ? Number.NaN : Number(row[c]!.toFixed(one.decimals[c])))),
        ),
      };
      const [fast, general] = [
        await recordsOf(source, reading, ramOf(), 'scanner'),
        await recordsOf(source, reading, ramOf(), 'general'),
      ];
      expect(fast).toEqual(general);
      expect(fast).toMatchObject({ refused: 0, refusals: [], rows_read: one.rows.length });
      expect({ times: fast.times.map(iso), values: fast.values }).toEqual(expected);
    }),
    { numRuns: 150 },
  );
});

test('the dialect of any table is guessed, or what is in doubt is asked', async () => {
  await fc.assert(
    fc.asyncProperty(table, dialect, async (one, d) => {
      const { bytes, reading } = written(one, d);
      fc.pre(
        one.rows.some((row) => row.some((value, c) => value !== null && one.decimals[c]! > 0 && one.decimals[c] !== 3)),
      );
      const looked = await inspectFile(sourceOf(bytes), ramOf({ time_zone: 'UTC' }));
      const { delimiter, decimal_mark, header_line, first_record_line, time, columns } = looked.reading;
      expect({ delimiter, decimal_mark, header_line, first_record_line }).toEqual({
        delimiter: d.delimiter,
        decimal_mark: d.mark,
        header_line: 1,
        first_record_line: 2,
      });
      expect({ columns: time.columns, form: time.form }).toEqual({
        columns: reading.time.columns,
        form: reading.time.form,
      });
      const isAsked = looked.questions.some((question) => question.about === 'day order' && question.must_answer);
      if (!isAsked) expect([null, reading.time.day_order]).toContain(time.day_order);
      const found = columns.filter((column) => column.channel !== null).map((column) => column.channel);
      for (const channel of found) expect(channels).toContain(channel);
    }),
    { numRuns: 120 },
  );
});
