/*
 * How a file's stamps are to be read: order of the date, zone, which end of the interval they mark, where a burst began.
 */
import type { FileReading, ReadingQuestion, TimeReading } from '../shapes/reading';
import { type BurstStart, burstStart } from './burst-start';
import { medianOf } from './column-profiles';
import { DayOrderEvidence } from './day-order';
import { readNumber } from './numbers';
import { dayOrderQuestion, startQuestion, zoneQuestion } from './questions';
import type { RamContext } from './ram-context';
import type { FileSource } from './source';
import { type DayOrder, readStamp, timeOf } from './stamps';
import type { Structure } from './structure';
import { marksStart, type TimeColumns } from './time-columns';
import { wholeFileDates } from './whole-file-dates';
import { zoneOfHeading, zoneOfPreamble } from './zone-words';

const LOOKED_AT = 1000;
/** Five samples a second and more make a burst. */
const BURST_STEP_MS = 200.5;
const FEWEST_OF_A_BURST = 8;

export interface TimeGuess {
  time: TimeReading;
  kind: FileReading['kind'];
  step_ms: number;
  questions: ReadingQuestion[];
}

export async function guessTime(
  source: FileSource,
  ram: RamContext,
  structure: Structure,
  found: TimeColumns,
  encoding: FileReading['encoding'],
  remembered: TimeReading | null,
): Promise<TimeGuess> {
  const { columns, form } = found;
  const labels = columns.map((index) => structure.header?.labels[index] ?? '');
  const questions: ReadingQuestion[] = [];
  let day_order: DayOrder = null;
  if (form === 'fields') {
    const evidence = await dayOrderEvidence(source, ram, structure, columns[0]!, encoding);
    const told = evidence.order();
    const earlier = remembered?.day_order ?? orderOfEarlierFiles(ram, labels[0]!);
    // an order accepted before counts only where this file's dates can be read in it
    const possible = evidence.ambiguous === null || evidence.ambiguous.readings.some(({ order }) => order === earlier);
    day_order = told ?? (possible ? earlier : null);
    if (day_order === null && evidence.ambiguous !== null) questions.push(dayOrderQuestion(evidence.ambiguous));
  }
  const zone = remembered?.zone ?? zoneOf(structure, found, day_order, ram, questions);
  const start = form === 'seconds from start' ? startOf(structure, columns[0]!, zone, ram) : null;
  if (form === 'seconds from start' && start?.instants.length !== 1)
    questions.push(
      startQuestion(start?.instants ?? [], start?.text ?? '', structure.records[0]?.fields[columns[0]!] ?? ''),
    );
  const step_ms = stepOf(structure, found, day_order);
  const time: TimeReading = {
    columns,
    form,
    day_order,
    zone,
    stamp_marks:
      remembered?.stamp_marks ?? (form !== 'seconds from start' && labels.some(marksStart) ? 'start' : 'end'),
    start_at: start?.instants.length === 1 ? new Date(start.instants[0]!).toISOString() : null,
  };
  const isBurst = step_ms < BURST_STEP_MS && structure.records.length >= FEWEST_OF_A_BURST;
  return { time, kind: isBurst ? 'burst' : 'log', step_ms, questions };
}

/** Evidence of the head, and of the whole file where the head does not tell. */
export async function dayOrderEvidence(
  source: FileSource,
  ram: RamContext,
  { records, delimiter, firstRecordLine }: Pick<Structure, 'records' | 'delimiter' | 'firstRecordLine'>,
  column: number,
  encoding: FileReading['encoding'],
): Promise<DayOrderEvidence> {
  const head = new DayOrderEvidence(ram.now_ms);
  for (const row of records) head.add((row.fields[column] ?? '').trim().replaceAll('"', ''));
  if (head.order() !== null || head.ambiguous === null) return head;
  const whole = new DayOrderEvidence(ram.now_ms);
  await wholeFileDates(source, { encoding, delimiter, first_record_line: firstRecordLine }, column, whole);
  return whole;
}

