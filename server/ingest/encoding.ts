/*
 * Bytes to text: byte order mark, UTF-16 without one by its pattern of NUL bytes, UTF-8 where it holds, else Windows-1252.
 */
import type { TextEncoding } from '../shapes/reading';

/** Windows-1252 for the bytes 80 to 9F. Node 20's own decoder turns them into control characters. Source: the WHATWG Encoding index. */
const windows80to9f = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ';

export function detectEncoding(head: Buffer): TextEncoding {
  if (head[0] === 0xff && head[1] === 0xfe) return 'utf-16le';
  if (head[0] === 0xfe && head[1] === 0xff) return 'utf-16be';
  return nulPattern(head) ?? (holdsAsUtf8(head) ? 'utf-8' : 'windows-1252');
}

/** Western text in UTF-16 has a NUL in nearly every other byte. */
function nulPattern(head: Buffer): TextEncoding | null {
  const length = Math.min(head.length, 4096) & ~1;
  if (length < 4) return null;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < length; i += 2) {
    if (head[i] === 0) even++;
    if (head[i + 1] === 0) odd++;
  }
  const pairs = length / 2;
  if (odd > 0.6 * pairs && even < 0.05 * pairs) return 'utf-16le';
  if (even > 0.6 * pairs && odd < 0.05 * pairs) return 'utf-16be';
  return null;
}

/** Counts rather than demands: one damaged byte does not turn a file of UTF-8 into another encoding. */
function holdsAsUtf8(bytes: Buffer): boolean {
  let right = 0;
  let wrong = 0;
  for (let i = 0; i < bytes.length; i++) {
    const lead = bytes[i]!;
    if (lead < 0x80) continue;
    const followers =
      lead >= 0xc2 && lead < 0xe0 ? 1 : lead >= 0xe0 && lead < 0xf0 ? 2 : lead >= 0xf0 && lead < 0xf5 ? 3 : 0;
    let follow = 0;
    while (follow < followers && i + follow + 1 < bytes.length && (bytes[i + follow + 1]! & 0xc0) === 0x80) follow++;
    // a character cut by the end of the head is no fault
    if (followers > 0 && (follow === followers || i + follow + 1 >= bytes.length)) right++;
    else wrong++;
    i += follow;
  }
  return right >= wrong;
}

/** Decodes a stream of bytes piece by piece; a byte order mark is dropped. */
export class TextStream {
  private readonly decoder: TextDecoder | null;

  constructor(encoding: TextEncoding) {
    this.decoder = encoding === 'windows-1252' ? null : new TextDecoder(encoding);
  }

  write(bytes: Buffer): string {
    if (this.decoder !== null) return this.decoder.decode(bytes, { stream: true });
    return bytes.toString('latin1').replace(/[\x80-\x9f]/g, (c) => windows80to9f[c.charCodeAt(0) - 0x80]!);
  }

  end(): string {
    return this.decoder?.decode() ?? '';
  }
}

export function decodeAll(bytes: Buffer, encoding: TextEncoding): string {
  const stream = new TextStream(encoding);
  return stream.write(bytes) + stream.end();
}
