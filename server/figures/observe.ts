import { readCounter } from '../beats/counter';
import { standardAtmosphere_kpa } from '../hydraulics/atmosphere';
import { vNotchHead_m, vNotchSlope_lps_per_m } from '../hydraulics/weir';
import type { ChannelName } from '../shapes/channel';
import type { Installation } from '../shapes/installation';
import { fromAccuracy, type Measured } from './measured';
import { meterFlow } from './meter-flow';
import type { Observation } from './observation';
import { observeBeats } from './observe-beats';
import { accuracyOf, kpaPerMetre, sensorOf } from './sensors';
import { coverageOf, meansOf, type Series, type Span } from './spans';
import { tankInflow } from './tank-inflow';
import { weirFlow } from './weir-flow';

/** Channels from which observations are made. */
export const observedChannels: readonly ChannelName[] = [
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
  'barometer',
];

/** How sure a surveyed height is, plus or minus at 95 % (common practice with a hand level, no source). */
const SURVEY_M = 0.02;

/**
 * Observes a ram over spans (ascending, not overlapping). The series are in the channels' own units with the sensors'
 * corrections already applied, and should reach a record beyond both ends, so that intervals across an edge can be shared out.
 */
export function observe(
  series: ReadonlyMap<ChannelName, Series>,
  spans: readonly Span[],
  installation: Installation,
): Observation[] {
  const one = (channel: ChannelName) => series.get(channel);
  const coverage = coverageOf([...series.values()], spans);
  const waste = weirFlow(one('waste_weir_head'), installation) ?? one('waste_flow');
  const beats = observeBeats({
    counter: one('beat_count'),
    readings:
      one('beat_count') &&
      readCounter(one('beat_count')!.times_ms, one('beat_count')!.values, {
        rolls_over_at: sensorOf(installation, 'beat_count')?.rolls_over_at,
      }),
    perInterval: one('beats_in_interval'),
    rate: one('beat_rate'),
    spans,
    waste,
    valveBox: one('valve_box_pressure'),
  });
  const barometer = meansOf(one('barometer'), spans);
  const source = meansOf(one('source_level'), spans);
  const chamber = meansOf(one('chamber_pressure'), spans);
  const ripple = meansOf(one('chamber_ripple'), spans);
  const wasteMeans = meansOf(waste, spans);
  const drive = meansOf(one('drive_flow'), spans);
  const meter = meterFlow(one('delivery_volume'), one('delivery_flow'), spans, installation);
  const tank = one('tank_level');

  return spans.map((span, s) => ({
    ...span,
    coverage: coverage[s]!,
    ...beats[s]!,
    fall_m: source[s] === null ? null : fallFrom(source[s]!, installation),
    chamber_head_m: chamber[s] === null ? null : headFrom(chamber[s]!, barometer[s] ?? null, installation),
    chamber_ripple_kpa:
      ripple[s] === null
        ? null
        : fromAccuracy(ripple[s]!, accuracyOf(installation, 'chamber_ripple', ripple[s]!), 'the ripple reading'),
    meter_lps: meter[s]!,
    tank_inflow_lps: tank === undefined ? null : tankInflow(tank, span, installation, beats[s]!.still),
    waste_lps:
      wasteMeans[s] === null ? null : wasteFrom(wasteMeans[s]!, one('waste_weir_head') !== undefined, installation),
    drive_lps:
      drive[s] === null
        ? null
        : fromAccuracy(drive[s]!, accuracyOf(installation, 'drive_flow', drive[s]!), 'the drive flow meter'),
  }));
}

function fallFrom(level_m: number, installation: Installation): Measured {
  const sensor = sensorOf(installation, 'source_level');
  const accuracy = accuracyOf(installation, 'source_level', level_m);
  const by = accuracy >= SURVEY_M ? 'the source level sensor' : 'the survey of the gauge zero';
  return fromAccuracy(level_m + (sensor?.height_m ?? installation.fall_m), Math.hypot(accuracy, SURVEY_M), by);
}

function headFrom(pressure_kpa: number, barometer_kpa: number | null, installation: Installation): Measured {
  const sensor = sensorOf(installation, 'chamber_pressure');
  const metre_kpa = kpaPerMetre(installation);
  // an absolute sensor was already brought to gauge at the altitude's standard air; a barometer tells the day's difference
  const weather_kpa =
    sensor?.reference === 'absolute' && barometer_kpa !== null
      ? barometer_kpa - standardAtmosphere_kpa(installation.altitude_m ?? 0)
      : 0;
  const head_m = (pressure_kpa - weather_kpa) / metre_kpa + (sensor?.height_m ?? 0);
  return fromAccuracy(
    head_m,
    accuracyOf(installation, 'chamber_pressure', pressure_kpa) / metre_kpa,
    'the chamber pressure sensor',
  );
}

function wasteFrom(waste_lps: number, byWeir: boolean, installation: Installation): Measured {
  return byWeir
    ? fromAccuracy(waste_lps, weirAccuracy(waste_lps, installation), 'the head over the waste weir')
    : fromAccuracy(waste_lps, accuracyOf(installation, 'waste_flow', waste_lps), 'the waste flow meter');
}

/** Discharge coefficient of a well-made thin-plate notch, plus or minus at 95 % (ISO 1438, from memory: 1 to 2 %). */
const NOTCH_SHARE = 0.02;

/** Accuracy of a weir's flow from that of its head, by the law's own slope at that flow, and from the notch itself. */
function weirAccuracy(waste_lps: number, installation: Installation): number {
  const notch_deg = installation.waste_weir?.notch_deg ?? 90;
  const slope = vNotchSlope_lps_per_m(vNotchHead_m(waste_lps, notch_deg), notch_deg);
  return Math.hypot(slope * accuracyOf(installation, 'waste_weir_head', 0), NOTCH_SHARE * waste_lps);
}
