import fc from 'fast-check';
import { expect, test } from 'vitest';
import { inspectFile } from '../../server/ingest/inspect';
import { UserError } from '../../server/shapes/problem';
import { logLines, plainStamp, ramOf, recordsOf, sourceOf } from './memory-source';

const header = 'Time,Beat counter,Chamber pressure (kPa),Tank level (m)\n';
const plain =
  header +
  logLines(
    24,
    (i, at) => `${plainStamp(at)},${9000 + i * 600},${(276 + (i % 7) / 10).toFixed(1)},${(1 + i / 1000).toFixed(3)}`,
  );
/** The last column is a counter, which shows no lost digit by its decimals. */
const counterLast = `Time;Level tank (m);Beat counter\n${logLines(24, (i, at) => `${plainStamp(at)};${(1 + i / 1000).toFixed(3)};${9000 + i * 600}`)}`;
const quoted = `"Time","Tank level (m)","Note"\n${logLines(20, (i, at) => `"${plainStamp(at)}","${(1 + i / 1000).toFixed(3)}","all ""well"""`)}`;
const files = { plain, counterLast, quoted };

const rowsOf = ({ times, values }: { times: number[]; values: number[][] }): string[] =>
  times.map((at, i) => `${at}:${values.map((column) => column[i]).join(',')}`);

async function readWhole(text: string) {
  const source = sourceOf(text);
  const { reading } = await inspectFile(source, ramOf());
  return { reading, rows: rowsOf(await recordsOf(source, reading)) };
}

test.each(Object.keys(files) as (keyof typeof files)[])(
  'a file cut at any byte yields only rows that were whole: %s',
  async (kind) => {
    const { reading, rows } = await readWhole(files[kind]);
    const whole = new Set(rows);
    for (let length = 0; length < files[kind].length; length++) {
      const source = sourceOf(files[kind].slice(0, length));
      const fast = await recordsOf(source, reading, ramOf(), 'scanner');
      const general = await recordsOf(source, reading, ramOf(), 'general');
      expect(fast, `cut at ${length}`).toEqual(general);
      expect(
        rowsOf(fast).filter((row) => !whole.has(row)),
        `cut at ${length}`,
      ).toEqual([]);
      const lines = files[kind].slice(0, length).split('\n').length - 2;
      // no more than the line that is cut is lost
      expect(fast.times.length).toBeGreaterThanOrEqual(Math.max(0, lines));
    }
  },
);

test('a whole last line without a line end is kept', async () => {
  for (const text of Object.values(files)) {
    const { reading, rows } = await readWhole(text);
    const cut = await recordsOf(sourceOf(text.slice(0, -1)), reading);
    expect(rowsOf(cut)).toEqual(rows);
  }
});

test('a file cut at any byte is inspected or refused with a sentence, never with a crash', async () => {
  for (let length = 0; length < plain.length; length += 5) {
    try {
      await inspectFile(sourceOf(plain.slice(0, length)), ramOf());
    } catch (error) {
      expect(error).toBeInstanceOf(UserError);
      expect((error as Error).message).toMatch(/^visit\.csv /);
    }
  }
});

test('bytes that are overwritten never crash the reading, and both engines say the same', async () => {
  await fc.assert(
    fc.asyncProperty(
      fc.constantFrom(plain, counterLast, quoted),
      fc.array(
        fc.record({
          place: fc.nat(),
          byte: fc.oneof(fc.constantFrom(34, 10, 13, 44, 59, 0, 35, 32), fc.integer({ min: 0, max: 255 })),
        }),
        {
          minLength: 1,
          maxLength: 12,
        },
      ),
      async (text, damages) => {
        const { reading, rows } = await readWhole(text);
        const bytes = Buffer.from(text);
        for (const { place, byte } of damages) bytes[place % bytes.length] = byte;
        const source = sourceOf(bytes, 'visit.csv', 97);
        const fast = await recordsOf(source, reading, ramOf(), 'scanner');
        expect(await recordsOf(source, reading, ramOf(), 'general')).toEqual(fast);
        // a row of a line that was not touched comes out as it was; one that was touched is one row at most
        const known = new Set(rows);
        expect(rowsOf(fast).filter((row) => !known.has(row)).length).toBeLessThanOrEqual(damages.length);
        try {
          await inspectFile(source, ramOf());
        } catch (error) {
          expect(error).toBeInstanceOf(UserError);
        }
      },
    ),
    { numRuns: 200 },
  );
});

test('random bytes are refused with a sentence', async () => {
  await fc.assert(
    fc.asyncProperty(fc.uint8Array({ minLength: 64, maxLength: 2000 }), async (bytes) => {
      await expect(inspectFile(sourceOf(bytes), ramOf())).rejects.toBeInstanceOf(UserError);
    }),
    { numRuns: 200 },
  );
});

test('a quote that is opened and never closed costs its own line, not the rest of the file', async () => {
  const lines = plain.split('\n');
  lines[15] = `"${lines[15]!}`;
  const { reading, rows } = await readWhole(plain);
  for (const engine of ['scanner', 'general'] as const) {
    const read = await recordsOf(sourceOf(lines.join('\n')), reading, ramOf(), engine);
    expect(rowsOf(read)).toEqual(rows.filter((_, i) => i !== 14));
    expect(read.refusals).toMatchObject([{ line: 16 }]);
  }
});

test('a delimiter that turns into a digit does not shift the values of its row', async () => {
  const { reading } = await readWhole(plain);
  const damaged = plain.replace(',276.3,', '0276.3,');
  const read = await recordsOf(sourceOf(damaged), reading);
  expect(read.refusals).toEqual([{ line: 5, reason: 'it has 3 fields where 4 were expected' }]);
});

test('a line without an end is refused instead of filling the memory', async () => {
  const { reading } = await readWhole(plain);
  const endless = Buffer.concat([Buffer.from(header), Buffer.alloc(3_000_000, '7')]);
  for (const engine of ['scanner', 'general'] as const)
    await expect(recordsOf(sourceOf(endless), reading, ramOf(), engine)).rejects.toThrow(
      /more than a million characters/,
    );
});
