/*
 * The meaning of all columns together: each channel at most once, the better column winning, and what remains in doubt asked.
 */
import { type ChannelName, channelWords } from '../shapes/channel';
import type { Sensor } from '../shapes/installation';
import type { ColumnReading, ReadingQuestion } from '../shapes/reading';
import { parseUnit, type UnitName } from '../units/units';
import { type Guess, guessColumn } from './channel-guess';
import { type ColumnProfile, countsRows } from './column-profiles';
import { headingUnits } from './heading-units';
import { channelQuestion, nameOf, noChannelQuestion, unitQuestion } from './questions';

/** Points that a column needs to be read as a channel, and by which the best guess must lead. */
const LEAST = 3;
const LEAD = 0.5;

export interface ColumnHeadings {
  label: string;
  /** Unit of the units row, as written. */
  unit: string;
}

export interface ReadColumns {
  columns: ColumnReading[];
  questions: ReadingQuestion[];
}

export function readColumns(
  profiles: readonly ColumnProfile[],
  headings: readonly ColumnHeadings[] | null,
  timeColumns: readonly number[],
  elapsedUnit: 'ms' | null,
  sensors: readonly Sensor[],
  step_ms: number,
): ReadColumns {
  const columns: ColumnReading[] = profiles.map(({ index }) => ({
    index,
    label: headings?.[index]?.label ?? '',
    channel: null,
    unit: index === timeColumns[0] ? elapsedUnit : null,
  }));
  const own = profiles.filter((profile) => !timeColumns.includes(profile.index));
  const stated = (index: number): UnitName | null => parseUnit((headings?.[index]?.unit ?? '').trim() || '?');
  const guesses = new Map(
    headings === null
      ? []
      : own.map((profile) => [
          profile.index,
          guessColumn(headings[profile.index]!.label, stated(profile.index), profile, sensors, step_ms),
        ]),
  );
  const questions = assign(columns, guesses, sensors);
  for (const profile of own) {
    const column = columns[profile.index]!;
    if (column.channel === null) {
      const unit = stated(profile.index) ?? headingUnits(column.label).find((one) => one.isMarked)?.unit ?? null;
      column.unit = unit ?? profile.cellUnit;
      if (matters(profile, column.label) && !questions.some((question) => question.column === profile.index))
        questions.push(channelQuestion(column, column.unit, sensors));
      continue;
    }
    questions.push(...settleUnit(column, profile, sensors));
  }
  if (columns.every((column) => column.channel === null)) {
    const [only, ...others] = questions;
    if (only !== undefined && others.length === 0) only.must_answer = true;
    else questions.unshift(noChannelQuestion(columns, timeColumns, sensors));
  }
  return { columns, questions };
}

/** The column's unit where the file states none: its sensor's, else asked. */
function settleUnit(column: ColumnReading, profile: ColumnProfile, sensors: readonly Sensor[]): ReadingQuestion[] {
  const sensor = sensors.find((one) => one.channel === column.channel);
  const isStated = column.unit !== null;
  column.unit ??= sensor?.unit === undefined ? null : parseUnit(sensor.unit);
  const question = unitQuestion(column, profile, isStated || column.unit !== null);
  return question === null ? [] : [question];
}

/** A column of figures that is no record number may matter to a person. */
const matters = (profile: ColumnProfile, label: string): boolean =>
  profile.kind === 'number' &&
  !countsRows(profile.numbers) &&
  !/\b(record|rec|no|nr|id|index|status|flag|alarm|error|code|signal|rssi|min|max|std|humidity|memory)\b/i.test(
    label.replace(/_/g, ' '),
  );

function assign(
  columns: ColumnReading[],
  guesses: Map<number, Guess[]>,
  sensors: readonly Sensor[],
): ReadingQuestion[] {
  const questions: ReadingQuestion[] = [];
  const waiting = new Map<number, Guess[]>();
  for (const [index, all] of guesses) {
    const [best, second] = all;
    if (best === undefined || best.score < LEAST) continue;
    if (second !== undefined && best.score - second.score < LEAD && best.channel !== second.channel)
      questions.push(channelQuestion(columns[index]!, best.unit, sensors, [best.channel, second.channel]));
    else waiting.set(index, all);
  }
  const takenBy = new Map<string, number>();
  const scores = new Map<number, number>();
  while (waiting.size > 0) {
    let pick: { index: number; guess: Guess } | null = null;
    for (const [index, [guess]] of waiting)
      if (guess !== undefined && (pick === null || guess.score > pick.guess.score)) pick = { index, guess };
    if (pick === null) break;
    const { index, guess } = pick;
    const rival = takenBy.get(guess.channel);
    if (rival === undefined) {
      takenBy.set(guess.channel, index);
      scores.set(index, guess.score);
      Object.assign(columns[index]!, { channel: guess.channel, unit: guess.unit });
      waiting.delete(index);
      continue;
    }
    // a second meaning is taken only where the ram is known to have such a sensor
    const rest = (waiting.get(index) ?? [])
      .slice(1)
      .filter((other) => other.score >= LEAST && sensors.some((sensor) => sensor.channel === other.channel));
    if (rest.length > 0) waiting.set(index, rest);
    else {
      waiting.delete(index);
      questions.push(
        rivalQuestion(columns[index]!, columns[rival]!, guess, guess.score === scores.get(rival), sensors),
      );
    }
  }
  return questions;
}

/** Channels that the figures of the ram do not rest on. */
const beside: readonly ChannelName[] = ['battery', 'water_temperature', 'barometer'];

/** Two columns that look like the same channel. Where neither looks more like it, a person must say. */
function rivalQuestion(
  column: ColumnReading,
  kept: ColumnReading,
  guess: Guess,
  isTie: boolean,
  sensors: readonly Sensor[],
): ReadingQuestion {
  const question = channelQuestion(column, guess.unit, sensors);
  return {
    ...question,
    question: `${nameOf(kept)} and ${nameOf(column)} both look like the ${channelWords[guess.channel]}; ${nameOf(kept)} was taken. ${question.question}`,
    must_answer: isTie && !beside.includes(guess.channel),
  };
}
