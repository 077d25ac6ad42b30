import type { Figure } from '../server/shapes/figure';

const grouped = new Intl.NumberFormat('en', { maximumFractionDigits: 0, useGrouping: true });

/** A number as far as its interval carries it: two digits of the doubt. */
export function digitsFor(reach: number): number {
  if (!(reach > 0)) return 2;
  return Math.max(0, Math.min(3, 1 - Math.floor(Math.log10(reach))));
}

/** A value with thin groups from ten thousand on. */
export function shownNumber(value: number, digits: number): string {
  return digits === 0 && Math.abs(value) >= 10_000
    ? grouped.format(value).replaceAll(',', '\u202f')
    : value.toFixed(digits);
}

export interface ShownFigure {
  value: string;
  /** "± 4", or "low to high" where the interval is lopsided. */
  interval: string;
}

/** A figure for people, times a factor (100 for shares). */
export function shownFigure(figure: Figure, factor = 1): ShownFigure {
  const value = figure.value * factor;
  const low = figure.low * factor;
  const high = figure.high * factor;
  const reach = Math.max(high - value, value - low);
  // a big figure is not known to the unit
  const digits = Math.abs(value) >= 1000 ? 0 : digitsFor(reach);
  const lopsided = Math.abs(high - value - (value - low)) > 0.2 * reach;
  const least = 10 ** -digits;
  const interval = lopsided
    ? `${shownNumber(low, digits)} to ${shownNumber(high, digits)}`
    : reach < least
      ? `± less than ${shownNumber(least, digits)}`
      : `± ${shownNumber(reach, digits)}`;
  return { value: shownNumber(value, digits), interval };
}

export const share = (value: number): string => `${Math.round(value * 100)} %`;

/** A relative change as people say it: "12 % less", "3.6 times". */
export function change(value: number): string {
  if (value >= 0.95) return `${(1 + value).toFixed(1)} times`;
  return `${Math.round(Math.abs(value) * 100)} % ${value < 0 ? 'less' : 'more'}`;
}
