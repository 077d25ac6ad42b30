import { expect, test } from 'vitest';
import { inspectFile, inspectWith } from '../../server/ingest/inspect';
import { fileReading, previewRow, readingQuestion } from '../../server/shapes/reading';
import { guessed, iso, logLines, plainStamp, ramOf, sourceOf, two } from './memory-source';

const german = (at: Date) =>
  `${two(at.getUTCDate())}.${two(at.getUTCMonth() + 1)}.${at.getUTCFullYear()};${at.toISOString().slice(11, 19)}`;
const slashes = (at: Date) => `${two(at.getUTCDate())}/${two(at.getUTCMonth() + 1)}/${at.getUTCFullYear()}`;
const meanings = (columns: { label: string; channel: string | null; unit: string | null }[]) =>
  Object.fromEntries(columns.filter((c) => c.channel !== null).map((c) => [c.label, `${c.channel} ${c.unit}`]));

test('a plain file is read without a question', async () => {
  const text = `Time,Beat counter,Chamber p [bar],Tank level (cm),Delivery pressure kPa\n${logLines(30, (i, at) => `${plainStamp(at)},${i * 600},2.7${i % 10},${100 + i},27${i % 10}`)}`;
  const { reading, questions, preview, records, again } = await guessed(text);
  expect(fileReading.parse(reading)).toEqual(reading);
  expect(questions.filter((question) => question.must_answer)).toEqual([]);
  expect(meanings(reading.columns)).toMatchObject({
    'Beat counter': 'beat_count count',
    'Chamber p [bar]': 'chamber_pressure bar',
    'Tank level (cm)': 'tank_level cm',
  });
  expect(preview.map((row) => previewRow.parse(row))[0]).toEqual({
    line: 2,
    words: ['2025-04-05 00:00:00', '0', '2.70', '100', '270'],
    at: '2025-04-04T21:00:00.000Z',
    values: [null, 0, 2.7, 100, 270],
    refused: null,
  });
  expect(records).toMatchObject({ rows_read: 30, refused: 0, decimals: [0, 2, 0] });
  expect(again).toEqual(records);
});

test('a stated separator, a preamble, decimal commas and headings in German', async () => {
  const head =
    'sep=;\r\nOrt: Hochtal\r\nSchreiber: 12; Ablesung 3\r\n\r\nDatum;Uhrzeit;Kesseldruck [bar];Füllstand Behälter [cm];Zählerstand Schläge\r\n';
  const { reading, questions, records } = await guessed(
    head + logLines(300, (i, at) => `${german(at)};2,7${i % 10};${100 + i};${i * 600}`).replaceAll('\n', '\r\n'),
  );
  expect(questions).toEqual([]);
  expect(reading).toMatchObject({
    delimiter: ';',
    decimal_mark: ',',
    header_line: 5,
    first_record_line: 6,
    time: { columns: [0, 1], day_order: 'day first' },
  });
  expect(meanings(reading.columns)).toEqual({
    'Kesseldruck [bar]': 'chamber_pressure bar',
    'Füllstand Behälter [cm]': 'tank_level cm',
    'Zählerstand Schläge': 'beat_count count',
  });
  expect(records.values[0]!.slice(0, 2)).toEqual([2.7, 2.71]);
});

test.each([
  [
    'Spanish',
    'Fecha;Hora;Presión cámara de aire (bar);Nivel tanque (m);Golpes acumulados;Batería (V)',
    ['chamber_pressure bar', 'tank_level m', 'beat_count count', 'battery V'],
  ],
  [
    'French',
    'Date;Heure;Pression cloche à air (bar);Niveau captage (m);Nombre de coups;Tension pile (V)',
    ['chamber_pressure bar', 'source_level m', 'beat_count count', 'battery V'],
  ],
  [
    'Portuguese',
    'Data;Hora;Pressão câmara (bar);Nível reservatório (m);Batidas acumuladas;Bateria (V)',
    ['chamber_pressure bar', 'tank_level m', 'beat_count count', 'battery V'],
  ],
])('headings in %s', async (_, header, expected) => {
  const rows = logLines(
    300,
    (i, at) => `${slashes(at)};${at.toISOString().slice(11, 16)};2,7${i % 10};1,0${i % 10};${i * 600};3,6${i % 3}`,
  );
  const { reading, questions } = await guessed(`${header}\n${rows}`);
  expect(questions).toEqual([]);
  expect(Object.values(meanings(reading.columns))).toEqual(expected);
});

