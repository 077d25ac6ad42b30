import { expect, test } from 'vitest';
import { convert, type UnitName } from '../../server/units/units';

test.each<[number, UnitName, number, UnitName, number]>([
  // Source: NIST Special Publication 811 (2008), appendix B.8 (from memory); last column is the relative tolerance of the printed digits
  [1, 'psi', 6894.757, 'Pa', 1e-7],
  [1, 'bar', 100, 'kPa', 1e-15],
  [1, 'mbar', 1, 'hPa', 1e-15],
  [1, 'mmHg', 133.3224, 'Pa', 1e-6],
  [1, 'inHg', 3.386389, 'kPa', 1e-6],
  [1, 'mH2O', 9.80665, 'kPa', 1e-14],
  [1, 'ftH2O', 2.989067, 'kPa', 1e-6],
  [1, 'kgf/cm2', 98.0665, 'kPa', 1e-14],
  // Source: a slip seen on a forum, 300 000 psi as 6.07 GPa; computed 2.0684 GPa
  [300_000, 'psi', 2068.4, 'MPa', 1e-4],
  [1, 'ft', 0.3048, 'm', 1e-14],
  [1, 'in', 25.4, 'mm', 1e-14],
  [1, 'gal', 3.785411784, 'L', 1e-14],
  [1, 'impgal', 4.54609, 'L', 1e-14],
  [1, 'ft3', 28.316846592, 'L', 1e-14],
  [1, 'gpm', 6.30902e-2, 'L/s', 1e-6],
  [10, 'gpm', 37.854, 'L/min', 1e-5],
  [1, 'm3/h', 1000 / 3600, 'L/s', 1e-14],
  [1, 'L/d', 1 / 86_400, 'L/s', 1e-14],
  [212, 'degF', 100, 'degC', 1e-12],
  [-40, 'degF', -40, 'degC', 1e-12],
  [0, 'degC', 273.15, 'K', 1e-14],
  [1, '1/s', 60, '1/min', 1e-14],
])('%f %s are %f %s', (value, from, expected, to, tolerance) => {
  expect(Math.abs(convert(value, from, to) / expected - 1)).toBeLessThanOrEqual(tolerance);
});
