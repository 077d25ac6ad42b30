import type { FileReading } from '../shapes/reading';
import type { DayOrderEvidence } from './day-order';
import { TextStream } from './encoding';
import type { FileSource } from './source';

/** Runs through a whole file for its dates alone, until the order of day and month is told. */
export async function wholeFileDates(
  source: FileSource,
  reading: Pick<FileReading, 'encoding' | 'delimiter' | 'first_record_line'>,
  column: number,
  evidence: DayOrderEvidence,
): Promise<void> {
  const decoder = new TextStream(reading.encoding);
  let rest = '';
  let line = 0;
  for await (const chunk of source.open()) {
    const lines = (rest + decoder.write(chunk)).split(/\r\n?|\n/);
    rest = lines.pop()!.slice(-100_000);
    for (const text of lines)
      if (++line >= reading.first_record_line) evidence.add(fieldAt(text, reading.delimiter, column));
    if (evidence.order() !== null) return;
  }
  evidence.add(fieldAt(rest, reading.delimiter, column));
}

/** One field of a line, without regard to delimiters in quotes: a date holds none. */
function fieldAt(line: string, delimiter: string, column: number): string {
  if (delimiter === ' ') return line.trim().split(/[ \t]+/, column + 1)[column] ?? '';
  let from = 0;
  for (let c = 0; c < column; c++) {
    const next = line.indexOf(delimiter, from);
    if (next < 0) return '';
    from = next + 1;
  }
  const to = line.indexOf(delimiter, from);
  return line
    .slice(from, to < 0 ? undefined : to)
    .replaceAll('"', '')
    .trim();
}