test('a names row, a units row and a row of kinds above quoted stamps', async () => {
  const head =
    '"TIMESTAMP","RECORD","Batt_Avg","P_deliv_Avg","Stage_src","Strokes_Tot"\n"TS","RN","Volts","kPa","m","count"\n"","","Avg","Avg","Smp","Tot"\n';
  const { reading, questions, records, again } = await guessed(
    head +
      logLines(
        30,
        (i, at) => `"${plainStamp(at)}",${i + 500},12.5${i % 4},27${i % 7},1.${100 + i},${590 + (i % 9)}`,
        600,
      ),
  );
  expect(reading).toMatchObject({ header_line: 1, units_line: 2, first_record_line: 4 });
  expect(meanings(reading.columns)).toEqual({
    Batt_Avg: 'battery V',
    P_deliv_Avg: 'chamber_pressure kPa',
    Stage_src: 'source_level m',
    Strokes_Tot: 'beats_in_interval count',
  });
  expect(questions).toEqual([]);
  expect(records.rows_read).toBe(30);
  expect(again).toEqual(records);
});

test('runs of blanks under a header that stands in a comment', async () => {
  const { reading, records } = await guessed(
    `# readout 7\n# Date Time  Chamber (kPa)  Tank level (m)\n${logLines(30, (i, at) => `${plainStamp(at)}   27${i % 7}.5  1.${100 + i}`)}`,
  );
  expect(reading).toMatchObject({ delimiter: ' ', header_line: 2, first_record_line: 3, time: { columns: [0, 1] } });
  expect(meanings(reading.columns)).toEqual({
    'Chamber (kPa)': 'chamber_pressure kPa',
    'Tank level (m)': 'tank_level m',
  });
  expect(records.rows_read).toBe(30);
});

test.each([
  ['epoch seconds', (at: Date) => String(at.getTime() / 1000), 'epoch seconds', '2025-04-05T00:00:00.000Z'],
  ['epoch milliseconds', (at: Date) => String(at.getTime()), 'epoch milliseconds', '2025-04-05T00:00:00.000Z'],
  [
    'spreadsheet days',
    (at: Date) => (at.getTime() / 86_400_000 + 25_569).toFixed(5),
    'spreadsheet days',
    '2025-04-04T21:00:00.000Z',
  ],
  ['compact stamps', (at: Date) => plainStamp(at).replace(/[- :]/g, ''), 'fields', '2025-04-04T21:00:00.000Z'],
  [
    'month names',
    (at: Date) => `${two(at.getUTCDate())}-Apr-2025 ${at.toISOString().slice(11, 16)}`,
    'fields',
    '2025-04-04T21:00:00.000Z',
  ],
  ['offsets', (at: Date) => `${plainStamp(at)}+05:45`, 'fields', '2025-04-04T18:15:00.000Z'],
])('time as %s', async (_, stamp, form, first) => {
  const { reading, questions, records, again } = await guessed(
    `Stamp,Tank level (m)\n${logLines(40, (i, at) => `${stamp(at)},1.${100 + i}`)}`,
  );
  expect(questions).toEqual([]);
  expect(reading.time.form).toBe(form);
  expect(iso(records.times[0]!)).toBe(first);
  expect(records.times[39]! - records.times[0]!).toBe(39 * 600_000);
  expect(again).toEqual(records);
});

test('a heading that says start marks the start of the interval, one that states a zone the zone', async () => {
  const rows = logLines(20, (i, at) => `${plainStamp(at)},1.${100 + i}`);
  expect((await guessed(`Interval start,Tank level (m)\n${rows}`)).reading.time.stamp_marks).toBe('start');
  const { reading, records } = await guessed(
    `Time (UTC+03:00),Tank level (m)\n${rows}`,
    ramOf({ time_zone: 'Europe/Paris' }),
  );
  expect(reading.time).toMatchObject({ stamp_marks: 'end', zone: '+03:00' });
  expect(iso(records.times[0]!)).toBe('2025-04-04T21:00:00.000Z');
});

test('a file of nothing but figures asks which column is what', async () => {
  const { reading, questions } = await guessed(logLines(20, (i, at) => `${plainStamp(at)},27${i % 7}.1,1.${100 + i}`));
  expect(reading).toMatchObject({ header_line: null, first_record_line: 1 });
  expect(questions.map((question) => readingQuestion.parse(question))[0]).toMatchObject({
    about: 'channel',
    must_answer: true,
    question: expect.stringContaining('Column 2, Column 3'),
  });
  expect(questions.slice(1)).toMatchObject([
    { column: 1, must_answer: false },
    { column: 2, must_answer: false },
  ]);
});

test('a level that may be the tank or the source is decided by the sensors, or asked', async () => {
  const text = `Time,Level (m)\n${logLines(20, (i, at) => `${plainStamp(at)},1.${100 + i}`)}`;
  const one = await guessed(text, ramOf({ sensors: [{ channel: 'source_level', unit: 'm' }] }));
  expect(one.reading.columns[1]!.channel).toBe('source_level');
  const { questions } = await guessed(
    text,
    ramOf({ sensors: [{ channel: 'source_level' }, { channel: 'tank_level' }] }),
  );
  expect(questions).toMatchObject([
    { about: 'channel', column: 1, must_answer: true, question: expect.stringContaining('tank level or source level') },
  ]);
});

