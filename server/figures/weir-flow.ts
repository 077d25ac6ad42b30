import { vNotchFlow_lps } from '../hydraulics/weir';
import type { Installation } from '../shapes/installation';
import { sensorOf } from './sensors';
import type { Series } from './spans';

/** Flow over the waste weir at every record, L/s; the mean is taken of flows, not of heads, because the law is far from straight. */
export function weirFlow(head: Series | undefined, installation: Installation): Series | undefined {
  const notch_deg = installation.waste_weir?.notch_deg;
  if (head === undefined || notch_deg === undefined) return undefined;
  const zero_m = sensorOf(installation, 'waste_weir_head')?.height_m ?? 0;
  return {
    times_ms: head.times_ms,
    values: head.values.map((level_m) =>
      Number.isNaN(level_m) ? Number.NaN : vNotchFlow_lps(Math.max(0, level_m + zero_m), notch_deg),
    ),
  };
}
