import type { SpanFigures } from '../shapes/figure';
import type { SetUpSpan } from '../shapes/finding';

/** As many good days as a set-up span takes where the record allows. */
const WANTED_DAYS = 30;
/** Below this the baseline is a lottery, and the span is called provisional. */
const SOUND_DAYS = 20;
/** With fewer good days than this nothing is expected of the ram yet. */
export const LEAST_DAYS = 7;
const GOOD_COVERAGE = 0.75;
const GOOD_RUNNING = 0.97;

export interface Regime {
  /** Index of the first day that belongs to this set-up, and of the first that does not. */
  first: number;
  end: number;
  span: SetUpSpan;
  /** Indices of the good days within the span. */
  baseline: number[];
}

/** A day is used only when it is well recorded and the ram ran through it. */
export const isGood = (day: SpanFigures): boolean =>
  day.coverage >= GOOD_COVERAGE && (day.running_share ?? 1) >= GOOD_RUNNING;

/**
 * The set-ups of a ram: one from the first record (or commissioning), another after each visit that changed the ram. Each has its span:
 * its first thirty good days, or the days that a person stated. Nothing after the span is looked at.
 */
export function regimesOf(
  days: readonly SpanFigures[],
  openedOn: readonly string[],
  commissionedOn: string | undefined,
  stated: { from: string; to: string } | null,
): Regime[] {
  const dateOf = (index: number) => days[index]!.date!;
  const starts = [commissionedOn ?? '', ...openedOn]
    .map((date, s) => days.findIndex((day) => (s === 0 ? day.date! >= date : day.date! > date)))
    .filter((index) => index >= 0);
  const firsts = [...new Set([...(starts.length > 0 ? starts : [0])])].sort((a, b) => a - b);
  const regimes: Regime[] = [];
  firsts.forEach((first, r) => {
    const end = firsts[r + 1] ?? days.length;
    const within =
      stated !== null && dateOf(first) <= stated.from && (end === days.length || stated.from < dateOf(end))
        ? stated
        : null;
    const baseline: number[] = [];
    for (let d = first; d < end && baseline.length < (within === null ? WANTED_DAYS : days.length); d++) {
      if (within !== null && (dateOf(d) < within.from || dateOf(d) > within.to)) continue;
      if (isGood(days[d]!)) baseline.push(d);
    }
    if (baseline.length < LEAST_DAYS) return;
    regimes.push({
      first,
      end,
      span: {
        from: dateOf(baseline[0]!),
        to: dateOf(baseline.at(-1)!),
        days: baseline.length,
        provisional: baseline.length < SOUND_DAYS,
      },
      baseline,
    });
  });
  return regimes;
}
