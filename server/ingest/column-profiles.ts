/*
 * What each column of the head holds, before anyone asks what it means.
 */
import { looksLikeStamp } from './cells';
import { meansMissing } from './missing';
import { type DecimalMark, looksLikeNumber, readNumber, splitUnit } from './numbers';
import type { TextRow } from './rows';

export interface ColumnProfile {
  index: number;
  kind: 'stamp' | 'date' | 'time' | 'number' | 'text' | 'blank';
  /** The numbers met, in order. */
  numbers: number[];
  texts: string[];
  isInteger: boolean;
  /** Share of the cells that are missing. */
  missing: number;
  /** A unit written in the cells themselves, as in 3.80 m. */
  cellUnit: string | null;
}

/** Profiles of the columns over rows of records. */
export function profileColumns(rows: readonly TextRow[], width: number, mark: DecimalMark): ColumnProfile[] {
  return Array.from({ length: width }, (_, index) => profile(rows, index, mark));
}

function profile(rows: readonly TextRow[], index: number, mark: DecimalMark): ColumnProfile {
  const counts = { stamp: 0, date: 0, time: 0, number: 0, text: 0, blank: 0 };
  const numbers: number[] = [];
  const texts: string[] = [];
  let isInteger = true;
  let cellUnit: string | null = null;
  for (const { fields } of rows) {
    const text = (fields[index] ?? '').trim().replace(/^"(.*)"$/, '$1');
    if (meansMissing(text)) {
      counts.blank++;
      continue;
    }
    texts.push(text);
    const stamp = looksLikeNumber(text) ? null : looksLikeStamp(text);
    const split = stamp === null && !looksLikeNumber(text) ? splitUnit(text) : null;
    if (split !== null) cellUnit = split.unit;
    const written = split?.number ?? text;
    if (looksLikeNumber(written)) {
      counts.number++;
      const number = readNumber(written, mark, true);
      if (number !== null) {
        numbers.push(number.value);
        if (number.decimals > 0) isInteger = false;
      }
    } else counts[stamp ?? 'text']++;
  }
  const seen = rows.length - counts.blank;
  const kinds = ['stamp', 'date', 'time', 'number', 'text'] as const;
  const kind = seen === 0 ? 'blank' : kinds.reduce((best, next) => (counts[next] > counts[best] ? next : best));
  return {
    index,
    kind,
    numbers,
    texts,
    isInteger,
    missing: rows.length === 0 ? 0 : counts.blank / rows.length,
    cellUnit,
  };
}

/** Whether numbers never fall but at a roll-over or reset now and then, and rise on the whole. */
export function neverFalls(numbers: readonly number[]): boolean {
  let falls = 0;
  let rises = 0;
  for (let i = 1; i < numbers.length; i++) {
    if (numbers[i]! < numbers[i - 1]!) falls++;
    else if (numbers[i]! > numbers[i - 1]!) rises++;
  }
  return rises > 0 && falls <= Math.max(numbers.length > 12 ? 1 : 0, numbers.length / 60);
}

/** Whether numbers count the rows: each one more than the last. */
export function countsRows(numbers: readonly number[]): boolean {
  if (numbers.length < 3) return false;
  let ones = 0;
  for (let i = 1; i < numbers.length; i++) if (numbers[i]! - numbers[i - 1]! === 1) ones++;
  return ones >= 0.98 * (numbers.length - 1);
}

export function medianOf(numbers: readonly number[]): number {
  if (numbers.length === 0) return Number.NaN;
  const sorted = [...numbers].sort((a, b) => a - b);
  return sorted[sorted.length >> 1]!;
}
