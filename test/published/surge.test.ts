import { expect, test } from 'vitest';
import type { PipeModuli } from '../../server/hydraulics/pipe-materials';
import { pipeModuli } from '../../server/hydraulics/pipe-materials';
import {
  joukowskyPressure_pa,
  reflectionTime_s,
  slowClosurePressure_pa,
  waveSpeed,
} from '../../server/hydraulics/surge';

const thin = { wall: 'thin', restraint: 'expansion joints', poisson: 0.3 } as const;

test('a thick steel main, anchored throughout', () => {
  // Source: inputs of a published surge script (PfeifferNick/RapidVarFlow_classExamples, Pump_simulation.m); result computed
  const main = { bulk_modulus_pa: 2.05e9, density_kg_per_m3: 1000, bore_mm: 600, wall_mm: 12, young_pa: 210e9 };
  expect(waveSpeed({ ...main, poisson: 0.3, restraint: 'anchored throughout', wall: 'thick' })).toBeCloseTo(
    1184.611,
    3,
  );
});

test('a rigid pipe carries waves at the speed of sound in the water', () => {
  // Source: a surge analysis manual quotes 4716 ft/s, about 1438 m/s; computed 1438.749
  const rigid = { bulk_modulus_pa: 2.07e9, density_kg_per_m3: 1000, bore_mm: 300, wall_mm: 10 };
  expect(waveSpeed({ ...rigid, ...thin, young_pa: Number.POSITIVE_INFINITY })).toBeCloseTo(1438.749, 3);
  // Source: computed, same water in a thin steel pipe
  expect(waveSpeed({ ...rigid, ...thin, young_pa: 200e9 })).toBeCloseTo(1256.801, 3);
});

test('an oil line: wave speed, the velocity that makes 600 kPa, and its ringing', () => {
  // Source: problem as posed on tutorsglobe; result computed
  const oil = { bulk_modulus_pa: 1.5e9, density_kg_per_m3: 860, bore_mm: 50, wall_mm: 5, young_pa: 200e9 };
  const speed = waveSpeed({ ...oil, ...thin });
  expect(speed).toBeCloseTo(1273.773, 3);
  const perMetre = joukowskyPressure_pa({
    density_kg_per_m3: 860,
    wave_speed_m_per_s: speed,
    velocity_change_m_per_s: 1,
  });
  expect(600e3 / perMetre).toBeCloseTo(0.54772, 5);
  expect(2 * reflectionTime_s(4000, speed)).toBeCloseTo(12.561, 3);
});

test('a ductile iron main shut faster than its wave returns', () => {
  // Source: problem as posed on tutorbin (4000 ft, 20 in, wall 0.75 in, 50 cfs); result computed
  const main = { bulk_modulus_pa: 2.19e9, density_kg_per_m3: 998.2, bore_mm: 508, wall_mm: 19.05, young_pa: 165e9 };
  const speed = waveSpeed({ ...main, ...thin });
  expect(speed).toBeCloseTo(1272.96, 2);
  expect(reflectionTime_s(1219.2, speed)).toBeCloseTo(1.9155, 4);
  const stopped = { density_kg_per_m3: 998.2, wave_speed_m_per_s: speed, velocity_change_m_per_s: 6.9855 };
  expect(joukowskyPressure_pa(stopped) / 1e6).toBeCloseTo(8.876, 3);
});

test('a long main shut in 25 s, and at once', () => {
  // From memory: R. K. Bansal, Fluid Mechanics and Hydraulic Machines: 150 kPa; sudden with C 1460 m/s: 2.19 MPa
  const main = { density_kg_per_m3: 1000, velocity_change_m_per_s: 1.5 };
  expect(slowClosurePressure_pa({ ...main, length_m: 2500, closing_s: 25 })).toBeCloseTo(150_000, 6);
  expect(joukowskyPressure_pa({ ...main, wave_speed_m_per_s: 1460 })).toBeCloseTo(2.19e6, 3);
  expect(reflectionTime_s(2500, 1460)).toBeCloseTo(3.4247, 4);
});

test('1.2 m/s stopped in a steel drive pipe', () => {
  // Source: computed, Joukowsky
  const stopped = { density_kg_per_m3: 998.2, wave_speed_m_per_s: 1376.1, velocity_change_m_per_s: 1.2 };
  expect(joukowskyPressure_pa(stopped)).toBeCloseTo(1_648_347.6, 0);
});

const [steel, ductile, pvc, hdpe] = (['steel', 'ductile iron', 'PVC-U', 'HDPE'] as const).map(pipeModuli);
const driveWater = { bulk_modulus_pa: 2.1966e9, density_kg_per_m3: 998.2 };
type Row = [string, number, number, number, PipeModuli];

test.each<Row>([
  // Source: computed with Korteweg's thin wall from handbook moduli (200, 165, 3.0, 0.9 GPa; from memory); within 0.1 %
  ['steel DN25', 27.3, 3.2, 1418.5, steel!],
  ['steel DN40', 41.9, 3.2, 1387.0, steel!],
  ['steel DN50', 53.1, 3.6, 1376.1, steel!],
  ['steel DN80', 80.9, 4.0, 1341.9, steel!],
  ['steel DN100', 105.3, 4.5, 1323.1, steel!],
  ['ductile iron DN100', 102, 6, 1339.6, ductile!],
  ['PVC-U 63 × 3.0', 57, 3, 384.2, pvc!],
  ['PVC-U 63 × 4.7', 53.6, 4.7, 485.1, pvc!],
  ['HDPE 63 SDR 11', 51.4, 5.8, 311.8, hdpe!],
  ['HDPE 63 SDR 17', 55.4, 3.8, 245.3, hdpe!],
])('wave speed in a drive pipe of %s', (_, bore_mm, wall_mm, expected, moduli) => {
  const speed = waveSpeed({ ...driveWater, ...moduli, bore_mm, wall_mm, restraint: 'expansion joints', wall: 'thin' });
  expect(Math.abs(speed / expected - 1)).toBeLessThan(1e-3);
});