/** The order accepted for another file of this ram whose time column had the same heading. */
function orderOfEarlierFiles(ram: RamContext, label: string): DayOrder {
  for (const { time, columns } of ram.remembered) {
    const earlier = columns.find((column) => column.index === time.columns[0])?.label ?? '';
    if (time.form === 'fields' && time.day_order !== null && earlier.toLowerCase() === label.toLowerCase())
      return time.day_order;
  }
  return null;
}

function zoneOf(
  structure: Structure,
  { columns, form }: TimeColumns,
  order: DayOrder,
  ram: RamContext,
  questions: ReadingQuestion[],
): string {
  if (form.startsWith('epoch')) return 'utc';
  const { header, records } = structure;
  const headings = columns.map((index) => `${header?.labels[index] ?? ''} ${header?.units[index] ?? ''}`).join(' ');
  if (form === 'fields') {
    const [date, time] = columns.map((index) => records[0]?.fields[index]?.trim().replaceAll('"', '') ?? '') as [
      string,
      string?,
    ];
    const read = readStamp(date, time ?? null, order ?? 'day first');
    // stamps that state their offset are read by it, whatever the zone
    if (!('why' in read) && read.offset_min !== null) return zoneOfHeading(`UTC${signed(read.offset_min)}`) ?? 'utc';
  }
  const stated = zoneOfHeading(headings);
  if (stated !== null) return stated;
  const { zone, unknown } = zoneOfPreamble(preambleOf(structure));
  if (unknown !== null) questions.push(zoneQuestion(unknown, ram.time_zone));
  return zone ?? 'ram';
}

const signed = (minutes: number): string => {
  const size = Math.abs(minutes);
  return `${minutes < 0 ? '-' : '+'}${Math.floor(size / 60)}:${String(size % 60).padStart(2, '0')}`;
};

const preambleOf = ({ header, rows, firstRecordLine, delimiter }: Structure): string[] =>
  rows
    .filter((row) => row.line < (header?.line ?? firstRecordLine))
    .map((row) => row.fields.join(delimiter === ' ' ? ' ' : delimiter));

function startOf(structure: Structure, column: number, zone: string, ram: RamContext): BurstStart | null {
  const first = structure.records[0]?.fields[column]?.trim() ?? '';
  const clock = first.includes(':') ? timeOf(first) : null;
  // a time of day that begins well after midnight is no time elapsed
  const isTimeOfDay = clock !== null && !('why' in clock) && clock.ms > 60_000;
  return burstStart(preambleOf(structure), zone === 'ram' ? ram.time_zone : zone, isTimeOfDay);
}

/** Usual time between records; where several share a stamp, their mean distance. */
function stepOf(
  { records, decimal }: Structure,
  { columns, form, isMilliseconds }: TimeColumns,
  order: DayOrder,
): number {
  const scale = {
    'epoch seconds': 1000,
    'epoch milliseconds': 1,
    'spreadsheet days': 86_400_000,
    'seconds from start': isMilliseconds ? 1 : 1000,
    fields: 0,
  };
  const times = records.slice(0, LOOKED_AT).flatMap(({ fields }) => {
    const [first, second] = columns.map((index) => (fields[index] ?? '').trim().replaceAll('"', '')) as [
      string,
      string?,
    ];
    if (form === 'fields') {
      const read = readStamp(first, second ?? null, order ?? 'day first');
      return 'why' in read ? [] : [read.local_ms];
    }
    const number = readNumber(first, decimal.mark, false) ?? readNumber(first, '.', false);
    if (number !== null) return [number.value * scale[form]];
    const clock = timeOf(first);
    return 'why' in clock ? [] : [clock.ms];
  });
  const steps = times.slice(1).map((time, i) => Math.abs(time - times[i]!));
  const equal = steps.filter((step) => step === 0).length;
  if (equal > steps.length / 2)
    return Math.abs(times.at(-1)! - times[0]!) / Math.max(1, times.length - 1) || 1000 / times.length;
  return medianOf(steps.filter((step) => step > 0));
}