test('of two columns that claim a channel the better one wins, and the other is told', async () => {
  const rows = logLines(20, (i, at) => `${plainStamp(at)},26${i % 7},27${i % 7},28${i % 7}`);
  const { reading, questions } = await guessed(
    `Time,Chamber pressure min (kPa),Chamber pressure avg (kPa),Chamber pressure max (kPa)\n${rows}`,
  );
  expect(reading.columns.map((column) => column.channel)).toEqual([null, null, 'chamber_pressure', null]);
  expect(questions).toMatchObject([
    { column: 1, must_answer: false, question: expect.stringContaining('"Chamber pressure avg (kPa)" was taken') },
    { column: 3, must_answer: false },
  ]);
  const tie = await guessed(`Time,Pressure 1 (kPa),Pressure 2 (kPa),Tank level (cm)\n${rows}`);
  expect(tie.questions[0]).toMatchObject({ column: 2, must_answer: true });
});

test('a unit is taken from the sensor where the file has none, and asked where figures cannot tell', async () => {
  const text = `Time,Chamber pressure,Tank level,Temp\n${logLines(20, (i, at) => `${plainStamp(at)},2.7${i % 7},1.${100 + i},18.5`)}`;
  const known = await guessed(text, ramOf({ sensors: [{ channel: 'chamber_pressure', unit: 'bar' }] }));
  expect(known.reading.columns.map((column) => column.unit)).toEqual([null, 'bar', 'm', 'degC']);
  expect(known.questions).toEqual([]);
  const unknown = await guessed(text);
  expect(unknown.questions).toMatchObject([
    { about: 'unit', column: 1, must_answer: true, question: expect.stringContaining('about 2.73') },
  ]);
});

test('figures that do not go with the stated unit are asked about', async () => {
  const { questions } = await guessed(
    `Time,Chamber pressure (kPa)\n${logLines(20, (i, at) => `${plainStamp(at)},2.7${i % 7}`)}`,
  );
  expect(questions).toMatchObject([
    { about: 'unit', must_answer: false, question: expect.stringContaining('Is the unit right?') },
  ]);
});

test('a record number, a status and a panel voltage are no channels', async () => {
  const { reading } = await guessed(
    `No,Time,Tank level (m),Status code,Panel voltage (V),Battery (V)\n${logLines(30, (i, at) => `${i + 1},${plainStamp(at)},1.${100 + i},0,1${i % 9}.5,12.5`)}`,
  );
  expect(reading.columns.map((column) => column.channel)).toEqual([null, null, 'tank_level', null, null, 'battery']);
});

test.each([
  ['counter', 'Time,Strokes', (i: number) => i * 600, 'beat_count'],
  ['interval', 'Time,Strokes', (i: number) => 590 + (i % 9), 'beats_in_interval'],
  ['rate', 'Time,Strokes per min', (i: number) => 60 + (i % 3), 'beat_rate'],
  ['rate without a word', 'Time,Beats', (i: number) => 60 + (i % 3), 'beat_rate'],
] as const)('beats as a %s', async (_, header, value, channel) => {
  const { reading } = await guessed(`${header}\n${logLines(40, (i, at) => `${plainStamp(at)},${value(i)}`)}`);
  expect(reading.columns[1]!.channel).toBe(channel);
});

test.each([
  [
    'no time',
    'level,volts\n1.2,3.6\n1.3,3.6\n1.4,3.5\n',
    /has no time column\. Its columns are level, volts; line 2 reads "1\.2 3\.6"/,
  ],
  [
    'no figures',
    'Time,Note\n2025-01-01 10:00,opened\n2025-01-02 10:00,closed\n2025-01-03 10:00,opened\n',
    /holds no records|no column of numbers/,
  ],
  ['a header alone', 'Time,Tank level (m)\n', /holds no records.*begins with "Time,Tank level \(m\)"/],
  ['prose', 'Dear all,\nthe ram has stopped.\nRegards\n', /holds no records/],
  [
    'one value a line',
    `Time,channel,value\n${logLines(40, (i, at) => `${plainStamp(at)},${i % 2 ? 'p' : 'level'},${i}.5`)}`,
    /one column for each sensor/,
  ],
])('a file with %s is refused with a sentence', async (_, text, words) => {
  await expect(inspectFile(sourceOf(text, 'mill.csv'), ramOf())).rejects.toThrow(words);
});

