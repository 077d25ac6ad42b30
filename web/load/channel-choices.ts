import type { ChannelName } from '../../server/shapes/channel';

/** What a column may measure, in the words of the trade, with the units that are offered for it. */
export const channelChoices: Record<ChannelName, { words: string; units: string[] }> = {
  beat_count: { words: 'beat counter (running total)', units: ['count'] },
  beats_in_interval: { words: 'beats in each interval', units: ['count'] },
  beat_rate: { words: 'beats per minute', units: ['1/min', '1/s', '1/h'] },
  chamber_pressure: { words: 'air chamber pressure', units: ['kPa', 'bar', 'mbar', 'psi', 'mH2O', 'ftH2O'] },
  chamber_ripple: { words: 'chamber ripple, peak to peak', units: ['kPa', 'bar', 'mbar', 'psi', 'mH2O'] },
  valve_box_pressure: { words: 'valve box pressure', units: ['kPa', 'bar', 'mbar', 'psi', 'mH2O'] },
  source_level: { words: 'source level', units: ['m', 'cm', 'mm', 'ft', 'in', 'kPa', 'mbar'] },
  tank_level: { words: 'tank level', units: ['m', 'cm', 'mm', 'ft', 'in', 'kPa', 'mbar'] },
  delivery_volume: { words: 'delivery meter (running total)', units: ['L', 'm3', 'gal', 'impgal', 'ft3', 'count'] },
  delivery_flow: { words: 'delivery flow', units: ['L/s', 'L/min', 'L/h', 'L/d', 'm3/h', 'gpm'] },
  waste_weir_head: { words: 'head over the waste weir', units: ['m', 'cm', 'mm', 'ft', 'in'] },
  waste_flow: { words: 'waste flow', units: ['L/s', 'L/min', 'L/h', 'm3/h', 'gpm'] },
  drive_flow: { words: 'drive flow', units: ['L/s', 'L/min', 'L/h', 'm3/h', 'gpm'] },
  water_temperature: { words: 'water temperature', units: ['degC', 'degF', 'K'] },
  barometer: { words: 'barometer', units: ['kPa', 'hPa', 'mbar', 'mmHg'] },
  battery: { words: 'logger battery', units: ['V', 'mV'] },
};
