/*
 * Numbers as loggers write them, by a white list of forms: the language's own conversions take "1,5" as 1, "" as 0 and "0x10" as 16.
 */
import { parseUnit, type UnitName } from '../units/units';

export type DecimalMark = '.' | ',';

export interface WrittenNumber {
  value: number;
  decimals: number;
}

const plain = {
  '.': /^[+-]?(?:\d+(?:\.(\d*))?|\.(\d+))(?:[eE]([+-]?\d{1,3}))?$/,
  ',': /^[+-]?(?:\d+(?:,(\d*))?|,(\d+))(?:[eE]([+-]?\d{1,3}))?$/,
};
/** Groups of three whose mark cannot be taken for the decimal mark: blanks, apostrophes, or two groups and more. */
const sureGroups = {
  '.': /^[+-]?\d{1,3}(?:(?:[ '’\u00a0\u202f]\d{3})+|(?:,\d{3}){2,})(?:\.(\d+))?$/,
  ',': /^[+-]?\d{1,3}(?:(?:[ '’\u00a0\u202f]\d{3})+|(?:\.\d{3}){2,})(?:,(\d+))?$/,
};
const oneGroup = { '.': /^[+-]?\d{1,3},\d{3}(?:\.(\d+))?$/, ',': /^[+-]?\d{1,3}\.\d{3}(?:,(\d+))?$/ };
const both = { '.': /,\d{3}\.\d/, ',': /\.\d{3},\d/ };

/**
 * A number, or null where the text is none in this decimal mark.
 * @param grouped whether the column as a whole shows that the other mark groups thousands, so that 1,234 is not 1.234
 */
export function readNumber(text: string, mark: DecimalMark, grouped: boolean): WrittenNumber | null {
  const simple = simpleNumber(text, mark);
  if (simple !== null) return simple;
  const found = plain[mark].exec(text);
  if (found) {
    const exponent = Number(found[3] ?? 0);
    const decimals = Math.max(0, (found[1] ?? found[2] ?? '').length - exponent);
    return { value: Number(mark === ',' ? text.replace(',', '.') : text), decimals };
  }
  const groups = sureGroups[mark].exec(text) ?? (grouped || both[mark].test(text) ? oneGroup[mark].exec(text) : null);
  if (!groups) return null;
  const digits = text.replace(mark === '.' ? /[, '’\u00a0\u202f]/g : /[. '’\u00a0\u202f]/g, '');
  return { value: Number(digits.replace(',', '.')), decimals: (groups[1] ?? '').length };
}

/** Fifteen digits are exact in a double, and so is the rounding of their quotient by a power of ten. */
export const MOST_EXACT_DIGITS = 15;
export const powersOfTen = Float64Array.from({ length: MOST_EXACT_DIGITS + 1 }, (_, i) => 10 ** i);

/** A number of nothing but a sign, digits and one mark between digits; null for anything else. Most cells end here. */
function simpleNumber(text: string, mark: DecimalMark): WrittenNumber | null {
  const markCode = mark.charCodeAt(0);
  const sign = text.charCodeAt(0);
  const from = sign === 45 || sign === 43 ? 1 : 0;
  const last = text.length - 1;
  if (last < from || last - from > MOST_EXACT_DIGITS - 1) return null;
  let digits = 0;
  let decimals = 0;
  for (let i = from; i <= last; i++) {
    const code = text.charCodeAt(i);
    if (code >= 48 && code <= 57) digits = digits * 10 + (code - 48);
    else if (code === markCode && decimals === 0 && i > from && i < last) decimals = last - i;
    else return null;
  }
  const size = digits / powersOfTen[decimals]!;
  return { value: sign === 45 ? -size : size, decimals };
}

const anyNumber =
  /^[+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+|\d{1,3}(?:[ '’\u00a0\u202f.]\d{3})+(?:,\d+)?|\d{1,3}(?:[ '’\u00a0\u202f,]\d{3})+(?:\.\d+)?)(?:[eE][+-]?\d{1,3})?$/;

/** Whether a text is a number in one decimal mark or the other. */
export const looksLikeNumber = (text: string): boolean => anyNumber.test(text);

/** A number with its unit in the same cell, such as "3.80 m". */
export function splitUnit(text: string): { number: string; unit: UnitName } | null {
  const found = /^([+-]?[\d.,]*\d)\s*([^\d\s.,+-].*)$/.exec(text);
  if (!found) return null;
  const unit = parseUnit(found[2]!);
  return unit === null ? null : { number: found[1]!, unit };
}

/** What one cell of a column tells about the decimal mark: a mark that must be the decimal one, one that may be, or nothing. */
export function decimalEvidence(text: string): { mark: DecimalMark; sure: boolean } | null {
  const marks = text.replace(/[^.,]/g, '');
  if (marks === '') return null;
  const last = marks.at(-1) as DecimalMark;
  if (marks.includes('.') && marks.includes(',')) return { mark: last, sure: true };
  // two and more of one mark group thousands, so the other is the decimal mark
  if (marks.length > 1) return { mark: last === '.' ? ',' : '.', sure: true };
  const [before, after] = text.replace(/^[+-]/, '').split(last) as [string, string];
  const couldGroup = /^[1-9]\d{0,2}$/.test(before) && /^\d{3}$/.test(after);
  return { mark: last, sure: !couldGroup };
}
