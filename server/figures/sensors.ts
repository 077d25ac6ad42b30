import { standardAtmosphere_kpa } from '../hydraulics/atmosphere';
import { GRAVITY, waterDensity } from '../hydraulics/water';
import { type ChannelName, channelUnit } from '../shapes/channel';
import type { Installation, Sensor } from '../shapes/installation';
import { converter, dimensionOf, parseUnit, type UnitName } from '../units/units';

/** Water temperature where the installation states none, °C: a spring in the hills; density changes by 0.2 % between 5 and 25 °C. */
const USUAL_TEMPERATURE_C = 15;

export const sensorOf = (installation: Installation, channel: ChannelName): Sensor | undefined =>
  installation.sensors.find((sensor) => sensor.channel === channel);

/** Weight of a metre of water in kPa at the installation's temperature. */
export const kpaPerMetre = (installation: Installation): number =>
  (waterDensity(installation.water_temperature_c ?? USUAL_TEMPERATURE_C) * GRAVITY) / 1000;

/**
 * How a stored value of a unit becomes a value of the channel's own unit: the sensor's scale and offset, the change of unit,
 * pressure to level where a level is taken by a pressure sensor, and absolute to gauge at the altitude's standard atmosphere.
 * Always a straight line: value × scale + offset.
 */
export function unitChange(
  installation: Installation,
  channel: ChannelName,
  unit: string,
): { scale: number; offset: number } {
  const sensor = sensorOf(installation, channel);
  const target = channelUnit[channel] as UnitName;
  const written = parseUnit(unit) ?? target;
  const stated = sensor?.unit === undefined ? undefined : parseUnit(sensor.unit);
  let scale = sensor?.scale ?? 1;
  let offset = 0;
  let from = written;
  // pulses of a meter: the sensor's scale says how much of its own unit one pulse is worth
  if (dimensionOf(written) === 'count' && dimensionOf(target) !== 'count') from = stated ?? target;
  const change = lineBetween(from, target, installation);
  if (sensor?.offset !== undefined) offset = sensor.offset * lineBetween(stated ?? from, target, installation).scale;
  scale *= change.scale;
  offset += change.offset;
  if (sensor?.reference === 'absolute' && dimensionOf(target) === 'pressure')
    offset -= standardAtmosphere_kpa(installation.altitude_m ?? 0);
  if (sensor?.reference === 'absolute' && dimensionOf(target) === 'length' && dimensionOf(from) === 'pressure')
    offset -= standardAtmosphere_kpa(installation.altitude_m ?? 0) / kpaPerMetre(installation);
  return { scale, offset };
}

function lineBetween(from: UnitName, to: UnitName, installation: Installation): { scale: number; offset: number } {
  const have = dimensionOf(from);
  const want = dimensionOf(to);
  if (have === want) return converter(from, to);
  const metre_kpa = kpaPerMetre(installation);
  if (have === 'pressure' && want === 'length') {
    const toKpa = converter(from, 'kPa');
    return { scale: toKpa.scale / metre_kpa, offset: 0 };
  }
  if (have === 'length' && want === 'pressure') {
    const toMetre = converter(from, 'm');
    return { scale: toMetre.scale * metre_kpa, offset: 0 };
  }
  return { scale: 1, offset: 0 };
}

/** What sensors of each kind are usually good for, plus or minus at 95 %, where the installation states nothing (common practice, no source). */
const usualAccuracy: Partial<Record<ChannelName, { fixed: number; share: number }>> = {
  chamber_pressure: { fixed: 1, share: 0.01 },
  chamber_ripple: { fixed: 0.3, share: 0.05 },
  valve_box_pressure: { fixed: 2, share: 0.01 },
  source_level: { fixed: 0.01, share: 0 },
  tank_level: { fixed: 0.01, share: 0 },
  delivery_volume: { fixed: 0, share: 0.02 },
  delivery_flow: { fixed: 0, share: 0.03 },
  waste_weir_head: { fixed: 0.002, share: 0 },
  waste_flow: { fixed: 0, share: 0.05 },
  drive_flow: { fixed: 0, share: 0.05 },
};

/** Accuracy of a channel at a value, in the channel's own unit, plus or minus at 95 %. */
export function accuracyOf(installation: Installation, channel: ChannelName, value: number): number {
  const sensor = sensorOf(installation, channel);
  if (sensor?.accuracy !== undefined) {
    const unit = (sensor.unit === undefined ? undefined : parseUnit(sensor.unit)) ?? (channelUnit[channel] as UnitName);
    return sensor.accuracy * Math.abs(lineBetween(unit, channelUnit[channel] as UnitName, installation).scale);
  }
  const usual = usualAccuracy[channel] ?? { fixed: 0, share: 0.02 };
  return usual.fixed + usual.share * Math.abs(value);
}
