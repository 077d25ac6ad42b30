import { expect, test } from 'vitest';
import { standardAtmosphere_kpa } from '../../server/hydraulics/atmosphere';
import { gaugeOfAbsolute_kpa, headOfPressure_m, pressureOfHead_kpa } from '../../server/hydraulics/heads';
import { soundSpeed, waterDensity } from '../../server/hydraulics/water';

test.each([
  // Density: Tanaka et al. 2001 (from memory), and beside it IAPWS-IF97 computed from a release verified by its own check values.
  // Sound: Marczak 1997 (from memory), and IAPWS-IF97 likewise.
  [0, 999.843, 999.844, 1402.39, 1402.44],
  [5, 999.967, 999.967, 1426.17, 1426.19],
  [10, 999.703, 999.702, 1447.29, 1447.55],
  [15, 999.103, 999.101, 1465.96, 1466.59],
  [20, 998.207, 998.206, 1482.38, 1483.42],
  [25, 997.047, 997.048, 1496.73, 1498.17],
  [30, 995.649, 995.652, 1509.17, 1510.98],
  [35, 994.033, 994.039, 1519.85, 1521.98],
  [40, 992.215, 992.224, 1528.89, 1531.3],
])('water at %i °C', (temperature, tanaka, if97Density, marczak, if97Sound) => {
  expect(Math.abs(waterDensity(temperature) - tanaka)).toBeLessThan(6e-4);
  expect(Math.abs(waterDensity(temperature) / if97Density - 1)).toBeLessThan(1.2e-5);
  expect(Math.abs(soundSpeed(temperature) - marczak)).toBeLessThan(6e-3);
  expect(Math.abs(soundSpeed(temperature) / if97Sound - 1)).toBeLessThan(0.002);
});

test('hot water stays within a thousandth of the steam tables', () => {
  // From memory: 965.3 kg/m³ at 90 °C in any steam table
  expect(Math.abs(waterDensity(90) / 965.3 - 1)).toBeLessThan(1e-3);
});

test.each([
  // US Standard Atmosphere 1976 (from memory), m and Pa
  [0, 101_325],
  [500, 95_460.8],
  [1000, 89_874.6],
  [1500, 84_556.0],
  [2000, 79_495.2],
  [2500, 74_682.5],
  [3000, 70_108.5],
  [4000, 61_640.2],
])('the standard atmosphere at %i m', (altitude, pascals) => {
  expect(Math.abs((standardAtmosphere_kpa(altitude) * 1000) / pascals - 1)).toBeLessThan(1e-5);
});

test('a metre of water at 20 °C, and a logger at 1500 m that reads absolute', () => {
  // Source: computed from 998.2 kg/m³ and standard gravity: 9.788998 kPa; 100 kPa is 10.21555 m
  expect(pressureOfHead_kpa(1, 998.2)).toBeCloseTo(9.788998, 6);
  expect(headOfPressure_m(100, 998.2)).toBeCloseTo(10.21555, 5);
  // Source: computed: read as gauge it would be off by 8.64 m
  const air = standardAtmosphere_kpa(1500);
  expect(headOfPressure_m(air, 998.2)).toBeCloseTo(8.638, 3);
  expect(headOfPressure_m(gaugeOfAbsolute_kpa(air + 9.788998, air), 998.2)).toBeCloseTo(1, 6);
});
