import fc from 'fast-check';
import { expect, test } from 'vitest';
import { factors, temperatures } from '../../server/units/factors';
import { convert, converter, dimensionOf, parseUnit, type UnitName } from '../../server/units/units';

const byDimension = [...Object.values(factors), temperatures].map((sizes) => Object.keys(sizes) as UnitName[]);
const pairs = byDimension.flatMap((names) => names.flatMap((a) => names.map((b) => [a, b] as const)));

test('every unit goes to every other of its kind and back', () => {
  fc.assert(
    fc.property(fc.constantFrom(...pairs), fc.double({ min: -1e6, max: 1e6, noNaN: true }), ([from, to], value) => {
      const back = convert(convert(value, from, to), to, from);
      expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(value)));
    }),
  );
});

test('every name of a unit is read as itself', () => {
  for (const name of byDimension.flat()) expect(parseUnit(name)).toBe(name);
});

test('a line for whole columns says the same as single values', () => {
  const { scale, offset } = converter('degF', 'degC');
  expect(50 * scale + offset).toBeCloseTo(convert(50, 'degF', 'degC'), 12);
  expect(converter('kPa', 'kPa')).toEqual({ scale: 1, offset: 0 });
  expect(convert(Number.NaN, 'kPa', 'bar')).toBeNaN();
});

test('a height becomes no pressure without a density', () => {
  expect(() => convert(1, 'm', 'kPa')).toThrow(/m \(length\) cannot become kPa \(pressure\)/);
  expect(dimensionOf('mH2O')).toBe('pressure');
  expect(() => dimensionOf('furlong' as UnitName)).toThrow(/"furlong" is not a unit/);
});

const spellings: Record<string, UnitName> = {};
const spelled = (unit: UnitName, ...texts: string[]) => {
  for (const text of texts) spellings[text] = unit;
};
spelled('kPa', 'kPa', 'KPA', ' kpa ', '[kPa]', 'kPa abs', 'kPa (gauge)', 'kPa(g)', 'kPa, abs.', 'kilopascals');
spelled('mbar', 'mbar', 'MBAR', 'mb', 'millibar', 'mbara');
spelled('hPa', 'hPa', 'HPA');
spelled('bar', 'bar', 'Bar', 'bar(g)', 'bar a', 'BARG');
spelled('psi', 'psi', 'PSI', 'PSIG', 'psia', 'lbf/in²', 'lb/sq in');
spelled('MPa', 'MPa');
spelled('kgf/cm2', 'kg/cm²', 'kgf/cm2');
spelled('mH2O', 'mH2O', 'm H2O', 'mH₂O', 'm WC', 'mwc', 'mWC', 'm.w.c.', 'm of water', 'metres of water', 'mca', 'mWS');
spelled('cmH2O', 'cmH2O', 'cm WC');
spelled('ftH2O', 'ftH2O', 'ft of water', 'feet of water', 'ft WC');
spelled('mmHg', 'mmHg', 'mm Hg', 'torr');
spelled('m', 'm', 'M', '(m)', 'metres', 'Meters', 'mtr');
spelled('cm', 'cm', 'CM');
spelled('mm', 'mm');
spelled('ft', 'ft', 'feet', "'", '\u2032');
spelled('in', 'in', 'in.', 'inches', '"', '\u2033');
spelled('L/s', 'L/s', 'l/s', 'L s⁻¹', 'l·s-1', 'L/sec', 'lps', 'LPS', 'litres per second', 'ltr/s', 'ℓ/s');
spelled('L/min', 'L/min', 'l/mn', 'LPM', 'lpm', 'liters/minute', 'Lit/min', 'L min^-1');
spelled('L/h', 'L/h', 'l/hr', 'litres/hour', 'lph');
spelled('L/d', 'L/d', 'L/day', 'litres per day', 'L/24h');
spelled('m3/h', 'm³/h', 'm3/hr', 'M3/H', 'm^3/h', 'cu m/hr', 'm3.h-1', 'cubic metres per hour');
spelled('m3/d', 'm³/day', 'm3/d');
spelled('m3/s', 'm3/s', 'cumecs');
spelled('gpm', 'gpm', 'GPM', 'gal/min', 'US gpm', 'gpm (US)', 'gallons per minute', 'US gal/min');
spelled('gpd', 'gal/day', 'gallons per day');
spelled('impgpm', 'imp gpm', 'gpm (imp)', 'igpm', 'imp. gal/min', 'UK gal/min', 'Imperial gallons per minute');
spelled('L', 'L', 'l', 'litres', 'liters', 'Ltr');
spelled('mL', 'mL', 'ml', 'cc');
spelled('m3', 'm3', 'm³', 'm^3', 'cu m', 'cu. m', 'cubic meters', 'kL', 'M3');
spelled('gal', 'gal', 'gallons', 'US gal', 'gal (US)', 'US liquid gallons');
spelled('impgal', 'imp gal', 'UK gal', 'gal (UK)', 'imperial gallons');
spelled('ft3', 'ft3', 'cu ft', 'ft³', 'cubic feet');
spelled('degC', '°C', '℃', 'ºC', 'deg C', 'degC', 'Deg. C', 'degrees C', 'C', 'oC', 'Celsius', 'Â°C', '\ufffdC');
spelled('degF', '°F', 'deg F', 'F', '℉');
spelled('K', 'K', 'kelvin');
spelled('V', 'V', 'v', 'volts', 'VDC', 'V DC');
spelled('mV', 'mV', 'MV');
spelled('mA', 'mA', 'MA', 'ma');
spelled('count', 'count', 'counts', 'cnt', 'beats', 'pulses', '#', 'strokes');
spelled(
  '1/min',
  '1/min',
  '/min',
  'min-1',
  'min⁻¹',
  'beats/min',
  'bpm',
  'BPM',
  'beats per minute',
  'strokes/min',
  'rpm',
);
spelled('1/s', 'Hz', '1/s', 's-1');
spelled('1/h', 'beats/h', 'pulses per hour');
spelled('s', 's', 'sec', 'seconds');
spelled('min', 'min', 'minutes');
spelled('h', 'h', 'hours', 'hrs');
spelled('d', 'd', 'days');

test.each(Object.entries(spellings))('"%s" is read as %s', (text, unit) => {
  expect(parseUnit(text)).toBe(unit);
});

test.each([
  '',
  ' ',
  '-',
  'ML',
  'ML/d',
  'k',
  'l/m',
  'kPa/s',
  'm/s',
  'Pressure',
  '%',
  'constructor',
  'no',
  'gal/fortnight',
  '()',
  '/',
])('"%s" is no unit of the program', (text) => {
  expect(parseUnit(text)).toBeNull();
});

test('no text upsets the reader', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary' }), (text) => {
      const unit = parseUnit(text);
      if (unit !== null) expect(byDimension.flat()).toContain(unit);
    }),
  );
});
