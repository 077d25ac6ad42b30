/*
 * What one column may mean: its heading's words, its unit, what its values look like, and the sensors that the ram is known to have.
 */
import type { ChannelName } from '../shapes/channel';
import type { Sensor } from '../shapes/installation';
import { dimensionOf, parseUnit, type UnitName } from '../units/units';
import { type HeadingWords, headingWords, type Place } from './channel-words';
import { type ColumnProfile, countsRows, medianOf, neverFalls } from './column-profiles';
import { headingUnits } from './heading-units';

type Dimension = ReturnType<typeof dimensionOf>;

export interface Guess {
  channel: ChannelName;
  score: number;
  unit: UnitName | null;
}

/** Units in which a channel may be written. Levels may be taken by a pressure sensor, pressures be written as metres of water. */
export const dimensions: Record<ChannelName, readonly Dimension[]> = {
  beat_count: ['count'],
  beats_in_interval: ['count'],
  beat_rate: ['rate'],
  chamber_pressure: ['pressure', 'length'],
  chamber_ripple: ['pressure', 'length'],
  valve_box_pressure: ['pressure', 'length'],
  source_level: ['length', 'pressure'],
  tank_level: ['length', 'pressure'],
  delivery_volume: ['volume', 'count'],
  delivery_flow: ['flow'],
  waste_weir_head: ['length'],
  waste_flow: ['flow'],
  drive_flow: ['flow'],
  water_temperature: ['temperature'],
  barometer: ['pressure'],
  battery: ['voltage'],
};

/** Guesses for one column, the best first; none where the heading and the unit say nothing of a ram. */
export function guessColumn(
  label: string,
  statedUnit: UnitName | null,
  profile: ColumnProfile,
  sensors: readonly Sensor[],
  step_ms: number,
): Guess[] {
  if (profile.kind !== 'number' && profile.kind !== 'blank') return [];
  const units = headingUnits(label);
  const words = headingWords(units.find((one) => one.isMarked)?.words ?? label);
  if (words.qualities.has('status') || (isRecordNumber(words, profile) && units.length === 0)) return [];
  const stated =
    statedUnit ??
    units.find((one) => one.isMarked)?.unit ??
    (profile.cellUnit === null ? null : parseUnit(profile.cellUnit));
  const candidates = channelsOf(words, stated ?? units[0]?.unit ?? null, profile, step_ms, sensors);
  const guesses = candidates.flatMap(([channel, points]): Guess[] => {
    const fits = (unit: UnitName) => dimensions[channel].includes(dimensionOf(unit));
    if (stated !== null && !fits(stated)) return [];
    const unit = stated ?? units.find((one) => fits(one.unit))?.unit ?? null;
    const isFirst = unit !== null && dimensionOf(unit) === dimensions[channel][0];
    let score = points + (unit === null ? 0 : isFirst ? 2 : 1);
    if (sensors.some((sensor) => sensor.channel === channel)) score += 2;
    if (words.qualities.has('extreme') && channel !== 'chamber_ripple') score -= 2;
    if (words.qualities.has('mean')) score += 0.5;
    if (profile.kind === 'blank') score -= 1;
    return [{ channel, score, unit }];
  });
  return guesses.sort((a, b) => b.score - a.score);
}

/** A column that numbers the rows: by its heading, or by counting them while its heading says nothing of a ram. */
const isRecordNumber = ({ measured, places, qualities }: HeadingWords, profile: ColumnProfile): boolean =>
  measured.size === 0 &&
  (qualities.has('record') || (places.size === 0 && !qualities.has('meter') && countsRows(profile.numbers)));

/** Channels that the words and the dimension allow, each with its points. */
function channelsOf(
  words: HeadingWords,
  unit: UnitName | null,
  profile: ColumnProfile,
  step_ms: number,
  sensors: readonly Sensor[],
): [ChannelName, number][] {
  const { measured, places } = words;
  const dimension = unit === null ? null : dimensionOf(unit);
  const at = (...wanted: Place[]) => wanted.some((place) => places.has(place));
  const says = (what: Parameters<typeof measured.has>[0]) => measured.has(what);

  if (says('battery')) return [['battery', 5]];
  if (says('voltage') || dimension === 'voltage')
    return at('solar', 'drive', 'tank', 'chamber', 'source') ? [] : [['battery', 3]];
  if (dimension === 'temperature' || (says('temperature') && dimension === null && !says('pressure') && !says('level')))
    return at('air', 'logger') && !at('chamber') ? [] : [['water_temperature', says('temperature') ? 4 : 2]];
  if (says('ripple') && (dimension === null || dimension === 'pressure' || dimension === 'length'))
    return [['chamber_ripple', 5]];
  if (
    says('beats') ||
    dimension === 'rate' ||
    (dimension === null && words.qualities.has('rate') && measured.size === 0)
  )
    return beatChannels(words, dimension, profile, step_ms);
  if (says('pulses') || says('count') || dimension === 'count') return countChannels(words, profile, step_ms, sensors);
  if (
    dimension === 'flow' ||
    (says('flow') &&
      dimension === null &&
      !says('volume') &&
      !says('pressure') &&
      !says('level') &&
      !words.qualities.has('total'))
  )
    return flowChannels(words, at);
  const isMeter = words.qualities.has('meter') && !says('level') && !says('pressure') && dimension === null;
  if (dimension === 'volume' || says('volume') || isMeter) return volumeChannels(at);
  if (at('weir') && (dimension === null || dimension === 'length')) return [['waste_weir_head', 5]];
  if (says('level') && !says('pressure')) return levelChannels(at);
  if (says('pressure') || (dimension === 'pressure' && !says('head')))
    return pressureChannels(says('pressure'), at, profile, dimension);
  if (says('head')) return headChannels(at, dimension);
  if (dimension === 'length' || dimension === null)
    return at('tank', 'source') && profile.kind === 'number' ? levelChannels(at, 2) : [];
  return [];
}

