/*
 * Looks at a file before anything is stored: what it is, how it would be read, and what it cannot tell by itself.
 */
import { UserError } from '../shapes/problem';
import type { FileReading, PreviewRow, ReadingQuestion } from '../shapes/reading';
import { headingWords } from './channel-words';
import { readColumns } from './channels';
import { followedColumns } from './corrected';
import { detectEncoding } from './encoding';
import { HEAD_BYTES, habitsOf, headText } from './habits';
import { refuseUnlessText } from './not-text';
import { previewRows } from './preview';
import { dayOrderQuestion, noChannelQuestion, startQuestion, unitQuestion } from './questions';
import type { RamContext } from './ram-context';
import { refuseUnusable } from './read';
import { changedHeader, fittingReading } from './remembered';
import { splitRows } from './rows';
import { type FileSource, readPart } from './source';
import { findStructure, type Structure, structureUnder } from './structure';
import { findTimeColumns } from './time-columns';
import { dayOrderEvidence, guessTime } from './time-guess';

export type { RamContext } from './ram-context';

export interface Inspection {
  reading: FileReading;
  /** True where the reading accepted for this logger last time fits again. */
  remembered: boolean;
  questions: ReadingQuestion[];
  preview: PreviewRow[];
}

/**
 * Guesses how a file is to be read. Reads its head and its tail, and the whole of it only for the order of day and month.
 * @throws UserError for a file that cannot be read at all: empty, no text, no time, no figures
 */
export async function inspectFile(source: FileSource, ram: RamContext): Promise<Inspection> {
  const { name } = source;
  const encoding = await encodingOf(source);
  const { text } = await headText(source, encoding);
  if (text.replace(/[\s\0\ufeff]+/g, '') === '')
    throw new UserError(`${name} is empty: it holds blanks only.`, 'cannot be read');
  const fresh = findStructure(text, name);
  if (fresh === null) throw noRecords(name, text);
  const fitting = fittingReading(ram.remembered, fresh, text, name);
  const structure = fitting?.structure ?? fresh;
  const { header, profiles, delimiter, decimal, firstRecordLine } = structure;
  const labels = header?.labels ?? [];
  const found =
    fitting === null
      ? findTimeColumns(profiles, labels, ram.now_ms)
      : { ...fitting.reading.time, isMilliseconds: elapsedInMilliseconds(fitting.reading) };
  if (found === null) throw noTime(name, structure);
  if (!profiles.some((profile) => profile.kind === 'number' && !found.columns.includes(profile.index)))
    throw new UserError(
      `${name} has dates but no column of numbers; expected records of pressure, level or beats. Is it the right file?`,
      'cannot be read',
    );
  if (isTall(structure, found.columns)) throw tallLayout(name, structure);
  const { time, kind, step_ms, questions } = await guessTime(
    source,
    ram,
    structure,
    found,
    encoding,
    fitting?.reading.time ?? null,
  );
  const headings =
    header === null ? null : profiles.map((_, i) => ({ label: header.labels[i] ?? '', unit: header.units[i] ?? '' }));
  const read =
    fitting === null
      ? readColumns(profiles, headings, time.columns, found.isMilliseconds ? 'ms' : null, ram.sensors, step_ms)
      : { columns: fitting.reading.columns, questions: [] };
  const changed = fitting === null ? changedHeader(ram.remembered, read.columns, time.columns) : null;
  const reading: FileReading = {
    kind,
    encoding,
    delimiter,
    decimal_mark: fitting?.reading.decimal_mark ?? decimal.mark,
    header_line: header?.line ?? null,
    units_line: header?.unitsLine ?? null,
    first_record_line: firstRecordLine,
    time,
    columns: read.columns,
  };
  const habits = habitsOf(structure.rows, reading);
  return {
    reading,
    remembered: fitting !== null,
    questions: [...questions, ...(changed === null ? [] : [changed]), ...read.questions].sort(
      (a, b) => Number(b.must_answer) - Number(a.must_answer),
    ),
    preview: previewRows(structure.rows, reading, habits, ram, name),
  };
}

/** What a reading that a person has corrected makes of the file, and what is still to be asked. */
export async function inspectWith(source: FileSource, ram: RamContext, corrected: FileReading): Promise<Inspection> {
  refuseUnusable(corrected, source.name);
  await encodingOf(source);
  const { text } = await headText(source, corrected.encoding);
  const structure = structureUnder(text, corrected.delimiter, source.name);
  const rows = structure?.rows ?? splitRows(text, corrected.delimiter, source.name);
  const followed = structure === null ? corrected : followedColumns(corrected, structure, ram);
  const reading = { ...followed, columns: followed.columns.map((column) => ({ ...column })) };
  return {
    reading,
    remembered: false,
    questions: await openQuestions(source, ram, reading, structure),
    preview: previewRows(rows, reading, habitsOf(rows, reading), ram, source.name),
  };
}

