/*
 * The line that names the columns and the one that names their units, among the lines above the first record.
 */
import { parseUnit } from '../units/units';
import { looksLikeStamp } from './cells';
import { headingWords } from './channel-words';
import type { ColumnProfile } from './column-profiles';
import { headingUnits } from './heading-units';
import { looksLikeNumber } from './numbers';
import type { Delimiter, TextRow } from './rows';

export interface Header {
  line: number;
  /** One per column, as written. */
  labels: string[];
  unitsLine: number | null;
  /** One per column, as written; blank where there is no units row. */
  units: string[];
  /** Lines above the header, for what they tell of zone and start. */
  preamble: string[];
}

const LINES_ABOVE = 10;
const timeWord = /date|time|stamp|fecha|hora|heure|datum|zeit|data\b|elapsed|seconds|^t$|epoch|tiempo|temps|tempo/i;

export function findHeader(
  above: readonly TextRow[],
  profiles: readonly ColumnProfile[],
  width: number,
  delimiter: Delimiter,
  text: string,
): Header | null {
  const lines = delimiter === ' ' ? text.split(/\r\n?|\n/) : [];
  const candidates = above
    .filter((row) => row.fields.some((field) => field.trim() !== ''))
    .slice(-LINES_ABOVE)
    .flatMap((row) => {
      const cells = fitted(row, lines[row.line - 1] ?? '', profiles, width, delimiter);
      return cells === null ? [] : [{ line: row.line, cells }];
    });
  let best: { line: number; cells: string[]; score: number } | null = null;
  for (const [i, { line, cells }] of candidates.entries()) {
    const score = headerScore(cells, profiles) + i * 0.01;
    if (score > 0 && (best === null || score > best.score)) best = { line, cells, score };
  }
  if (best === null) return null;
  const { line, cells: labels } = best;
  const units = candidates.find((row) => row.line > line && unitShare(row.cells) >= 0.5);
  return {
    line,
    labels,
    unitsLine: units?.line ?? null,
    units: units?.cells ?? labels.map(() => ''),
    preamble: above.filter((row) => row.line < line).map((row) => row.fields.join(delimiter)),
  };
}

/** The cells of a line laid over the columns, or null where they do not fit. */
function fitted(
  row: TextRow,
  rawLine: string,
  profiles: readonly ColumnProfile[],
  width: number,
  delimiter: Delimiter,
): string[] | null {
  const clean = (cells: readonly string[]) => {
    const bare = cells.map((cell) => cell.trim().replace(/\s+/g, ' '));
    bare[0] = (bare[0] ?? '').replace(/^(#|\/\/|;)+\s*/, '');
    if (bare[0] === '' && bare.length > width) bare.shift();
    return bare;
  };
  const attempts = [clean(row.fields), clean(joinUnitCells(row.fields))];
  if (delimiter === ' ') attempts.push(clean(rawLine.trim().split(/\s{2,}|\t/)), clean(joinUnits(row.fields)));
  for (const cells of attempts) {
    const laid = laidOver(cells, profiles, width);
    if (laid !== null) return laid;
  }
  return null;
}

function laidOver(cells: string[], profiles: readonly ColumnProfile[], width: number): string[] | null {
  let used = cells.length;
  while (used > 0 && cells[used - 1] === '') used--;
  const date = profiles.findIndex((profile) => profile.kind === 'date');
  const isPair = date >= 0 && profiles[date + 1]?.kind === 'time';
  // "Date/Time" over a date and a time of their own
  if (isPair && used === width - 1) return [...cells.slice(0, date + 1), '', ...cells.slice(date + 1, used)];
  if (used > width || used < Math.max(1, width - 1) || used < width * 0.5) return null;
  return Array.from({ length: width }, (_, i) => cells[i] ?? '');
}

/** Level,m where commas part the fields too: the unit belongs to the heading before it. */
function joinUnitCells(fields: readonly string[]): string[] {
  const joined: string[] = [];
  for (const field of fields) {
    const isUnit = joined.length > 0 && field.trim() !== '' && parseUnit(field.trim()) !== null;
    if (isUnit) joined[joined.length - 1] += `, ${field.trim()}`;
    else joined.push(field);
  }
  return joined;
}

/** "Tank (m)" and "p [bar]" hold together where blanks part the fields. */
function joinUnits(fields: readonly string[]): string[] {
  const joined: string[] = [];
  for (const field of fields) {
    if (joined.length > 0 && /^[([{].*[)\]}]$/.test(field)) joined[joined.length - 1] += ` ${field}`;
    else joined.push(field);
  }
  return joined;
}

function headerScore(cells: readonly string[], profiles: readonly ColumnProfile[]): number {
  const full = cells.filter((cell) => cell !== '');
  const texts = full.filter((cell) => !looksLikeNumber(cell) && looksLikeStamp(cell) === null);
  if (texts.length < Math.max(1, full.length * 0.6)) return 0;
  let known = 0;
  for (const [i, cell] of cells.entries()) {
    if (cell === '') continue;
    const { measured } = headingWords(cell);
    const isTime = timeWord.test(cell);
    if (measured.size > 0 || isTime) known++;
    if (isTime && profiles[i] !== undefined && profiles[i].kind !== 'number' && profiles[i].kind !== 'text') known++;
  }
  const isUnits = unitShare(cells) >= 0.6;
  return texts.length / profiles.length + known - (isUnits ? 1.5 : 0) + (isUnits ? 0 : 0.2);
}

/** Share of the cells that are units and nothing else; time columns do not count. */
function unitShare(cells: readonly string[]): number {
  const full = cells.filter((cell) => cell !== '' && !/^(ts|rn|y{2,4}[-/]|d{1,2}[-/.]|hh|utc|gmt|local)/i.test(cell));
  if (full.length === 0) return 0;
  const units = full.filter(
    (cell) =>
      parseUnit(cell.replace(/^[([{]|[)\]}]$/g, '')) !== null || headingUnits(cell).some((one) => one.words === ''),
  );
  return units.length / full.length;
}
