import { expect, test } from 'vitest';
import { airVolume_l, chamberRipple_kpa, compressedAir_l, storedPerBeat_l } from '../../server/hydraulics/air-chamber';

const AIR_KPA = 101.325;
/** Absolute pressure under 15 and 30 m of water of 998.2 kg/m³. */
const AT_15_M = AIR_KPA + 15 * 9.788998;
const AT_30_M = AIR_KPA + 30 * 9.788998;

test('air brought from the open to a working pressure', () => {
  // Source: computed, Boyle's law and the polytropic law
  expect(compressedAir_l(10, AIR_KPA, AIR_KPA + 150)).toBeCloseTo(4.031632, 5);
  expect(compressedAir_l(10, AIR_KPA, AIR_KPA + 300)).toBeCloseTo(2.52476, 5);
  expect(compressedAir_l(10, AIR_KPA, AIR_KPA + 300, 1.2)).toBeCloseTo(3.17578, 4);
});

test.each([
  // Source: computed, p·((V/(V − ΔV))^n − 1); air, stored water, pressure, exponent, ripple in kPa
  [6, 0.14, AT_15_M, 1.2, 7.131],
  [6, 0.14, AT_15_M, 1.0, 5.929],
  [6, 0.14, AT_15_M, 1.4, 8.34],
  [0.6, 0.14, AT_15_M, 1.2, 93.19],
  [2, 0.05, AT_30_M, 1.2, 12.185],
])(
  '%f L of air that takes %f L at %f kPa, exponent %f, ripples by %f kPa',
  (air_l, stored_l, absolute_kpa, exponent, ripple) => {
    const computed = chamberRipple_kpa({ air_l, stored_l, absolute_kpa, exponent })!;
    expect(Math.abs(computed / ripple - 1)).toBeLessThan(2e-4);
    expect(airVolume_l({ ripple_kpa: computed, stored_l, absolute_kpa, exponent })).toBeCloseTo(air_l, 9);
  },
);

test('the ripple of a modelled ram gives its air back', () => {
  // Source: computed by a time-stepping model of the worked ram: 5.91 L of air, ripple 0.65 m of water at 15.49 m, 72 beats a minute
  const stored_l = storedPerBeat_l((60 * 0.17) / 72, 0.11747, 60 / 72);
  const ripple_kpa = 0.65 * 9.788998;
  const mean_kpa = AIR_KPA + 15.49 * 9.788998;
  const air = airVolume_l({ ripple_kpa, stored_l, absolute_kpa: mean_kpa - ripple_kpa / 2 });
  expect(Math.abs(air / 5.91 - 1)).toBeLessThan(0.05);
});
