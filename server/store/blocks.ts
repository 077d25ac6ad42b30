import { longestVarints, putVarint, VarintReader } from './varint';

/**
 * Columnar blocks: the stamps of one load's day in one blob, each channel's values in another, delta-coded in the
 * file's own resolution so that they come back exactly. Missing values stand in a bitmap, never as a magic number.
 *
 * Time blob:    float64 first · float64 resolution (ms) · varints of the change of the step.
 * Channel blob: byte form (0 scaled integers, 1 float64) · byte decimals · byte has-bitmap · bitmap · body.
 */

const LIMIT = 2 ** 30;

/** Stamps in rising order, UTC milliseconds. */
export function encodeTimes(times_ms: Float64Array): Uint8Array {
  const count = times_ms.length;
  const resolution = commonResolution(times_ms);
  const bytes = new Uint8Array(16 + longestVarints(count));
  const view = new DataView(bytes.buffer);
  const first = count > 0 ? times_ms[0]! : 0;
  view.setFloat64(0, first);
  view.setFloat64(8, resolution);
  let place = 16;
  let earlier = first;
  let step = 0;
  for (let i = 1; i < count; i++) {
    const next = (times_ms[i]! - earlier) / resolution;
    place = putVarint(bytes, place, next - step);
    step = next;
    earlier = times_ms[i]!;
  }
  return bytes.slice(0, place);
}

export function decodeTimes(blob: Uint8Array, count: number): Float64Array {
  const view = new DataView(blob.buffer, blob.byteOffset, blob.byteLength);
  const times = new Float64Array(count);
  if (count === 0) return times;
  const resolution = view.getFloat64(8);
  const varints = new VarintReader(blob, 16);
  let at = view.getFloat64(0);
  let step = 0;
  times[0] = at;
  for (let i = 1; i < count; i++) {
    step += varints.next();
    at += step * resolution;
    times[i] = at;
  }
  return times;
}

/** The coarsest of one minute, one second, 100 ms and 1 ms that all stamps share. A day has 8.64e7 ms: 32 bits suffice. */
function commonResolution(times_ms: Float64Array): number {
  for (const resolution of [60_000, 1_000, 100]) {
    let fits = true;
    for (let i = 0; i < times_ms.length && fits; i++) fits = times_ms[i]! % resolution === 0;
    if (fits) return resolution;
  }
  return 1;
}

/** @param decimals most decimals written in the file for this column; values are in the file's own unit, NaN where missing. */
export function encodeChannel(values: Float64Array, decimals: number): Uint8Array {
  const count = values.length;
  const scale = 10 ** decimals;
  const bitmapBytes = (count + 7) >> 3;
  const bytes = new Uint8Array(3 + bitmapBytes + longestVarints(count));
  let missing = 0;
  for (let i = 0; i < count; i++) {
    if (!Number.isNaN(values[i]!)) continue;
    missing++;
    bytes[3 + (i >> 3)]! |= 1 << (i & 7);
  }
  let place = missing > 0 ? 3 + bitmapBytes : 3;
  let earlier = 0;
  for (let i = 0; i < count; i++) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    const whole = Math.round(value * scale);
    const delta = whole - earlier;
    const exact = whole / scale === value && Math.abs(whole) <= LIMIT && Math.abs(delta) <= LIMIT;
    if (!exact) return encodeFloats(values);
    place = putVarint(bytes, place, delta);
    earlier = whole;
  }
  bytes[0] = 0;
  bytes[1] = decimals;
  bytes[2] = missing > 0 ? 1 : 0;
  return bytes.slice(0, place);
}

function encodeFloats(values: Float64Array): Uint8Array {
  const bytes = new Uint8Array(3 + values.length * 8);
  bytes[0] = 1;
  const view = new DataView(bytes.buffer);
  for (let i = 0; i < values.length; i++) view.setFloat64(3 + i * 8, values[i]!);
  return bytes;
}

export function decodeChannel(blob: Uint8Array, count: number): Float64Array {
  const values = new Float64Array(count);
  if (blob[0] === 1) {
    const view = new DataView(blob.buffer, blob.byteOffset, blob.byteLength);
    for (let i = 0; i < count; i++) values[i] = view.getFloat64(3 + i * 8);
    return values;
  }
  const scale = 10 ** blob[1]!;
  const hasMissing = blob[2] === 1;
  const varints = new VarintReader(blob, hasMissing ? 3 + ((count + 7) >> 3) : 3);
  let whole = 0;
  for (let i = 0; i < count; i++) {
    if (hasMissing && (blob[3 + (i >> 3)]! & (1 << (i & 7))) !== 0) {
      values[i] = Number.NaN;
      continue;
    }
    whole += varints.next();
    values[i] = whole / scale;
  }
  return values;
}

/** Least, greatest, total and number of the values that are not missing. */
export function summarise(values: Float64Array): {
  valid: number;
  least: number | null;
  greatest: number | null;
  total: number;
} {
  let valid = 0;
  let least = Number.POSITIVE_INFINITY;
  let greatest = Number.NEGATIVE_INFINITY;
  let total = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    valid++;
    total += value;
    if (value < least) least = value;
    if (value > greatest) greatest = value;
  }
  return valid > 0 ? { valid, least, greatest, total } : { valid, least: null, greatest: null, total };
}
