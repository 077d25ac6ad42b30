/*
 * The delimiter and the decimal mark, from the rows themselves: the delimiter under which most rows become a stamp and numbers.
 */
import type { FileReading } from '../shapes/reading';
import { looksLikeStamp } from './cells';
import { meansMissing } from './missing';
import { type DecimalMark, decimalEvidence, looksLikeNumber, splitUnit } from './numbers';
import { type Delimiter, splitRows, type TextRow } from './rows';

/** In the order in which ties are settled: runs of blanks also stand around the other delimiters. */
const delimiters: Delimiter[] = ['\t', ';', '|', ',', ' '];
const SAMPLE_LINES = 400;

export interface Dialect {
  delimiter: Delimiter;
  rows: TextRow[];
}

/** The dialect of a head of text, or null where no delimiter makes records of its lines. */
export function guessDialect(text: string, fileName: string): Dialect | null {
  const sample = lastLines(text, SAMPLE_LINES);
  const stated = /^\ufeff?"?sep=([,;\t|])"?\s*$/im.exec(text.slice(0, 20))?.[1] as Delimiter | undefined;
  let best: { delimiter: Delimiter; score: number } | null = null;
  for (const delimiter of stated === undefined ? delimiters : [stated]) {
    const score = recordScore(splitRows(sample, delimiter, fileName));
    if (score > 0 && (best === null || score > best.score * 1.02)) best = { delimiter, score };
  }
  return best === null ? null : { delimiter: best.delimiter, rows: splitRows(text, best.delimiter, fileName) };
}

function lastLines(text: string, lines: number): string {
  const all = text.split(/\r\n?|\n/);
  return all.slice(Math.max(0, all.length - lines)).join('\n');
}

/** Cells of the rows that look like records: a stamp beside a number, or nothing but numbers. Rows of the usual width only. */
function recordScore(rows: readonly TextRow[]): number {
  const scores = new Map<number, number>();
  for (const { fields } of rows) {
    const cells = fields.map((field) => field.trim());
    if (cells.length < 2) continue;
    let stamps = 0;
    let numbers = 0;
    let blanks = 0;
    for (const cell of cells) {
      if (looksLikeNumber(cell)) numbers++;
      else if (meansMissing(cell)) blanks++;
      else if (looksLikeStamp(cell) !== null) stamps++;
      else if (splitUnit(cell) !== null) numbers++;
    }
    const isRecord = numbers > 0 ? stamps > 0 || (numbers >= 2 && numbers + blanks === cells.length) : false;
    // a stamp found weighs more than cells: 10:00:00 apart from its date is worth less than both together
    if (isRecord) scores.set(cells.length, (scores.get(cells.length) ?? 0) + 1 + (stamps > 0 ? 1 : 0) + numbers * 0.01);
  }
  return Math.max(0, ...scores.values());
}

/** The decimal mark of the file, and whether anything in it decides. The comma may be it beside commas as delimiters only in quotes. */
export function guessDecimalMark(
  rows: readonly TextRow[],
  columns: readonly number[],
  delimiter: FileReading['delimiter'],
): { mark: DecimalMark; isSure: boolean } {
  const sure = { '.': 0, ',': 0 };
  const possible = { '.': 0, ',': 0 };
  const unmarkedLong = new Set<number>();
  for (const index of columns) {
    for (const { fields } of rows) {
      const cell = (fields[index] ?? '').trim();
      const text = looksLikeNumber(cell) ? cell : (splitUnit(cell)?.number ?? '');
      if (text === '') continue;
      const evidence = decimalEvidence(text);
      if (evidence === null) {
        if (/\d{4}/.test(text)) unmarkedLong.add(index);
      } else if (evidence.sure) sure[evidence.mark]++;
      else possible[evidence.mark]++;
    }
  }
  if (sure['.'] + sure[','] > 0) return { mark: sure[','] > sure['.'] ? ',' : '.', isSure: true };
  // only 1,234 and its like: three decimals where semicolons part the fields, thousands where commas do
  if (possible[','] > 0 && possible['.'] === 0)
    return { mark: delimiter === ',' ? '.' : ',', isSure: unmarkedLong.size > 0 };
  return { mark: '.', isSure: false };
}