async function openQuestions(
  source: FileSource,
  ram: RamContext,
  reading: FileReading,
  structure: Structure | null,
): Promise<ReadingQuestion[]> {
  const { time, columns, encoding } = reading;
  const questions: ReadingQuestion[] = [];
  if (time.form === 'fields' && time.day_order === null && structure !== null) {
    const evidence = await dayOrderEvidence(source, ram, structure, time.columns[0]!, encoding);
    if (evidence.ambiguous !== null) questions.push(dayOrderQuestion(evidence.ambiguous));
  }
  if (time.form === 'seconds from start' && time.start_at === null)
    questions.push(startQuestion([], '', structure?.records[0]?.fields[time.columns[0]!] ?? ''));
  if (columns.every((column) => column.channel === null))
    questions.push(noChannelQuestion(columns, time.columns, ram.sensors));
  for (const column of columns) {
    const profile = structure?.profiles[column.index];
    if (column.channel === null || profile === undefined) continue;
    const sensor = ram.sensors.find((one) => one.channel === column.channel);
    const question = unitQuestion(column, profile, column.unit !== null || sensor?.unit !== undefined);
    if (question !== null) questions.push(question);
  }
  return questions;
}

/** The encoding, told from head and tail: the first degree sign of a file may stand in its last line. Refuses what is no text. */
async function encodingOf(source: FileSource): Promise<FileReading['encoding']> {
  const head = await readPart(source, HEAD_BYTES, 'head');
  const encoding = detectEncoding(head.bytes);
  refuseUnlessText(head.bytes, source.name, encoding.startsWith('utf-16'));
  if (encoding !== 'utf-8' || head.complete || head.bytes.some((byte) => byte > 0x7f)) return encoding;
  const tail = await readPart(source, HEAD_BYTES / 4, 'tail');
  // the tail may begin within a character
  const from = tail.bytes.findIndex((byte) => byte < 0x80);
  return detectEncoding(tail.bytes.subarray(Math.max(0, from))) === 'windows-1252' ? 'windows-1252' : 'utf-8';
}

const elapsedInMilliseconds = ({ columns, time }: FileReading): boolean =>
  columns.find((column) => column.index === time.columns[0])?.unit === 'ms';

/** One value a line, its channel named beside it: the columns alone do not tell which value is which. */
function isTall({ profiles, records, header }: Structure, timeColumns: readonly number[]): boolean {
  const own = profiles.filter((profile) => !timeColumns.includes(profile.index));
  const [value, ...more] = own.filter((profile) => profile.kind === 'number');
  if (value === undefined || more.length > 0) return false;
  // beside a column that says what it holds, repeated words are a state of the logger
  if (headingWords(header?.labels[value.index] ?? '').measured.size > 0) return false;
  return own.some(({ kind, texts }) => {
    const names = new Set(texts);
    return kind === 'text' && texts.length === records.length && names.size > 1 && texts.length >= 4 * names.size;
  });
}

const tallLayout = (name: string, { firstRecordLine, records, delimiter }: Structure): UserError =>
  new UserError(
    `${name} holds one value a line with its name beside it (line ${firstRecordLine}: "${records[0]!.fields.join(delimiter).slice(0, 80)}"). Such files are not read; export the readings with one column for each sensor.`,
    'cannot be read',
  );

function noRecords(name: string, text: string): UserError {
  const first = text.split(/[\r\n]+/).find((line) => line.trim() !== '') ?? '';
  const shown = first.trim().slice(0, 80);
  return new UserError(
    `${name} holds no records: no line has a date or time beside numbers. It begins with "${shown}"; expected lines such as "2026-03-01 10:30,277.5,1.82". Is it the right file?`,
    'cannot be read',
  );
}

function noTime(name: string, { header, profiles, firstRecordLine, records }: Structure): UserError {
  const columns = profiles.map((profile, i) => header?.labels[i] || `column ${profile.index + 1}`).join(', ');
  const sample = records[0]?.fields.join(' ').trim().slice(0, 80) ?? '';
  return new UserError(
    `${name} has no time column. Its columns are ${columns}; line ${firstRecordLine} reads "${sample}". Expected dates and times such as 2026-03-01 10:30, epoch seconds, or seconds from the start of a burst. Save the file again with its time.`,
    'cannot be read',
  );
}
