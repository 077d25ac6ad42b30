import type { SeasonCharts } from '../../server/shapes/series';

export const chartedNames = ['fall_m', 'beats_per_min', 'delivery_l_per_day', 'efficiency_daubuisson'] as const;
export type ChartedName = (typeof chartedNames)[number];

export const chartTitle: Record<ChartedName, string> = {
  fall_m: 'Fall, m',
  beats_per_min: 'Beats per minute',
  delivery_l_per_day: 'Delivery, L/day',
  efficiency_daubuisson: "Efficiency (D'Aubuisson), %",
};

export interface DrawnPoint {
  x: number;
  y: number | null;
}

export interface DrawnFigure {
  mean: DrawnPoint[];
  /** The day's own interval, or least and greatest day of a bucket where a bucket is longer than a day. */
  low: DrawnPoint[];
  high: DrawnPoint[];
  expectedLow: DrawnPoint[];
  expectedHigh: DrawnPoint[];
}

const factor = (name: ChartedName): number => (name === 'efficiency_daubuisson' ? 100 : 1);

/** One figure of the season as the chart library draws it, without copying the times into text. */
export function drawn(season: SeasonCharts, name: ChartedName): DrawnFigure {
  const figure = season[name];
  const times = factor(name);
  const points = (values: (number | null)[]): DrawnPoint[] =>
    season.at_ms.map((x, i) => ({ x, y: values[i] == null ? null : values[i]! * times }));
  const buckets = season.days_per_bucket > 1;
  return {
    mean: points(figure.mean),
    low: points(buckets ? figure.min : figure.low),
    high: points(buckets ? figure.max : figure.high),
    expectedLow: points(figure.expected_low),
    expectedHigh: points(figure.expected_high),
  };
}

export interface Window {
  from: number;
  to: number;
}

const DAY_MS = 86_400_000;

/** The window moved or stretched by a button, kept within the record. */
export function moved(window: Window, whole: Window, how: 'earlier' | 'later' | 'closer' | 'wider'): Window {
  const length = window.to - window.from;
  const middle = (window.to + window.from) / 2;
  if (how === 'earlier' || how === 'later') {
    const step = Math.min(length / 2, how === 'earlier' ? window.from - whole.from : whole.to - window.to);
    return {
      from: window.from + (how === 'earlier' ? -step : step),
      to: window.to + (how === 'earlier' ? -step : step),
    };
  }
  const half = Math.max(3.5 * DAY_MS, (length * (how === 'closer' ? 0.5 : 2)) / 2);
  return { from: Math.max(whole.from, middle - half), to: Math.min(whole.to, middle + half) };
}

/** The last days of the record, or all of it. */
export const lastDays = (whole: Window, days: number): Window => ({
  from: Math.max(whole.from, whole.to - days * DAY_MS),
  to: whole.to,
});
