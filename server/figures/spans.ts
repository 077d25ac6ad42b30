import { lowerBound } from '../store/series-read';

/** A channel's values in rising order of time, in the channel's own unit; NaN where missing. */
export interface Series {
  times_ms: Float64Array;
  values: Float64Array;
}

export interface Span {
  from_ms: number;
  to_ms: number;
  date?: string;
}

/** The usual step between records, ms: the median over (at most a thousand of) the steps. Null with fewer than two records. */
export function usualStep(times: Float64Array): number | null {
  if (times.length < 2) return null;
  const every = Math.max(1, Math.floor((times.length - 1) / 1000));
  const steps: number[] = [];
  for (let i = 1; i < times.length; i += every) steps.push(times[i]! - times[i - 1]!);
  steps.sort((a, b) => a - b);
  return steps[steps.length >> 1]!;
}

/** Mean of the values that stand in each span, null where there is none. A stamp marks the end of its interval: one at a span's start belongs to the span before. */
export function meansOf(series: Series | undefined, spans: readonly Span[]): (number | null)[] {
  if (series === undefined) return spans.map(() => null);
  const { times_ms, values } = series;
  return spans.map(({ from_ms, to_ms }) => {
    let i = lowerBound(times_ms, from_ms + 0.5);
    let total = 0;
    let count = 0;
    for (; i < times_ms.length && times_ms[i]! <= to_ms; i++) {
      const value = values[i]!;
      if (Number.isNaN(value)) continue;
      total += value;
      count++;
    }
    return count > 0 ? total / count : null;
  });
}

/**
 * Shares what happened in each interval out to the spans it touches, in proportion to time. `amounts[i]` belongs to the
 * interval that ends at `times[i]`; NaN is not known and adds neither amount nor time.
 */
export function shareOut(
  times: Float64Array,
  amounts: Float64Array,
  spans: readonly Span[],
): { amount: Float64Array; known_ms: Float64Array } {
  const amount = new Float64Array(spans.length);
  const known_ms = new Float64Array(spans.length);
  if (spans.length === 0) return { amount, known_ms };
  let s = 0;
  let { from_ms, to_ms } = spans[0]!;
  // what lies wholly within the span at hand is summed apart: nearly every interval does
  let within = 0;
  let within_ms = 0;
  const last_ms = spans[spans.length - 1]!.to_ms;
  const first = Math.max(1, lowerBound(times, from_ms));
  let start = first < times.length ? times[first - 1]! : last_ms;
  for (let i = first; i < times.length && start < last_ms; i++) {
    const end = times[i]!;
    if (to_ms <= start && s + 1 < spans.length) {
      amount[s]! += within;
      known_ms[s]! += within_ms;
      within = within_ms = 0;
      while (to_ms <= start && s + 1 < spans.length) ({ from_ms, to_ms } = spans[++s]!);
    }
    const value = amounts[i]!;
    if (!Number.isNaN(value) && end > start) {
      if (start >= from_ms && end <= to_ms) {
        within += value;
        within_ms += end - start;
      } else shareOverEdges(start, end, value, spans, s, amount, known_ms);
    }
    start = end;
  }
  amount[s]! += within;
  known_ms[s]! += within_ms;
  return { amount, known_ms };
}

function shareOverEdges(
  start: number,
  end: number,
  value: number,
  spans: readonly Span[],
  from: number,
  amount: Float64Array,
  known_ms: Float64Array,
): void {
  for (let k = from; k < spans.length && spans[k]!.from_ms < end; k++) {
    const shared_ms = Math.min(end, spans[k]!.to_ms) - Math.max(start, spans[k]!.from_ms);
    if (shared_ms <= 0) continue;
    amount[k]! += (value * shared_ms) / (end - start);
    known_ms[k]! += shared_ms;
  }
}

/** Share of each span in which the records of the best-recorded channel stand no further apart than three usual steps. */
export function coverageOf(all: readonly Series[], spans: readonly Span[]): Float64Array {
  const best = new Float64Array(spans.length);
  const seen = new Set<Float64Array>();
  for (const { times_ms } of all) {
    if (seen.has(times_ms)) continue;
    seen.add(times_ms);
    const step = usualStep(times_ms);
    if (step === null) continue;
    const covered = new Float64Array(times_ms.length);
    for (let i = 1; i < times_ms.length; i++) covered[i] = times_ms[i]! - times_ms[i - 1]! <= 3 * step ? 0 : Number.NaN;
    const { known_ms } = shareOut(times_ms, covered, spans);
    for (let s = 0; s < spans.length; s++)
      best[s] = Math.max(best[s]!, Math.min(1, known_ms[s]! / (spans[s]!.to_ms - spans[s]!.from_ms)));
  }
  return best;
}
