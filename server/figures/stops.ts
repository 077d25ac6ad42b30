import type { Stop } from '../health/stops';
import type { Installation } from '../shapes/installation';
import { localDate } from './local-days';
import type { Observation, Still } from './observation';
import { kpaPerMetre } from './sensors';

/** Shorter stretches without a beat are pauses, not stops: a visit, a passing blade of grass. */
const LEAST_STOP_MS = 6 * 3_600_000;

/** Stops of a ram, joined over the edges of the days, with how the waste valve stood as far as the sensors tell. */
export function findStops(
  days: readonly Observation[],
  lastRecord_ms: number | null,
  installation: Installation,
): Stop[] {
  const joined: Still[] = [];
  for (const still of days.flatMap((day) => day.still)) {
    const before = joined.at(-1);
    if (before !== undefined && still.from_ms <= before.to_ms) before.to_ms = Math.max(before.to_ms, still.to_ms);
    else joined.push({ ...still });
  }
  const usual_waste_lps = middle(
    days.flatMap((day) => (day.waste_lps !== null && day.still.length === 0 ? [day.waste_lps.value] : [])),
  );
  return joined
    .filter((still) => still.to_ms - still.from_ms >= LEAST_STOP_MS)
    .map((still) => ({ ...still, lasts: lastRecord_ms !== null && still.to_ms >= lastRecord_ms }))
    .map((still) => ({
      from_ms: still.from_ms,
      to_ms: still.lasts ? null : still.to_ms,
      from_on: localDate(installation.time_zone, still.from_ms),
      to_on: still.lasts ? null : localDate(installation.time_zone, still.to_ms),
      waste_valve: valveWhile(still, usual_waste_lps, installation),
    }));
}

/** An open valve roars and the box stands near the pressure of the air; a shut one is silent and the box carries the whole fall. */
function valveWhile(still: Still, usual_waste_lps: number | null, installation: Installation): Stop['waste_valve'] {
  if (still.waste_lps !== null && usual_waste_lps !== null && usual_waste_lps > 0) {
    const share = still.waste_lps / usual_waste_lps;
    if (share > 1.3) return 'open';
    if (share < 0.2) return 'shut';
  }
  if (still.valve_box_kpa !== null) {
    const share = still.valve_box_kpa / (installation.fall_m * kpaPerMetre(installation));
    if (share > 0.8) return 'shut';
    if (share < 0.4) return 'open';
  }
  return 'unknown';
}

function middle(values: number[]): number | null {
  return values.length === 0 ? null : values.sort((a, b) => a - b)[values.length >> 1]!;
}
