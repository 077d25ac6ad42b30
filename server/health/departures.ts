import type { Observable, SpanFigures } from '../shapes/figure';
import type { Installation } from '../shapes/installation';
import { Cusum } from '../statistics/cusum';
import { median } from '../statistics/robust';
import { decisionInterval } from '../statistics/run-length';
import { dueOn, type RegimeModel } from './expectation';
import { charted, witnessed } from './observables';
import { isGood } from './set-up-span';

/** Allowance of the charts: they are tuned to shifts of one standard deviation. */
const ALLOWANCE = 0.5;
/** Stated false-alarm rate, per ram and year over all its charts together, before any size limit. */
export const FALSE_ALARMS_PER_YEAR = 0.1;
/** A departure must have held this many good days, and is over when it has been gone as long. */
const HELD_DAYS = 4;
/** Size is the median over this many good days. */
const SIZE_DAYS = 7;

/** Log ratio of measured to expected on each day; NaN where there is none. */
export interface RatioSeries {
  observable: Observable;
  ratio: Float64Array;
  lasting_sd: Float64Array;
  theory_sd: Float64Array;
}

export interface Departure {
  observable: Observable;
  direction: -1 | 1;
  /** Day indices: first on which the data up to it sufficed, Page's own estimate of the beginning, first day that is over (or null). */
  noticed: number;
  chartBegan: number;
  ended: number | null;
}

export function ratiosOf(
  days: readonly SpanFigures[],
  models: readonly RegimeModel[],
  observable: Observable,
  installation: Installation,
): RatioSeries | null {
  const ratio = new Float64Array(days.length).fill(Number.NaN);
  const lasting_sd = new Float64Array(days.length).fill(Number.NaN);
  const theory_sd = new Float64Array(days.length).fill(Number.NaN);
  let any = false;
  for (const model of models) {
    if (model.baselines[observable] === undefined) continue;
    any = true;
    for (let d = model.regime.first; d < model.regime.end; d++) {
      const value = witnessed(days[d]!, observable);
      if (value === null || !isGood(days[d]!)) continue;
      const due = dueOn(days[d]!, observable, model, installation);
      if (due === null) continue;
      ratio[d] = Math.log(value) - due.log;
      lasting_sd[d] = due.lasting_sd;
      theory_sd[d] = due.theory_sd;
    }
  }
  return any ? { observable, ratio, lasting_sd, theory_sd } : null;
}

/** Runs one observable's chart through the days, each decided by the days up to it. @param charts how many run side by side */
export function departuresOf(series: RatioSeries, models: readonly RegimeModel[], charts: number): Departure[] {
  const h = decisionInterval((charts * 365.25) / FALSE_ALARMS_PER_YEAR, ALLOWANCE);
  const { directions } = charted[series.observable];
  const found: Departure[] = [];
  for (const model of models) {
    const chart = new Cusum(ALLOWANCE, h);
    const recent: number[] = [];
    const seenAt: number[] = [];
    let held = 0;
    let gone = 0;
    let goneFrom = 0;
    let open: Departure | null = null;
    const afterSpan = model.regime.baseline.at(-1)!;
    for (let d = model.regime.first; d < model.regime.end; d++) {
      const ratio = series.ratio[d]!;
      if (Number.isNaN(ratio)) continue;
      seenAt.push(d);
      recent.push(ratio);
      if (recent.length > SIZE_DAYS) recent.shift();
      // a wild day counts as much as a bad one: one stuck sensor day must not set off the chart
      const z = Math.max(-4, Math.min(4, ratio / series.lasting_sd[d]!));
      const signal = chart.add(z);
      if (d <= afterSpan) continue;
      const size = median(recent);
      if (open === null) {
        const clear = Math.abs(size) >= limitOn(series, d) && Math.sign(size) === signal && Math.sign(ratio) === signal;
        held = signal !== 0 && directions.includes(signal) && clear ? held + 1 : 0;
        if (held < HELD_DAYS) continue;
        const direction = signal as -1 | 1;
        const back = Math.min(seenAt.length - 1, chart.runLength(direction) - 1);
        open = {
          observable: series.observable,
          direction,
          noticed: d,
          chartBegan: seenAt[seenAt.length - 1 - back]!,
          ended: null,
        };
        found.push(open);
        gone = 0;
      } else {
        const over = Math.abs(ratio) < limitOn(series, d) * 0.7 || Math.sign(ratio) !== open.direction;
        if (over && gone === 0) goneFrom = d;
        gone = over ? gone + 1 : 0;
        if (gone < HELD_DAYS) continue;
        open.ended = goneFrom;
        open = null;
        held = 0;
        chart.reset();
        recent.length = 0;
      }
    }
    // what was open when the ram was set up anew ended there
    if (open !== null && model.regime.end < series.ratio.length) open.ended = model.regime.end;
  }
  return found;
}

/** The size from which a departure is told: the observable's own limit, or twice its standard error on a day where that is more. */
const limitOn = ({ observable, lasting_sd, theory_sd }: RatioSeries, d: number): number =>
  Math.max(charted[observable].watch, 2.3 * Math.hypot(lasting_sd[d]! / Math.sqrt(SIZE_DAYS / 2), theory_sd[d]!));

/** A change is looked for this far back from the day it was noticed. */
const LOOK_BACK_DAYS = 150;
/** And with this many days after it, by which its shape has shown. */
const LOOK_AHEAD_DAYS = 30;

/**
 * When a departure began, from all the data: the day at which a level stretch followed by a ramp or by a step fits the log ratios best
 * in least squares. The level before is free, so that what the theory is off at this season's fall does not pull the day.
 */
export function beganOn(series: RatioSeries, departure: Departure, from: number): number {
  const until = Math.min(departure.ended ?? series.ratio.length, departure.noticed + LOOK_AHEAD_DAYS);
  const points: [number, number][] = [];
  for (let d = Math.max(from, departure.noticed - LOOK_BACK_DAYS); d < until; d++)
    if (!Number.isNaN(series.ratio[d]!)) points.push([d, series.ratio[d]!]);
  let best = { day: departure.chartBegan, explained: 0 };
  for (const [start] of points.slice(3)) {
    if (start > departure.noticed) break;
    for (const shape of [(d: number) => Math.max(0, d - start + 1), (d: number) => (d < start ? 0 : 1)]) {
      const { slope, explained } = regression(points.map(([d, ratio]) => [shape(d), ratio]));
      if (Math.sign(slope) === departure.direction && explained > best.explained) best = { day: start, explained };
    }
  }
  return best.day;
}

/** Slope of a straight line by least squares, and how much of the squares it explains. */
function regression(points: readonly (readonly [number, number])[]): { slope: number; explained: number } {
  const count = points.length;
  let meanX = 0;
  let meanY = 0;
  for (const [x, y] of points) {
    meanX += x / count;
    meanY += y / count;
  }
  let xx = 0;
  let xy = 0;
  for (const [x, y] of points) {
    xx += (x - meanX) ** 2;
    xy += (x - meanX) * (y - meanY);
  }
  return xx > 0 ? { slope: xy / xx, explained: (xy * xy) / xx } : { slope: 0, explained: 0 };
}