test('a corrected reading is followed at once, and one that contradicts itself is refused', async () => {
  const source = sourceOf(`Time,A,B\n${logLines(20, (i, at) => `${plainStamp(at)},27${i % 7},1.${100 + i}`)}`);
  const { reading } = await inspectFile(source, ramOf());
  const columns = reading.columns.map((column) => ({
    ...column,
    channel: column.index === 1 ? ('chamber_pressure' as const) : null,
  }));
  const asked = await inspectWith(source, ramOf(), { ...reading, columns });
  expect(asked.questions).toMatchObject([{ about: 'unit', column: 1 }]);
  const mended = await inspectWith(source, ramOf(), {
    ...reading,
    columns: columns.map((c) => (c.index === 1 ? { ...c, unit: 'kPa' } : c)),
  });
  expect(mended.questions).toEqual([]);
  expect(mended.preview[0]).toMatchObject({ values: [null, 270, 1.1], at: '2025-04-04T21:00:00.000Z' });
  const twice = reading.columns.map((column) => ({
    ...column,
    channel: column.index > 0 ? ('tank_level' as const) : null,
  }));
  await expect(inspectWith(source, ramOf(), { ...reading, columns: twice })).rejects.toThrow(
    /"A" and "B" cannot both be read as tank_level/,
  );
});

test('units and little words in a heading do not move a sensor to another place', async () => {
  const rows = logLines(40, (i, at) => `${plainStamp(at)},4${i % 10}.5,6.${i % 10},58.${i % 10},${1200.5 + i}`);
  const { reading } = await guessed(`Time,Tank level in,Flow in L/min,Water temp F,Water meter L\n${rows}`);
  expect(meanings(reading.columns)).toEqual({
    'Tank level in': 'tank_level in',
    'Flow in L/min': 'delivery_flow L/min',
    'Water temp F': 'water_temperature degF',
    'Water meter L': 'delivery_volume L',
  });
});

test('headings over two lines of a cell, units in the cells, and a UTC column beside a local one', async () => {
  const rows = logLines(20, (i, at) => `"${plainStamp(at)}","${plainStamp(at)}","27${i % 10}.5 kPa","1.0${i % 10}"`);
  const { reading, questions, records, again } = await guessed(
    `"Local time","UTC time","Chamber","Tank level\n(m)"\n${rows}`,
  );
  expect(questions).toEqual([]);
  expect(reading).toMatchObject({ header_line: 1, first_record_line: 3, time: { columns: [1], zone: 'utc' } });
  expect(meanings(reading.columns)).toEqual({ Chamber: 'chamber_pressure kPa', 'Tank level (m)': 'tank_level m' });
  expect(records.values[0]!.slice(0, 2)).toEqual([270.5, 271.5]);
  expect(again).toEqual(records);
});

test('another header line brings its own columns, and keeps what was said of those that stay', async () => {
  const source = sourceOf(
    `Time,Chamber pressure (kPa),X\nstamp,Chamber pressure (kPa),Tank level (m)\n${logLines(20, (i, at) => `${plainStamp(at)},27${i % 7},1.${100 + i}`)}`,
  );
  const { reading } = await inspectFile(source, ramOf());
  const said = reading.columns.map((column) => (column.index === 1 ? { ...column, unit: 'mbar' } : column));
  const { reading: followed } = await inspectWith(source, ramOf(), { ...reading, header_line: 2, columns: said });
  const other = await inspectWith(source, ramOf(), { ...followed, header_line: 1 });
  expect(meanings(followed.columns)).toEqual({
    'Chamber pressure (kPa)': 'chamber_pressure mbar',
    'Tank level (m)': 'tank_level m',
  });
  expect(meanings(other.reading.columns)).toEqual({ 'Chamber pressure (kPa)': 'chamber_pressure mbar' });
});

test('another delimiter brings its own columns', async () => {
  const source = sourceOf(
    `Time;Chamber pressure (kPa);Tank level (m)\n${logLines(20, (i, at) => `${plainStamp(at)};27${i % 7};1.${100 + i}`)}`,
  );
  const { reading } = await inspectFile(source, ramOf());
  const one = { index: 0, label: 'all', channel: null, unit: null };
  const { reading: followed } = await inspectWith(source, ramOf(), { ...reading, columns: [one] });
  expect(followed).toEqual(reading);
});

test('a running counter is one also in a file that begins with its newest record', async () => {
  const rows = logLines(40, (i, at) => `${plainStamp(at)},${5000 + i * 600},1.2`)
    .trimEnd()
    .split('\n')
    .reverse();
  const { reading, records } = await guessed(`Timestamp,Beat count,Tank level m\n${rows.join('\n')}\n`);
  expect(meanings(reading.columns)).toMatchObject({ 'Beat count': 'beat_count count' });
  expect(records).toMatchObject({ rows_read: 40, refused: 0 });
});
