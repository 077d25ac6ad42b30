// @ts-expect-error the package has no types
import csvSpectrum from 'csv-spectrum';
import { expect, test } from 'vitest';
import { splitRows } from '../../server/ingest/rows';

interface Fixture {
  name: string;
  csv: Buffer;
  json: Buffer;
}
const fixtures = await new Promise<Fixture[]>((resolve, reject) => {
  csvSpectrum((error: Error | null, all: Fixture[]) => (error === null ? resolve(all) : reject(error)));
});

/** The JSON of one fixture holds another telephone number than its CSV: that field is not compared. */
const notCompared = 'Contact Phone Number';

test('csv-spectrum has its twelve fixtures', () => {
  expect(fixtures).toHaveLength(12);
});

test.each(fixtures)('csv-spectrum: $name', ({ name, csv, json }) => {
  const [header, ...rows] = splitRows(csv.toString(), ',', name).map((row) => row.fields);
  const objects = rows.map((fields) => Object.fromEntries(header!.map((label, i) => [label, fields[i] ?? ''])));
  // line ends within a field are all written alike here
  const parsed = JSON.parse(json.toString().replaceAll('\\r\\n', '\\n')) as object;
  const expected = (Array.isArray(parsed) ? parsed : [parsed]) as Record<string, string>[];
  for (const row of [...objects, ...expected]) delete row[notCompared];
  expect(objects).toEqual(expected);
});

/** Rows of Python's csv.reader with its defaults (RFC 4180's reading rules); line ends within a field are all \n here. */
const cases: [string, string, string[][]][] = [
  [
    'plain',
    'a,b,c\r\n1,2,3\r\n',
    [
      ['a', 'b', 'c'],
      ['1', '2', '3'],
    ],
  ],
  [
    'no final newline',
    'a,b,c\n1,2,3',
    [
      ['a', 'b', 'c'],
      ['1', '2', '3'],
    ],
  ],
  [
    'quoted comma',
    'a,b\n"x,y",2\n',
    [
      ['a', 'b'],
      ['x,y', '2'],
    ],
  ],
  [
    'doubled quote',
    'a,b\n1,"ha ""ha"" ha"\n',
    [
      ['a', 'b'],
      ['1', 'ha "ha" ha'],
    ],
  ],
  [
    'newline in field',
    'a,b\n"one\ntwo",3\n',
    [
      ['a', 'b'],
      ['one\ntwo', '3'],
    ],
  ],
  [
    'crlf in field',
    'a,b\r\n"one\r\ntwo",3\r\n',
    [
      ['a', 'b'],
      ['one\ntwo', '3'],
    ],
  ],
  [
    'empty fields',
    'a,b,c\n,,\n1,"",3\n',
    [
      ['a', 'b', 'c'],
      ['', '', ''],
      ['1', '', '3'],
    ],
  ],
  [
    'spaces kept',
    'a,b\n 1 , 2\n',
    [
      ['a', 'b'],
      [' 1 ', ' 2'],
    ],
  ],
  [
    'quote only at start counts',
    'a,b\n1,x"y"z\n',
    [
      ['a', 'b'],
      ['1', 'x"y"z'],
    ],
  ],
  [
    'ragged short',
    'a,b,c\n1,2\n',
    [
      ['a', 'b', 'c'],
      ['1', '2'],
    ],
  ],
  [
    'ragged long',
    'a,b\n1,2,3\n',
    [
      ['a', 'b'],
      ['1', '2', '3'],
    ],
  ],
  ['blank line', 'a,b\n1,2\n\n3,4\n', [['a', 'b'], ['1', '2'], [''], ['3', '4']]],
  [
    'cr only',
    'a,b\r1,2\r',
    [
      ['a', 'b'],
      ['1', '2'],
    ],
  ],
  [
    'trailing comma',
    'a,b,\n1,2,\n',
    [
      ['a', 'b', ''],
      ['1', '2', ''],
    ],
  ],
  ['empty file', '', []],
  ['header only', 'a,b\n', [['a', 'b']]],
];

test.each(cases)('%s', (_, input, rows) => {
  expect(splitRows(input, ',', 'case.csv').map((row) => row.fields)).toEqual(rows);
});

test('runs of blanks and tabs are one delimiter, and lines keep their numbers over quoted line ends', () => {
  expect(splitRows('  a \t b\n"one two"   3\n', ' ', 'a.txt').map((row) => row.fields)).toEqual([
    ['a', 'b'],
    ['one two', '3'],
  ]);
  expect(splitRows('a,"b\nc"\n\n1,2\n', ',', 'a.csv').map((row) => row.line)).toEqual([1, 3, 4]);
});

test('a quote left open holds only its own line', () => {
  const text = `a,b\n1,"x\n${Array.from({ length: 30 }, (_, i) => `${i},${i}\n`).join('')}`;
  const rows = splitRows(text, ',', 'a.csv');
  expect(rows).toHaveLength(32);
  expect(rows[1]).toEqual({ line: 2, fields: ['1', '"x'] });
  expect(rows.at(-1)).toEqual({ line: 32, fields: ['29', '29'] });
});
