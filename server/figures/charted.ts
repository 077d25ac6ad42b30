import type { DayFigures, SpanFigures } from '../shapes/figure';

/** The figures that the season charts draw, each as value, low, high, expected low, expected high in a day's float64 row. */
export const chartedFigures = ['fall_m', 'beats_per_min', 'delivery_l_per_day', 'efficiency_daubuisson'] as const;
export type ChartedFigure = (typeof chartedFigures)[number];

export const placeOf = (name: ChartedFigure): number => chartedFigures.indexOf(name) * 5;

export function chartedRow(figures: SpanFigures, expected: DayFigures['expected']): Float64Array {
  const row = new Float64Array(chartedFigures.length * 5).fill(Number.NaN);
  for (const name of chartedFigures) {
    const figure = figures[name];
    const due = name === 'beats_per_min' || name === 'delivery_l_per_day' ? expected[name] : undefined;
    if (figure !== null) row.set([figure.value, figure.low, figure.high], placeOf(name));
    if (due !== undefined) row.set([due.low, due.high], placeOf(name) + 3);
  }
  return row;
}