type At = (...wanted: Place[]) => boolean;

function pressureChannels(
  isSaid: boolean,
  at: At,
  profile: ColumnProfile,
  dimension: Dimension | null,
): [ChannelName, number][] {
  const points = isSaid ? 2 : 1;
  if (at('air') && !at('chamber')) return [['barometer', points + 3]];
  if (at('chamber')) return [['chamber_pressure', points + 3]];
  if (at('drive')) return [['valve_box_pressure', points + 3]];
  if (at('delivery')) return [['chamber_pressure', points + 2.5]];
  // a pressure sensor at the bottom of a tank or of the source
  if (at('tank')) return dimension === 'pressure' ? [['tank_level', points + 2]] : [['tank_level', points + 1]];
  if (at('source'))
    return [
      ['source_level', points + 1],
      ['valve_box_pressure', points + 1],
    ];
  if (at('waste')) return [['valve_box_pressure', points + 1]];
  if (at('logger')) return [];
  const others: [ChannelName, number][] = [
    ['chamber_pressure', points + 1],
    ['valve_box_pressure', points],
  ];
  return medianOf(profile.numbers) < 0 ? others.slice(1) : others;
}

function headChannels(at: At, dimension: Dimension | null): [ChannelName, number][] {
  if (at('chamber', 'delivery')) return [['chamber_pressure', 4]];
  if (at('waste')) return dimension === 'pressure' ? [] : [['waste_weir_head', 3]];
  if (at('source')) return [['source_level', 3]];
  if (at('tank')) return [['tank_level', 3]];
  return [
    ['chamber_pressure', 1.5],
    ['source_level', 1],
  ];
}

function levelChannels(at: At, points = 2): [ChannelName, number][] {
  // the drive tank feeds the ram: its level is the source's
  if (at('source') || at('drive')) return [['source_level', points + 3]];
  if (at('tank', 'delivery')) return [['tank_level', points + 3]];
  if (at('waste')) return [['waste_weir_head', points + 2]];
  if (at('chamber')) return [];
  return [
    ['tank_level', points],
    ['source_level', points],
  ];
}

function flowChannels(words: HeadingWords, at: At): [ChannelName, number][] {
  const points = words.measured.has('flow') ? 2 : 1;
  if (at('waste', 'weir')) return [['waste_flow', points + 3]];
  if (at('drive', 'source') && !at('delivery')) return [['drive_flow', points + 3]];
  if (at('delivery', 'tank', 'chamber')) return [['delivery_flow', points + 3]];
  return [
    ['delivery_flow', points + 1],
    ['drive_flow', points],
    ['waste_flow', points],
  ];
}

const volumeChannels = (at: At): [ChannelName, number][] =>
  at('waste', 'drive', 'source') && !at('delivery')
    ? []
    : at('tank')
      ? [['delivery_volume', 2]]
      : [['delivery_volume', at('delivery') ? 5 : 4]];

/** Counts of pulses or of who knows what: beats or the meter, as the words, then the ram's sensors tell. */
function countChannels(
  words: HeadingWords,
  profile: ColumnProfile,
  step_ms: number,
  sensors: readonly Sensor[],
): [ChannelName, number][] {
  const has = (...channels: ChannelName[]) => sensors.some((sensor) => channels.includes(sensor.channel));
  const isMeter = words.qualities.has('meter') || words.places.has('delivery') || words.places.has('tank');
  if (isMeter) return words.places.has('waste') ? [] : [['delivery_volume', 4]];
  const beats = beatChannels(words, 'count', profile, step_ms);
  const isSilent = !words.places.has('waste') && !words.places.has('drive') && !words.places.has('chamber');
  return isSilent && has('delivery_volume') && words.measured.has('pulses')
    ? [...beats, ['delivery_volume', 3]]
    : beats;
}

/** A running total, a count in each interval or a rate: the words first, then whether the values ever fall, then what a ram can do. */
function beatChannels(
  { qualities, measured }: HeadingWords,
  dimension: Dimension | null,
  profile: ColumnProfile,
  step_ms: number,
): [ChannelName, number][] {
  if (dimension !== null && dimension !== 'count' && dimension !== 'rate') return [];
  const points = measured.has('beats') ? 4 : 3;
  if (dimension === 'rate' || (qualities.has('rate') && dimension !== 'count')) return [['beat_rate', points]];
  const { numbers } = profile;
  // a file may begin with its newest record
  const inOrder = neverFalls(numbers) ? numbers : [...numbers].reverse();
  const rises = neverFalls(inOrder) && inOrder.at(-1)! > inOrder[0]! + 3;
  if (qualities.has('interval') && (!qualities.has('total') || !rises)) return [['beats_in_interval', points]];
  if (qualities.has('total') || rises)
    return [
      ['beat_count', points],
      ['beats_in_interval', points - 2],
    ];
  if (!profile.isInteger)
    return [
      ['beat_rate', points - 1],
      ['beats_in_interval', points - 1.5],
    ];
  const middle = medianOf(numbers);
  const perMinute = middle / (step_ms / 60_000);
  // 600 beats in ten minutes, or 60 a minute told every ten minutes
  const isRate = perMinute < 10 && middle >= 10 && middle <= 150;
  const named = numbers.length < 4 ? ([['beat_count', points]] as [ChannelName, number][]) : [];
  return isRate ? [['beat_rate', points - 1], ...named] : [...named, ['beats_in_interval', points]];
}
