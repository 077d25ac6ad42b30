import { expect, test } from 'vitest';
import { inspectFile } from '../../server/ingest/inspect';
import { logLines, plainStamp, ramOf, recordsOf, sourceOf } from './memory-source';

const rows = logLines(30, (i, at) => `${plainStamp(at)};1,${100 + i};2,7${i % 10}`);
const header = 'Time;Level A (m);Pressure B (bar)\n';

async function accepted() {
  const { reading } = await inspectFile(sourceOf(header + rows), ramOf());
  // a person has said what the file could not
  const columns = reading.columns.map((column, i) => ({
    ...column,
    channel: ([null, 'source_level', 'valve_box_pressure'] as const)[i]!,
  }));
  return { ...reading, columns, time: { ...reading.time, zone: 'utc' } };
}

test('the accepted reading fits again wherever the header stands, in another encoding too', async () => {
  const reading = await accepted();
  const text = `Readout 12\nHut of the upper ford\n\n${header}${rows}`;
  const source = sourceOf(Buffer.from(`\ufeff${text}`, 'utf16le'));
  const again = await inspectFile(source, ramOf({ remembered: [reading] }));
  expect(again).toMatchObject({ remembered: true, questions: [] });
  expect(again.reading).toMatchObject({
    encoding: 'utf-16le',
    header_line: 4,
    first_record_line: 5,
    time: { zone: 'utc' },
    columns: reading.columns,
  });
  const records = await recordsOf(source, again.reading);
  expect(records.rows_read).toBe(30);
  expect(records.times[0]).toBe(Date.UTC(2025, 3, 5));
});

test('a changed header is noticed and the file read afresh', async () => {
  const reading = await accepted();
  const text = `Time;Level A (m);Pressure C (bar)\n${rows}`;
  const again = await inspectFile(
    sourceOf(text),
    ramOf({
      remembered: [
        { ...reading, columns: [...reading.columns, { index: 3, label: 'Level A2', channel: null, unit: null }] },
      ],
    }),
  );
  expect(again.remembered).toBe(false);
  const wider = await inspectFile(
    sourceOf(`Time;Level A (m);Pressure B (bar);Battery (V)\n${rows.replaceAll('\n', ';3,6\n')}`),
    ramOf({ remembered: [reading] }),
  );
  expect(wider.remembered).toBe(false);
  expect(wider.questions.map((question) => question.question).join()).toMatch(
    /columns differ from those of earlier files of this ram \(new: "Battery \(V\)"\)/,
  );
});

test('another decimal mark under the same headings is another logger', async () => {
  const reading = await accepted();
  const again = await inspectFile(sourceOf(header + rows.replaceAll(',', '.')), ramOf({ remembered: [reading] }));
  expect(again.remembered).toBe(false);
  expect(again.reading.decimal_mark).toBe('.');
});

test('a file without a header is known by its delimiter and width', async () => {
  const { reading } = await inspectFile(sourceOf(rows), ramOf());
  const columns = reading.columns.map((column) =>
    column.index === 1 ? { ...column, channel: 'tank_level' as const, unit: 'm' } : column,
  );
  const again = await inspectFile(sourceOf(rows), ramOf({ remembered: [{ ...reading, columns }] }));
  expect(again).toMatchObject({ remembered: true, questions: [], reading: { columns } });
});
