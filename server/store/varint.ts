/**
 * Zigzag variable-length integers: small deltas of either sign take one byte. Deltas are kept within 32 bits,
 * so that the loops run on machine integers.
 */

/** Bytes that `count` varints may need at the most. */
export const longestVarints = (count: number): number => count * 5;

/** Writes one zigzag varint of a 32-bit integer; returns the next place. */
export function putVarint(bytes: Uint8Array, place: number, value: number): number {
  let rest = ((value << 1) ^ (value >> 31)) >>> 0;
  while (rest > 0x7f) {
    bytes[place++] = (rest & 0x7f) | 0x80;
    rest >>>= 7;
  }
  bytes[place++] = rest;
  return place;
}

/** Reads varints one after another from a blob. */
export class VarintReader {
  constructor(
    private readonly bytes: Uint8Array,
    public place: number,
  ) {}

  next(): number {
    const bytes = this.bytes;
    let byte = bytes[this.place++]!;
    let value = byte & 0x7f;
    let shift = 7;
    while (byte > 0x7f) {
      byte = bytes[this.place++]!;
      value |= (byte & 0x7f) << shift;
      shift += 7;
    }
    value >>>= 0;
    return (value >>> 1) ^ -(value & 1);
  }
}
