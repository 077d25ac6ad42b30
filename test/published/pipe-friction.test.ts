import { expect, test } from 'vitest';
import { darcyFrictionFactor, frictionHead_m } from '../../server/hydraulics/pipe-friction';

test('100 m of small plastic delivery pipe at 0.15 L/s', () => {
  // Source: computed by hand with Swamee and Jain (1976), ε 1.5 µm, ν 1.0035e-6: Re 7155, f 0.034120, loss 0.47649 m
  expect(darcyFrictionFactor(7155, 0.0015 / 26.6)).toBeCloseTo(0.03412, 5);
  const loss = frictionHead_m({ length_m: 100, bore_mm: 26.6, flow_lps: 0.15, roughness_mm: 0.0015 });
  expect(loss).toBeCloseTo(0.47649, 4);
  // Source: Hazen and Williams, another published form: 0.387 m at C 150 and 0.585 m at C 120
  expect(loss).toBeGreaterThan(0.386);
  expect(loss).toBeLessThan(0.585);
});

test('laminar flow by Hagen and Poiseuille', () => {
  // Source: f = 64/Re; 2 m of 10 mm at 0.01 L/s: 32·ν·L·v/(g·D²) = 0.0083388 m, computed
  expect(darcyFrictionFactor(1000, 0.01)).toBeCloseTo(0.064, 12);
  const loss = frictionHead_m({ length_m: 2, bore_mm: 10, flow_lps: 0.01, roughness_mm: 0.0015 });
  expect(loss).toBeCloseTo((32 * 1.0035e-6 * 2 * (1e-5 / (Math.PI * 0.005 ** 2))) / (9.80665 * 0.01 ** 2), 12);
});

test.each([
  // Source: Colebrook and White solved here by iteration; Swamee and Jain state at most 3 % of difference from it
  [5e3, 1e-3],
  [5e4, 3e-3],
  [1e5, 1e-5],
  [1e6, 1e-2],
])('the explicit factor at Re %f and roughness %f is near Colebrook', (reynolds, roughness) => {
  let root = 7;
  for (let i = 0; i < 50; i++) root = -2 * Math.log10(roughness / 3.7 + (2.51 * root) / reynolds);
  expect(Math.abs(darcyFrictionFactor(reynolds, roughness) * root ** 2 - 1)).toBeLessThan(0.03);
});
