import { expect, test } from 'vitest';
import { decodeAll, detectEncoding, TextStream } from '../../server/ingest/encoding';
import { inspectFile } from '../../server/ingest/inspect';
import { guessed, logLines, plainStamp, ramOf, sourceOf } from './memory-source';

/** Computed with Python's codecs. */
const cases = [
  { encoding: 'windows-1252', hex: '80', text: '€' },
  { encoding: 'windows-1252', hex: '6db32f68', text: 'm³/h' },
  { encoding: 'windows-1252', hex: 'b043209620b56d', text: '°C – µm' },
  { encoding: 'utf-8', hex: '6dc2b32f68', text: 'm³/h' },
  { encoding: 'utf-8', hex: 'efbbbf61', text: 'a' },
  { encoding: 'utf-16le', hex: 'fffe6d00b300', text: 'm³' },
  { encoding: 'utf-16be', hex: 'feff006d00b3', text: 'm³' },
] as const;

test.each(cases)('$hex is "$text" in $encoding', ({ encoding, hex, text }) => {
  const bytes = Buffer.from(hex, 'hex');
  expect(detectEncoding(bytes)).toBe(encoding);
  expect(decodeAll(bytes, encoding)).toBe(text);
});

test('characters that are cut by the edge of two pieces come out whole', () => {
  for (const encoding of ['utf-8', 'utf-16le'] as const) {
    const bytes = Buffer.from('Höhe m³/h', encoding === 'utf-8' ? 'utf8' : 'utf16le');
    const stream = new TextStream(encoding);
    let text = '';
    for (const byte of bytes) text += stream.write(Buffer.from([byte]));
    expect(text + stream.end()).toBe('Höhe m³/h');
  }
});

test('UTF-16 without a byte order mark is told by its NUL bytes', async () => {
  const text = `Time\tTank level (m)\n${logLines(30, (i, at) => `${plainStamp(at)}\t${(1 + i / 100).toFixed(2)}`)}`;
  const little = Buffer.from(text, 'utf16le');
  for (const [bytes, encoding] of [
    [little, 'utf-16le'],
    [Buffer.from(little).swap16(), 'utf-16be'],
  ] as const) {
    const { reading, records, again } = await guessed(bytes);
    expect(reading.encoding).toBe(encoding);
    expect(records.values[0]).toHaveLength(30);
    expect(again).toEqual(records);
  }
});

test('a degree sign far down the file tells Windows-1252, one damaged byte does not', async () => {
  const lines = logLines(9000, (i, at) => `${plainStamp(at)},${(1 + i / 100_000).toFixed(5)}`);
  const log = `Time,Tank level (m)\n${lines}`;
  const late = Buffer.from(`${log}# 21 °C in the hut\n`, 'latin1');
  expect((await inspectFile(sourceOf(late), ramOf())).reading.encoding).toBe('windows-1252');
  const damaged = Buffer.from(
    `Time,Tank level (m),T (°C)\n2026-01-01 00:00,1.2,10\n2026-01-01 00:10,1.2,10\n# °\n# °\n# x\n`,
  );
  damaged[damaged.length - 2] = 0xe9;
  expect((await inspectFile(sourceOf(damaged), ramOf())).reading.encoding).toBe('utf-8');
});

test.each([
  [
    'a spreadsheet',
    Buffer.concat([Buffer.from('504b0304', 'hex'), Buffer.from('....[Content_Types].xml')]),
    /spreadsheet \(\.xlsx\).*save it as CSV first/,
  ],
  [
    'a bundle',
    Buffer.concat([Buffer.from('504b0304', 'hex'), Buffer.from('....log.csv')]),
    /bundle \(\.zip\).*unpack it first/,
  ],
  ['gzip', Buffer.from('1f8b0800000000', 'hex'), /compressed file.*unpack it first/],
  ['a PDF', Buffer.from('%PDF-1.7 ...'), /PDF/],
  ['a picture', Buffer.from('89504e470d0a1a0a0000000d', 'hex'), /picture/],
  ['a web page', Buffer.from('<!DOCTYPE html><html><body>Log in</body></html>'), /web page/],
  ['machine code', Buffer.from([127, 69, 76, 70, 2, 1, 1, 0, 0, 0, 0, 0, 0, 3, 0, 62, 0, 1, 0, 0, 0]), /not text/],
  ['nothing', Buffer.alloc(0), /empty \(0 bytes\)/],
  ['blanks', Buffer.from(' \n\r\n\t '), /empty: it holds blanks only/],
])('%s is refused by name', async (_, bytes, words) => {
  await expect(inspectFile(sourceOf(bytes, 'readout.bin'), ramOf())).rejects.toThrow(words);
  await expect(inspectFile(sourceOf(bytes, 'readout.bin'), ramOf())).rejects.toThrow(/^readout\.bin is /);
});

test('NULs with which a logger has padded its last block are passed over', async () => {
  const log = `Time,Tank level (m)\n${logLines(30, (i, at) => `${plainStamp(at)},${(1 + i / 100).toFixed(2)}`)}`;
  const { records, again } = await guessed(Buffer.concat([Buffer.from(log), Buffer.alloc(300)]));
  expect(records).toMatchObject({ refused: 0, rows_read: 30 });
  expect(again).toEqual(records);
});
