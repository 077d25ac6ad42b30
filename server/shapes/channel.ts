import { z } from 'zod';

/** What a logger's column measures. `unused` is kept in the original file only. */
export const channelNames = [
  'beat_count',
  'beats_in_interval',
  'beat_rate',
  'chamber_pressure',
  'chamber_ripple',
  'valve_box_pressure',
  'source_level',
  'tank_level',
  'delivery_volume',
  'delivery_flow',
  'waste_weir_head',
  'waste_flow',
  'drive_flow',
  'water_temperature',
  'barometer',
  'battery',
] as const;

export const channelName = z.enum(channelNames);
export type ChannelName = z.infer<typeof channelName>;

/** Plain words for each channel, for people. */
export const channelWords: Record<ChannelName, string> = {
  beat_count: 'beat counter (running total)',
  beats_in_interval: 'beats in each interval',
  beat_rate: 'beats per minute',
  chamber_pressure: 'air chamber pressure (delivery side)',
  chamber_ripple: 'chamber ripple, peak to peak',
  valve_box_pressure: 'valve box pressure (drive side)',
  source_level: 'source level',
  tank_level: 'tank level',
  delivery_volume: 'delivery meter (running total)',
  delivery_flow: 'delivery flow',
  waste_weir_head: 'head over the waste weir',
  waste_flow: 'waste flow',
  drive_flow: 'drive flow',
  water_temperature: 'water temperature',
  barometer: 'barometer',
  battery: 'logger battery',
};

/** The unit in which the program reasons about each channel; files and sensors may use any unit of the same kind. */
export const channelUnit: Record<ChannelName, string> = {
  beat_count: 'count',
  beats_in_interval: 'count',
  beat_rate: '1/min',
  chamber_pressure: 'kPa',
  chamber_ripple: 'kPa',
  valve_box_pressure: 'kPa',
  source_level: 'm',
  tank_level: 'm',
  delivery_volume: 'L',
  delivery_flow: 'L/s',
  waste_weir_head: 'm',
  waste_flow: 'L/s',
  drive_flow: 'L/s',
  water_temperature: 'degC',
  barometer: 'kPa',
  battery: 'V',
};
