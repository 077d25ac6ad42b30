/*
 * The reading engine for every dialect: text, whole rows, papaparse on a Node stream, one row at a time to the row reader.
 */
import { Readable } from 'node:stream';
import Papa from 'papaparse';
import type { FileReading } from '../shapes/reading';
import { TextStream } from './encoding';
import { QuoteMender } from './quotes';
import type { RowReader } from './row-reader';
import { finished, linesOf, papaOptions, prepared } from './rows';

/**
 * Reads to the end of the bytes.
 * @param from line on which the bytes begin
 */
export async function readGenerally(
  chunks: AsyncIterable<Buffer>,
  reading: FileReading,
  reader: RowReader,
  fileName: string,
  from = 1,
): Promise<void> {
  const { delimiter, first_record_line } = reading;
  const skip = Math.max(0, first_record_line - from);
  const mender = new QuoteMender(delimiter, fileName, skip);
  const decoder = new TextStream(reading.encoding);
  let line = from + skip;
  let ending = '';

  async function* wholeRows() {
    for await (const chunk of chunks) {
      const rows = mender.push(decoder.write(chunk));
      if (rows !== '') yield prepared(rows, delimiter);
    }
    ending = mender.push(decoder.end()) + mender.end();
  }
  const takeAll = (rows: string[][], isEnd: boolean) => {
    for (let i = 0; i < rows.length; i++) {
      const raw = rows[i]!;
      const isWhole = !(isEnd && mender.unterminated && i === rows.length - 1);
      reader.take(finished(raw, delimiter, mender.hasQuotes), line, isWhole);
      line += mender.hasQuotes ? linesOf(raw) : 1;
    }
  };

  await new Promise<void>((resolve, reject) => {
    const stream = Readable.from(wholeRows());
    Papa.parse<string[]>(stream, {
      ...papaOptions(delimiter),
      chunk: ({ data }) => {
        try {
          takeAll(data, false);
        } catch (error) {
          stream.destroy();
          reject(error);
        }
      },
      complete: () => resolve(),
      error: reject,
    });
  });
  if (ending !== '')
    takeAll(Papa.parse<string[]>(prepared(ending.slice(0, -1), delimiter), papaOptions(delimiter)).data, true);
}
