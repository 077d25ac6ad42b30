/*
 * The fast reading engine: pieces of bytes to whole lines for the line scanner. At a quoted field that runs over the end of its line
 * the general engine takes over for the rest of the file.
 */
import type { FileReading } from '../shapes/reading';
import { readGenerally } from './general-reader';
import type { Habits } from './habits';
import { CR, LF, LineScanner } from './line-scanner';
import { LONGEST_LINE, tooLong } from './quotes';
import type { RowReader } from './row-reader';
import type { StampReader } from './stamp-reader';

/** Reads bytes in an encoding that keeps ASCII as single bytes: UTF-8 or Windows-1252. */
export async function scanBytes(
  chunks: AsyncIterable<Buffer>,
  reading: FileReading,
  habits: Habits,
  stamps: StampReader,
  reader: RowReader,
  fileName: string,
): Promise<void> {
  const scanner = new LineScanner(reading, habits, stamps, reader, fileName);
  const iterator = chunks[Symbol.asyncIterator]();
  try {
    const left = await scanPieces(iterator, scanner, fileName);
    if (left !== null) await readGenerally(joined(left, iterator), reading, reader, fileName, scanner.line);
  } finally {
    // closes the file where the reading ends early
    await iterator.return?.();
  }
}

/** Scans piece by piece. Gives null at the end, or the bytes from which the general engine must go on. */
async function scanPieces(
  iterator: AsyncIterator<Buffer>,
  scanner: LineScanner,
  fileName: string,
): Promise<Buffer | null> {
  let carry: Buffer = Buffer.alloc(0);
  for (let isFirst = true; ; ) {
    const { value, done } = await iterator.next();
    if (done) break;
    let bytes: Buffer = value;
    if (isFirst) {
      bytes = Buffer.concat([carry, bytes]);
      carry = bytes;
      if (bytes.length < 3) continue;
      isFirst = false;
      carry = bytes.subarray(0, 0);
      if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) bytes = bytes.subarray(3);
    }
    const end = wholeLines(bytes);
    if (end === 0) {
      carry = Buffer.concat([carry, bytes]);
      if (carry.length > LONGEST_LINE) throw tooLong(fileName);
      continue;
    }
    // only the line that runs over the edge of two pieces is copied
    const edge = carry.length > 0 ? firstLine(bytes) : 0;
    if (edge > 0) {
      const line = Buffer.concat([carry, bytes.subarray(0, edge)]);
      const place = scanner.scan(line, line.length);
      if (place < line.length) return Buffer.concat([line.subarray(place), bytes.subarray(edge)]);
    }
    const rest = bytes.subarray(edge);
    const place = scanner.scan(rest, end - edge);
    if (place < end - edge) return rest.subarray(place);
    carry = bytes.subarray(end);
    if (carry.length > LONGEST_LINE) throw tooLong(fileName);
  }
  // a CR at the very end is a line end after all
  if (carry[carry.length - 1] === CR) carry = Buffer.concat([carry, Buffer.from('\n')]);
  const end = wholeLines(carry);
  const place = scanner.scan(carry, end);
  if (place < end) return carry.subarray(place);
  return scanner.takeLast(carry.subarray(end)) ? null : carry.subarray(end);
}

async function* joined(first: Buffer, iterator: AsyncIterator<Buffer>): AsyncIterable<Buffer> {
  yield first;
  for (;;) {
    const { value, done } = await iterator.next();
    if (done) return;
    yield value;
  }
}

/** Where the last whole line ends. A CR as the last byte may be half of a line end. */
function wholeLines(bytes: Buffer): number {
  let end = bytes.length;
  while (end > 0 && bytes[end - 1] !== LF && !(bytes[end - 1] === CR && end < bytes.length)) end--;
  return end;
}

/** Where the first line of bytes that hold a whole one ends. */
function firstLine(bytes: Buffer): number {
  let end = 0;
  while (bytes[end] !== LF && bytes[end] !== CR) end++;
  return bytes[end] === CR && bytes[end + 1] === LF ? end + 2 : end + 1;
}
