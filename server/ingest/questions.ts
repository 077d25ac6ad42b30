/*
 * The questions that a file cannot answer by itself, in plain words.
 */
import { type ChannelName, channelNames, channelUnit, channelWords } from '../shapes/channel';
import type { Sensor } from '../shapes/installation';
import type { ColumnReading, ReadingQuestion } from '../shapes/reading';
import { convert, dimensionOf, parseUnit, type UnitName } from '../units/units';
import { monthNames } from './calendar';
import { dimensions } from './channel-guess';
import { type ColumnProfile, medianOf } from './column-profiles';
import type { DayOrderEvidence } from './day-order';

export const nameOf = (column: ColumnReading): string =>
  column.label === '' ? `Column ${column.index + 1}` : `"${column.label}"`;

export function dayOrderQuestion(ambiguous: NonNullable<DayOrderEvidence['ambiguous']>): ReadingQuestion {
  const words = ambiguous.readings.map(({ order, days }) => {
    const date = new Date(days * 86_400_000);
    const [day, month, year] = [date.getUTCDate(), monthNames[date.getUTCMonth()]!, date.getUTCFullYear()];
    return {
      order,
      text:
        order === 'month first'
          ? `${month} ${day}`
          : order === 'year first'
            ? `${year} ${month} ${day}`
            : `${day} ${month}`,
    };
  });
  const list = words.map((one) => one.text);
  return {
    about: 'day order',
    question: `${ambiguous.text}: is that ${list.slice(0, -1).join(', ')} or ${list.at(-1)}? The file's other dates do not tell.`,
    column: null,
    choices: words.map(({ order, text }) => ({ label: `${order} (${text})`, value: order })),
    must_answer: true,
  };
}

/**
 * Asks when a burst began.
 * @param candidates instants that the preamble may mean
 * @param text what the preamble says, or blank
 * @param firstStamp the first stamp as written
 */
export function startQuestion(candidates: readonly number[], text: string, firstStamp: string): ReadingQuestion {
  const choices = candidates.map((at) => new Date(at).toISOString()).map((iso) => ({ label: iso, value: iso }));
  const open = firstStamp.includes(':')
    ? `The stamps (such as ${firstStamp}) have no date. At which instant did their clock stand at 00:00:00?`
    : 'The file counts its time from the start of the burst. When did it start?';
  return {
    about: 'start of burst',
    question: candidates.length > 1 ? `${text}: at which of these instants did the burst start?` : open,
    column: null,
    choices,
    must_answer: true,
  };
}

export const zoneQuestion = (unknown: string, ramZone: string): ReadingQuestion => ({
  about: 'time zone',
  question: `The file says of its time zone "${unknown}", which is not understood. The ram's local time (${ramZone}) was taken. In which zone does the logger's clock run?`,
  column: null,
  choices: [
    { label: `the ram's local time (${ramZone})`, value: 'ram' },
    { label: 'UTC', value: 'utc' },
  ],
  must_answer: false,
});

const channelChoices = (unit: string | null, sensors: readonly Sensor[], first: readonly ChannelName[] = []) => {
  const parsed = unit === null ? null : parseUnit(unit);
  const fits = (channel: ChannelName) => parsed === null || dimensions[channel].includes(dimensionOf(parsed));
  const own = sensors.map((sensor) => sensor.channel);
  const all = [...new Set([...first, ...own, ...channelNames])].filter(fits);
  return all.map((channel) => ({ label: channelWords[channel], value: channel as string }));
};

export function channelQuestion(
  column: ColumnReading,
  unit: string | null,
  sensors: readonly Sensor[],
  candidates: readonly ChannelName[] = [],
): ReadingQuestion {
  const between = candidates.map((channel) => channelWords[channel]).join(' or ');
  return {
    about: 'channel',
    question:
      between === ''
        ? `What does ${nameOf(column)} hold? It is kept in the original file only unless you say.`
        : `Does ${nameOf(column)} hold the ${between}? It is kept in the original file only unless you say.`,
    column: column.index,
    choices: channelChoices(unit, sensors, candidates),
    must_answer: false,
  };
}

