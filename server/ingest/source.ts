import { createReadStream, statSync } from 'node:fs';
import path from 'node:path';

/** A file to read. It may be opened several times; each time its bytes come from the start, or from the byte that is asked for. */
export interface FileSource {
  /** The file's name as a person knows it, for sentences. */
  name: string;
  bytes: number;
  open(fromByte?: number): AsyncIterable<Buffer>;
}

export function fileSource(place: string, name = path.basename(place)): FileSource {
  return {
    name,
    bytes: statSync(place).size,
    open: (fromByte = 0) => createReadStream(place, { highWaterMark: 1 << 18, start: fromByte }),
  };
}

/** The first bytes of a file, or its last ones. `complete` is true where they are the whole file. */
export async function readPart(
  source: FileSource,
  bytes: number,
  part: 'head' | 'tail',
): Promise<{ bytes: Buffer; complete: boolean }> {
  const from = part === 'head' ? 0 : Math.max(0, source.bytes - bytes);
  const chunks: Buffer[] = [];
  let held = 0;
  for await (const chunk of source.open(from)) {
    chunks.push(chunk);
    held += chunk.length;
    if (part === 'head' && held > bytes) break;
  }
  const all = Buffer.concat(chunks);
  return part === 'head'
    ? { bytes: all.subarray(0, bytes), complete: all.length <= bytes }
    : { bytes: all, complete: from === 0 };
}
