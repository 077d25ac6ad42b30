import fc from 'fast-check';
import { expect, test } from 'vitest';
import { airVolume_l, chamberRipple_kpa, compressedAir_l, storedPerBeat_l } from '../../server/hydraulics/air-chamber';
import { standardAtmosphere_kpa } from '../../server/hydraulics/atmosphere';
import { gaugeOfAbsolute_kpa, headOfPressure_m, pressureOfHead_kpa } from '../../server/hydraulics/heads';
import { darcyFrictionFactor, frictionHead_m } from '../../server/hydraulics/pipe-friction';
import { pipeModuli, pipeRoughness_mm } from '../../server/hydraulics/pipe-materials';
import { joukowskyPressure_pa, waveSpeed } from '../../server/hydraulics/surge';
import { soundSpeed, waterDensity } from '../../server/hydraulics/water';
import { vNotchFlow_lps, vNotchHead_m } from '../../server/hydraulics/weir';
import { pipeMaterial } from '../../server/shapes/installation';

const pipe = { bulk_modulus_pa: 2.2e9, density_kg_per_m3: 998, bore_mm: 50, wall_mm: 3, young_pa: 2e11, poisson: 0.3 };
const beat = { stored_l: 0.1, absolute_kpa: 250 };

test.each<[string, () => unknown]>([
  ['a water temperature of -5 °C', () => waterDensity(-5)],
  ['a water temperature of NaN °C', () => soundSpeed(Number.NaN)],
  ['an altitude of 20000 m', () => standardAtmosphere_kpa(20_000)],
  ['a density of 0 kg/m³', () => headOfPressure_m(10, 0)],
  ['a head of NaN m', () => pressureOfHead_kpa(Number.NaN, 998)],
  ['an absolute pressure of -1 kPa', () => gaugeOfAbsolute_kpa(-1, 100)],
  ['a head over the weir of -0.1 m', () => vNotchFlow_lps(-0.1, 90)],
  ['a notch of 150 degrees', () => vNotchFlow_lps(0.1, 150)],
  ['a bore of -50 mm', () => waveSpeed({ ...pipe, bore_mm: -50 })],
  ['a wall of 0 mm', () => waveSpeed({ ...pipe, wall_mm: 0 })],
  ["a Poisson's ratio of 0.7", () => waveSpeed({ ...pipe, poisson: 0.7 })],
  ["a Young's modulus of 0 Pa", () => waveSpeed({ ...pipe, young_pa: 0 })],
  [
    'a velocity change of -1 m/s',
    () => joukowskyPressure_pa({ density_kg_per_m3: 998, wave_speed_m_per_s: 1300, velocity_change_m_per_s: -1 }),
  ],
  ['an air volume of 0 L', () => chamberRipple_kpa({ ...beat, air_l: 0 })],
  ['a ripple of 0 kPa', () => airVolume_l({ ...beat, ripple_kpa: 0 })],
  ['an exponent of 2', () => compressedAir_l(5, 100, 200, 2)],
  ['a period of 0.1 s', () => storedPerBeat_l(0.15, 0.2, 0.1)],
  ['a bore of 0 mm', () => frictionHead_m({ length_m: 10, bore_mm: 0, flow_lps: 1, roughness_mm: 0.1 })],
  ['a flow of -1 L/s', () => frictionHead_m({ length_m: 10, bore_mm: 20, flow_lps: -1, roughness_mm: 0.1 })],
  ['a Reynolds number of 0', () => darcyFrictionFactor(0, 0.001)],
])('%s is refused', (sentence, attempt) => {
  expect(attempt).toThrow(RangeError);
  expect(attempt).toThrow(sentence);
});

test('a chamber without more air than a beat brings water has no ripple to speak of', () => {
  expect(chamberRipple_kpa({ ...beat, air_l: 0.1 })).toBeNull();
});

test('nothing flowing loses no head, no head over a weir is no flow', () => {
  expect(frictionHead_m({ length_m: 10, bore_mm: 20, flow_lps: 0, roughness_mm: 0.1 })).toBe(0);
  expect(vNotchFlow_lps(0, 90)).toBe(0);
  expect(vNotchHead_m(0, 90)).toBe(0);
});

test('a flow over any notch gives its head back, and more head is more flow', () => {
  const head = fc.double({ min: 0.001, max: 1, noNaN: true });
  fc.assert(
    fc.property(head, fc.double({ min: 20, max: 100, noNaN: true }), (head, notch) => {
      const flow = vNotchFlow_lps(head, notch);
      expect(vNotchHead_m(flow, notch)).toBeCloseTo(head, 9);
      expect(vNotchFlow_lps(head * 1.01, notch)).toBeGreaterThan(flow);
    }),
  );
});

test('no pipe of any material carries waves faster than its water', () => {
  for (const material of pipeMaterial.options) {
    for (const restraint of ['anchored throughout', 'anchored upstream', 'expansion joints'] as const) {
      const speed = waveSpeed({ ...pipe, ...pipeModuli(material), restraint });
      expect(speed).toBeLessThan(Math.sqrt(2.2e9 / 998));
      expect(speed).toBeGreaterThan(100);
      // a wall that thins comes to the thin-walled form
      const foil = { ...pipe, ...pipeModuli(material), wall_mm: 0.001, restraint };
      expect(waveSpeed(foil) / waveSpeed({ ...foil, wall: 'thin' })).toBeCloseTo(1, 3);
    }
    expect(pipeRoughness_mm(material)).toBeGreaterThan(0);
  }
});
