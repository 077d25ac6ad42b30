/*
 * How loggers and people write units. A text is folded first (superscripts, degree signs, brackets, dots, "per", exponents of −1),
 * then looked up whole, then taken apart as something per time. Common practice, no source.
 */
import type { UnitName } from './factors';

const words = (unit: UnitName, spellings: string): [string, UnitName][] =>
  spellings.split(' ').map((spelling) => [spelling, unit]);

const pressures = new Map<string, UnitName>([
  ...words('Pa', 'pa pascal pascals n/m2'),
  ...words('hPa', 'hpa hectopascal hectopascals'),
  ...words('kPa', 'kpa kilopascal kilopascals'),
  ...words('MPa', 'mpa megapascal megapascals'),
  ...words('mbar', 'mbar mbars mb millibar millibars'),
  ...words('bar', 'bar bars'),
  ...words('psi', 'psi lb/in2 lbs/in2 lbf/in2 lb/sqin lbs/sqin lbf/sqin'),
  ...words('kgf/cm2', 'kgf/cm2 kg/cm2 kgf/sqcm kg/sqcm ksc'),
  ...words(
    'mH2O',
    'mh2o mwc mwg mws mce mca mwater mofwater mhead metresofwater metersofwater metreswater meterswater',
  ),
  ...words('cmH2O', 'cmh2o cmwc cmwg cmws cmwater cmofwater'),
  ...words('ftH2O', 'fth2o ftwc ftwg ftwater ftofwater fthead feetofwater feetwater feethead'),
  ...words('mmHg', 'mmhg torr'),
  ...words('inHg', 'inhg'),
]);

const others = new Map<string, UnitName>([
  ...words('m', 'm metre meter metres meters mtr mtrs'),
  ...words('cm', 'cm centimetre centimeter centimetres centimeters'),
  ...words('mm', 'mm millimetre millimeter millimetres millimeters'),
  ...words('ft', "ft foot feet '"),
  ...words('in', 'in inch inches "'),
  ...words('degC', 'c degc degreec degreesc celsius degcelsius degreescelsius centigrade oc'),
  ...words('degF', 'f degf degreef degreesf fahrenheit degfahrenheit degreesfahrenheit of'),
  ...words('K', 'kelvin degk'),
  ...words('V', 'v volt volts vdc voltsdc'),
  ...words('mV', 'mv millivolt millivolts mvdc'),
  ...words('mA', 'ma milliamp milliamps milliampere milliamperes'),
  ...words('L/s', 'lps'),
  ...words('L/min', 'lpm'),
  ...words('L/h', 'lph'),
  ...words('L/d', 'lpd'),
  ...words('m3/s', 'cumec cumecs cms'),
  ...words('m3/h', 'cmh'),
  ...words('m3/d', 'cmd'),
  ...words('gpm', 'gpm'),
  ...words('gph', 'gph'),
  ...words('gpd', 'gpd'),
  ...words('1/min', 'bpm spm cpm rpm'),
  ...words('1/s', 'hz hertz'),
]);

const volumes = new Map<string, UnitName>([
  ...words('L', 'l lit lits litre litres liter liters ltr ltrs dm3'),
  ...words('mL', 'ml millilitre millilitres milliliter milliliters cm3 cc'),
  ...words(
    'm3',
    'm3 cum cubicm cubicmetre cubicmetres cubicmeter cubicmeters cbm kl kilolitre kilolitres kiloliter kiloliters',
  ),
  ...words('gal', 'gal gals gallon gallons'),
  ...words('ft3', 'ft3 cuft cf cubicft cubicfoot cubicfeet'),
]);

const times = new Map<string, UnitName>([
  ...words('s', 's sec secs second seconds'),
  ...words('ms', 'ms msec millisecond milliseconds'),
  ...words('min', 'min mins mn minute minutes'),
  ...words('h', 'h hr hrs hour hours'),
  ...words('d', 'd day days dy 24h'),
]);

const counts = new Set(
  'count counts cnt cnts cts beat beats stroke strokes cycle cycles pulse pulses impulse impulses tick ticks #'.split(
    ' ',
  ),
);

const perTime: Record<string, UnitName | undefined> = {
  'L/s': 'L/s',
  'L/min': 'L/min',
  'L/h': 'L/h',
  'L/d': 'L/d',
  'm3/s': 'm3/s',
  'm3/h': 'm3/h',
  'm3/d': 'm3/d',
  'gal/min': 'gpm',
  'gal/h': 'gph',
  'gal/d': 'gpd',
  'count/s': '1/s',
  'count/min': '1/min',
  'count/h': '1/h',
};

const imperial: Partial<Record<UnitName, UnitName>> = { gal: 'impgal', gpm: 'impgpm' };

/** The unit a text means, or null where it means none of the program's. */
export function unitSpelled(text: string): UnitName | null {
  const written = text.normalize('NFKC').trim();
  // a megalitre is no millilitre, and a lone small k is no kelvin
  if (/^\W*ML\b/.test(written)) return null;
  if (/^\W*K\W*$/.test(written)) return 'K';
  const folded = fold(written);
  return plain(folded) ?? ofGauge(folded) ?? ofGallons(folded);
}

function fold(written: string): string {
  return (
    written
      .toLowerCase()
      .replace(/\bimperial\b/g, 'imp')
      .replace(/\bper\b/g, '/')
      .replace(/[\u2018\u2019\u2032]/g, "'")
      .replace(/[\u201c\u201d\u2033]|''/g, '"')
      .replace(/\u2212/g, '-')
      .replace(/[\u2044\u2215]/g, '/')
      // a degree sign, also where a wrong encoding has left its traces
      .replace(/[°\u00c2\u00e2\ufffd]/g, '')
      .replace(/[\s_.,·*^()[\]{}:;|]/g, '')
      .replace(/(min|sec|s|hr|h|day|d)-1$/, '/$1')
  );
}

function plain(folded: string): UnitName | null {
  const whole = pressures.get(folded) ?? others.get(folded) ?? volumes.get(folded) ?? times.get(folded);
  if (whole !== undefined) return whole;
  if (counts.has(folded)) return 'count';
  const slash = folded.indexOf('/');
  if (slash < 0) return null;
  const above = folded.slice(0, slash);
  const time = times.get(folded.slice(slash + 1));
  const amount = above === '' || above === '1' || counts.has(above) ? 'count' : volumes.get(above);
  return perTime[`${amount}/${time}`] ?? null;
}

/** Pressures said to be gauge or absolute, such as psig, bar(a), kPa abs. Which of the two is the sensor's to state. */
function ofGauge(folded: string): UnitName | null {
  const bare = folded.replace(/(gauge|gage|absolute|abs|g|a)$/, '');
  return bare === folded ? null : (pressures.get(bare) ?? null);
}

/** Gallons with their country. Without one they are US gallons. */
function ofGallons(folded: string): UnitName | null {
  const isImperial = /imp|uk|^ig/.test(folded);
  const unit = plain(folded.replace(/imp|uk|us|liquid|liq/g, '').replace(/^ig/, 'g'));
  if (unit === null || !['gal', 'gpm', 'gph', 'gpd'].includes(unit)) return null;
  return isImperial ? (imperial[unit] ?? null) : unit;
}
