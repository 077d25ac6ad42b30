import { expect, test } from 'vitest';
import { accuracyOf, unitChange } from '../../server/figures/sensors';
import { installation } from '../../server/shapes/installation';

const ram = (sensors: object[], more: object = {}) =>
  installation.parse({
    name: 'Test',
    time_zone: 'UTC',
    fall_m: 3,
    lift_m: 30,
    drive_pipe: { length_m: 20, bore_mm: 50 },
    sensors,
    ...more,
  });
const at = (change: { scale: number; offset: number }, value: number) => value * change.scale + change.offset;

test("a file's own unit wins over the sensor's, and the sensor's offset keeps the sensor's unit", () => {
  const bar = ram([{ channel: 'chamber_pressure', unit: 'bar', offset: 0.1 }]);
  expect(at(unitChange(bar, 'chamber_pressure', 'bar'), 2.5)).toBeCloseTo(260, 9);
  expect(at(unitChange(bar, 'chamber_pressure', 'kPa'), 250)).toBeCloseTo(260, 9);
});

// Source: 1 m of water at 998.2 kg/m³ is 9.789 kPa (computed from Tanaka 2001 and standard gravity).
test('a level taken by a pressure sensor becomes metres of water at its temperature', () => {
  const submerged = ram([{ channel: 'tank_level' }], { water_temperature_c: 20 });
  expect(at(unitChange(submerged, 'tank_level', 'kPa'), 9.789)).toBeCloseTo(1, 4);
});

// Source: US Standard Atmosphere 1976 (from memory): 79.495 kPa at 2000 m.
test('an absolute sensor is brought to gauge at the altitude of the ram', () => {
  const high = ram([{ channel: 'chamber_pressure', unit: 'kPa', reference: 'absolute' }], { altitude_m: 2000 });
  expect(at(unitChange(high, 'chamber_pressure', 'kPa'), 379.495)).toBeCloseTo(300, 2);
});

test('pulses of a meter count for as many litres as the sensor says', () => {
  const pulses = ram([{ channel: 'delivery_volume', unit: 'L', scale: 10 }]);
  expect(at(unitChange(pulses, 'delivery_volume', 'count'), 7)).toBeCloseTo(70, 9);
});

test('an accuracy in the unit of the sensor is understood in the unit of the channel', () => {
  expect(accuracyOf(ram([{ channel: 'tank_level', unit: 'cm', accuracy: 1 }]), 'tank_level', 1)).toBeCloseTo(0.01, 9);
  expect(accuracyOf(ram([]), 'tank_level', 1)).toBeCloseTo(0.01, 9);
});
