/*
 * Keeps one quote that is opened and never closed from swallowing the rest of a file. Records of loggers do not run over many
 * lines: where a quoted field does, its opening line is taken to hold ordinary characters instead.
 */
import { UserError } from '../shapes/problem';

/** Stands for a quote that is an ordinary character, until the fields are taken apart. Of the private use area of Unicode. */
const ORDINARY = '\ue000';
const MOST_LINES = 12;
/** No record is longer; a file without line ends is no log. */
export const LONGEST_LINE = 1 << 20;

export const restoreQuotes = (field: string): string =>
  field.includes(ORDINARY) ? field.replaceAll(ORDINARY, '"') : field;

/** Whether a quoted field is still open at the end of a line, by the rules of RFC 4180 as papaparse reads them. */
export function isOpenAfter(line: string, delimiter: string, openBefore: boolean): boolean {
  let open = openBefore;
  let place = 0;
  for (;;) {
    if (!open) {
      // a quote opens only at the start of a field
      while (line[place] !== '"') {
        const next = line.indexOf(delimiter, place);
        if (next < 0) return false;
        place = next + delimiter.length;
      }
      place++;
      open = true;
    }
    const quote = line.indexOf('"', place);
    if (quote < 0) return true;
    if (line[quote + 1] === '"') {
      place = quote + 2;
      continue;
    }
    let after = quote + 1;
    while (line[after] === ' ' && delimiter !== ' ') after++;
    if (after >= line.length) return false;
    if (line.startsWith(delimiter, after)) {
      open = false;
      place = after + delimiter.length;
    } else place = quote + 1;
  }
}

/** Takes text piece by piece and gives whole rows back, with line ends as \n and quotes that are never closed as ordinary characters. */
export class QuoteMender {
  /** True once any quote has been met; until then no field holds a line end. */
  hasQuotes = false;
  /** True, at the end, where the last line has no line end. */
  unterminated = false;
  /** What stands after the last line end. */
  private rest = '';
  private held: string[] = [];
  private pendingReturn = false;

  constructor(
    private readonly delimiter: string,
    private readonly fileName: string,
    /** Lines at the start that are dropped whatever they hold. */
    private skip = 0,
  ) {}

  push(piece: string): string {
    let text = this.pendingReturn ? `\r${piece}` : piece;
    this.pendingReturn = text.endsWith('\r');
    if (this.pendingReturn) text = text.slice(0, -1);
    if (text.includes('\r')) text = text.replace(/\r\n?/g, '\n');
    const end = text.lastIndexOf('\n') + 1;
    if (end === 0) {
      this.rest += text;
      if (this.rest.length > LONGEST_LINE) throw tooLong(this.fileName);
      return '';
    }
    const whole = this.rest + text.slice(0, end);
    this.rest = text.slice(end);
    return this.mend(this.skip > 0 ? this.skipped(whole) : whole);
  }

  /** What is still held at the end of the file, its last line given a line end. */
  end(): string {
    const last = this.pendingReturn ? this.push('\n') : '';
    this.unterminated = this.rest !== '' && this.skip === 0;
    return last + (this.unterminated ? this.mend(`${this.rest}\n`) : '') + this.release(true);
  }

  private skipped(whole: string): string {
    let from = 0;
    while (this.skip > 0 && from < whole.length) {
      from = whole.indexOf('\n', from) + 1;
      this.skip--;
    }
    return whole.slice(from);
  }

  private mend(whole: string): string {
    if (whole === '' || (this.held.length === 0 && !whole.includes('"'))) return whole;
    this.hasQuotes = true;
    const lines = whole.slice(0, -1).split('\n');
    const out: string[] = [];
    for (const line of lines) {
      if (this.held.length === 0 && !(line.includes('"') && isOpenAfter(line, this.delimiter, false)))
        out.push(line, '\n');
      else {
        this.held.push(line);
        if (this.held.length > MOST_LINES || (this.held.length > 1 && !isOpenAfter(line, this.delimiter, true)))
          out.push(this.release(false));
      }
    }
    return out.join('');
  }

  /** Gives the held lines back: as one row where its quote has closed, else with the opening line's quotes made ordinary. */
  private release(isEnd: boolean): string {
    const lines = this.held;
    this.held = [];
    const out: string[] = [];
    while (lines.length > 0) {
      const span = rowSpan(lines, this.delimiter);
      if (span > 0) {
        out.push(...lines.splice(0, span).flatMap((line) => [line, '\n']));
        continue;
      }
      // an open row may still close in what is to come
      if (!isEnd && out.length > 0) break;
      out.push(lines.shift()!.replaceAll('"', ORDINARY), '\n');
    }
    this.held = lines;
    return out.join('');
  }
}

/** How many of the lines make the first row, or 0 where its quote stays open through all of them. */
function rowSpan(lines: readonly string[], delimiter: string): number {
  let open = false;
  for (let i = 0; i < lines.length; i++) {
    open = isOpenAfter(lines[i]!, delimiter, open);
    if (!open) return i + 1;
  }
  return 0;
}

export const tooLong = (fileName: string): UserError =>
  new UserError(
    `${fileName} has a line of more than a million characters; expected one record a line. Is it the text of a logger? Nothing was read.`,
    'cannot be read',
  );