export function noChannelQuestion(
  columns: readonly ColumnReading[],
  timeColumns: readonly number[],
  sensors: readonly Sensor[],
): ReadingQuestion {
  const names = columns.filter((column) => !timeColumns.includes(column.index)).map(nameOf);
  return {
    about: 'channel',
    question: `None of the columns (${names.slice(0, 8).join(', ')}${names.length > 8 ? ', …' : ''}) could be told by its heading. Say of one at least what it holds.`,
    column: null,
    choices: channelChoices(null, sensors),
    must_answer: true,
  };
}

/** Where most values of a channel lie, in the channel's own unit, at rams of every size. Common practice, no source. */
const usual: Partial<Record<ChannelName, [number, number]>> = {
  chamber_pressure: [20, 5000],
  valve_box_pressure: [-100, 5000],
  source_level: [-5, 60],
  tank_level: [-0.5, 15],
  waste_weir_head: [-0.5, 1.5],
  delivery_flow: [0, 30],
  waste_flow: [0, 300],
  drive_flow: [0, 300],
  water_temperature: [-5, 45],
  barometer: [50, 110],
  battery: [0.8, 60],
};
/** Channels whose figures alone do not tell the unit: 40 may be kPa or psi, 7 may be L/s or L/min. */
const cannotTell: readonly ChannelName[] = [
  'chamber_pressure',
  'chamber_ripple',
  'valve_box_pressure',
  'delivery_flow',
  'waste_flow',
  'drive_flow',
  'delivery_volume',
];
const unitChoices: UnitName[] = [
  'kPa',
  'bar',
  'mbar',
  'psi',
  'mH2O',
  'm',
  'cm',
  'mm',
  'ft',
  'in',
  'L/s',
  'L/min',
  'm3/h',
  'gpm',
  'L',
  'm3',
  'gal',
  'count',
  'degC',
  'degF',
  'V',
  'mV',
  '1/min',
];

/** Asks for the unit where nobody states it and the figures do not tell, and where the figures contradict the one that is stated. */
export function unitQuestion(column: ColumnReading, profile: ColumnProfile, isStated: boolean): ReadingQuestion | null {
  const channel = column.channel!;
  const own = parseUnit(channelUnit[channel])!;
  const unit = column.unit === null ? own : parseUnit(column.unit)!;
  const middle = medianOf(profile.numbers);
  const range = usual[channel];
  const isSame = dimensionOf(unit) === dimensionOf(own);
  const value = isSame ? convert(middle, unit, own) : middle;
  const isUsual = Number.isNaN(middle) || range === undefined || !isSame || (value >= range[0] && value <= range[1]);
  // a pressure of nothing is a ram that stands still, not a wrong unit
  if (isStated && (isUsual || Math.abs(value) < 1e-9)) return null;
  if (!isStated && isUsual && !cannotTell.includes(channel)) {
    column.unit = own;
    return null;
  }
  const figures = Number.isNaN(middle) ? '' : ` Its values are about ${Number(middle.toPrecision(4))}.`;
  return {
    about: 'unit',
    question: isStated
      ? `${nameOf(column)} is read in ${unit}, in which its values (about ${Number(middle.toPrecision(4))}) are unusual for the ${channelWords[channel]}. Is the unit right?`
      : `In which unit is ${nameOf(column)} written?${figures} Neither the file nor the ram's sensors state it.`,
    column: column.index,
    choices: unitChoices
      .filter((one) => dimensions[channel].includes(dimensionOf(one)))
      .map((one) => ({ label: one, value: one })),
    must_answer: !isStated,
  };
}

export const changedHeaderQuestion = (fresh: readonly string[], gone: readonly string[]): ReadingQuestion => ({
  about: 'channel',
  question: `The columns differ from those of earlier files of this ram (${[
    ...(fresh.length > 0 ? [`new: ${fresh.map((label) => `"${label}"`).join(', ')}`] : []),
    ...(gone.length > 0 ? [`gone: ${gone.map((label) => `"${label}"`).join(', ')}`] : []),
    ...(fresh.length + gone.length === 0 ? ['another order'] : []),
  ].join('; ')}). The file was read afresh: check the meaning of each column.`,
  column: null,
  choices: [],
  must_answer: false,
});
