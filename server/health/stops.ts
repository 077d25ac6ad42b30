import type { Cause, Finding } from '../shapes/finding';
import { adviceFor, cautionsFor } from './advice';
import { inWords, looksLike } from './words';

/** A stretch without a beat. Times are UTC milliseconds; dates are the ram's local ones. */
export interface Stop {
  from_ms: number;
  /** Null while it still lasts at the last record. */
  to_ms: number | null;
  from_on: string;
  to_on: string | null;
  waste_valve: 'open' | 'shut' | 'unknown';
}

/** Shorter stops that have ended are not worth a finding of their own. */
const LEAST_ENDED_MS = 24 * 3_600_000;

const causesOf: Record<Stop['waste_valve'], { cause: Cause; probability: number }[]> = {
  open: [
    { cause: 'stopped with the waste valve open', probability: 0.75 },
    { cause: 'stopped, source dry', probability: 0.25 },
  ],
  shut: [
    { cause: 'stopped with the waste valve shut', probability: 0.8 },
    { cause: 'stopped, source dry', probability: 0.2 },
  ],
  unknown: [
    { cause: 'stopped with the waste valve open', probability: 0.4 },
    { cause: 'stopped with the waste valve shut', probability: 0.3 },
    { cause: 'stopped, source dry', probability: 0.3 },
  ],
};

export function stopFindings(stops: readonly Stop[], ram: string, expectedPerDay: number | null): Finding[] {
  return stops
    .filter((stop) => stop.to_ms === null || stop.to_ms - stop.from_ms >= LEAST_ENDED_MS)
    .map((stop) => {
      const causes = causesOf[stop.waste_valve];
      const names = causes.map(({ cause }) => cause);
      const open = stop.to_ms === null;
      const days = stop.to_ms === null ? null : (stop.to_ms - stop.from_ms) / 86_400_000;
      const long =
        days === null ? '' : ` for ${days < 2 ? `${Math.round(days * 24)} hours` : `${Math.round(days)} days`}`;
      const valve =
        stop.waste_valve === 'unknown'
          ? 'the sensors do not tell how the waste valve stands'
          : `this looks like ${looksLike[names[0]!]}`;
      return {
        finding_id: `${stop.from_on}-stop`,
        ram,
        class: 'go now' as const,
        open,
        began_on: stop.from_on,
        noticed_on: stop.from_on,
        ended_on: stop.to_on,
        observable: null,
        size: null,
        sentence: open
          ? `The ram has stood still since ${inWords(stop.from_on)}; ${valve}.`
          : `The ram stood still from ${inWords(stop.from_on)}${long}; ${valve}.`,
        causes,
        tied: stop.waste_valve === 'unknown' ? names : [],
        evidence: [{ text: 'The counter stood while records went on.', speaks: 'for' as const }],
        checks: [...new Set(causes.flatMap(({ cause }) => adviceFor[cause].checks))],
        cautions: cautionsFor(names),
        parts: [...new Set(causes.flatMap(({ cause }) => adviceFor[cause].parts))],
        litres_lost_per_day: open ? expectedPerDay : 0,
        litres_lost: days === null || expectedPerDay === null ? null : Math.round(days * expectedPerDay),
      };
    });
}
