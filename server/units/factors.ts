/*
 * Units by dimension with their exact factors to one base unit each. Sources: the SI Brochure, 9th ed. (2019), and NIST Special
 * Publication 811 (2008), appendix B, from memory; every factor is exact by definition except where it says otherwise.
 */

const inch = 0.0254;
const foot = 0.3048;
/** International yard and pound agreement, 1959: pound 0.45359237 kg; standard gravity 9.80665 m/s². Exact, rounded only as a double. */
const poundForce = 0.45359237 * 9.80665;
/** US liquid gallon: 231 cubic inches. */
const gallon_l = 231 * inch ** 3 * 1000;
/** Imperial gallon: 4.54609 L (UK Weights and Measures Act 1985). */
const imperialGallon_l = 4.54609;
const cubicFoot_l = foot ** 3 * 1000;
/** Conventional metre of water, 1000 kg/m³ at standard gravity (NIST SP 811, "meter of water, conventional"). */
const metreOfWater = 9806.65;
/** Conventional millimetre of mercury, 13,595.1 kg/m³ at standard gravity (NIST SP 811). */
const millimetreOfMercury = 13_595.1 * 9.80665 * 0.001;

const minute = 60;
const hour = 3600;
const day = 86_400;

/** Size of each unit in the first unit of its dimension: Pa, m, L/s, L, V, mA, count, 1/min, s. Temperature has a table of its own. */
export const factors = {
  pressure: {
    Pa: 1,
    hPa: 100,
    kPa: 1000,
    mbar: 100,
    bar: 100_000,
    MPa: 1_000_000,
    // kilogram-force per square centimetre, as on many dials
    'kgf/cm2': 98_066.5,
    psi: poundForce / inch ** 2,
    mH2O: metreOfWater,
    cmH2O: metreOfWater / 100,
    ftH2O: metreOfWater * foot,
    mmHg: millimetreOfMercury,
    inHg: millimetreOfMercury * 25.4,
  },
  length: { m: 1, cm: 0.01, mm: 0.001, ft: foot, in: inch },
  flow: {
    'L/s': 1,
    'L/min': 1 / minute,
    'L/h': 1 / hour,
    'L/d': 1 / day,
    'm3/s': 1000,
    'm3/h': 1000 / hour,
    'm3/d': 1000 / day,
    gpm: gallon_l / minute,
    gph: gallon_l / hour,
    gpd: gallon_l / day,
    impgpm: imperialGallon_l / minute,
  },
  volume: { L: 1, mL: 0.001, m3: 1000, gal: gallon_l, impgal: imperialGallon_l, ft3: cubicFoot_l },
  voltage: { V: 1, mV: 0.001 },
  current: { mA: 1 },
  count: { count: 1 },
  rate: { '1/min': 1, '1/s': 60, '1/h': 1 / 60 },
  time: { s: 1, ms: 0.001, min: minute, h: hour, d: day },
} as const;

/** Temperatures as kelvin = value × scale + offset. °F after NIST SP 811: K = (°F + 459.67)/1.8. */
export const temperatures = {
  K: { scale: 1, offset: 0 },
  degC: { scale: 1, offset: 273.15 },
  degF: { scale: 1 / 1.8, offset: 459.67 / 1.8 },
} as const;

type Linear = typeof factors;

/** What a unit measures. */
export type Dimension = keyof Linear | 'temperature';

/** The units of the program, as they are stored and printed. `gal`, `gpm`, `gph` and `gpd` are of the US liquid gallon. */
export type UnitName = { [D in keyof Linear]: keyof Linear[D] }[keyof Linear] | keyof typeof temperatures;
