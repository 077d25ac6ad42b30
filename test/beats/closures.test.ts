import fc from 'fast-check';
import { expect, test } from 'vitest';
import { findClosures } from '../../server/beats/closures';
import { describeBurst } from '../../server/beats/describe-burst';
import { random, simulatedBurst } from './simulated-burst';

const rates = fc.integer({ min: 20, max: 140 });
const sampling = fc.constantFrom(50, 100, 200, 500, 1000);

test('every beat is found and none invented, within a sample, at any rate and sampling', () => {
  fc.assert(
    fc.property(rates, sampling, fc.integer({ min: 1, max: 1_000 }), (beats_per_min, samples_per_s, seed) => {
      const { trace, closings_s } = simulatedBurst({ beats_per_min, samples_per_s, seconds: 30, seed });
      const { at } = findClosures(trace, samples_per_s);
      const due = closings_s.filter((c) => c > 0.05 && c < 29.9);
      const found = Array.from(at, (place) => place / samples_per_s).filter((c) => c > 0.05 && c < 29.9);
      expect(found).toHaveLength(due.length);
      for (let i = 0; i < due.length; i++) expect(Math.abs(found[i]! - due[i]!)).toBeLessThan(1.01 / samples_per_s);
    }),
    { numRuns: 60, seed: 7 },
  );
});

test.each([
  ['strong noise', { noise_kpa: 18 }],
  ['slow drift of the zero', { drift_kpa_per_s: 1.5 }],
  ['a sensor clipped below the peak', { clip_kpa: 200 }],
  ['eight bits', { resolution_kpa: 4 }],
  ['a ram that starts within the burst', { runs_from_s: 20 }],
  ['a ram that stops within the burst', { runs_to_s: 38 }],
])('%s does not change the count', (_, trouble) => {
  const { trace, closings_s } = simulatedBurst({ beats_per_min: 63, samples_per_s: 100, seconds: 60, ...trouble });
  expect(findClosures(trace, 100).at.length).toBe(closings_s.filter((c) => c < 59.97).length);
});

test('a lone spike and a drop-out of samples are no beats', () => {
  const { trace, closings_s } = simulatedBurst({ beats_per_min: 60, samples_per_s: 100, seconds: 30 });
  for (const i of [233, 777, 1499, 2222]) trace[i] = 700;
  trace.fill(Number.NaN, 1230, 1240);
  expect(findClosures(trace, 100).at.length).toBe(closings_s.length);
});

test('a still ram and plain noise have no beats', () => {
  const next = random(3);
  const noise = Float64Array.from({ length: 6000 }, () => 25 + next());
  expect(findClosures(noise, 100).at.length).toBe(0);
  expect(findClosures(new Float64Array(6000).fill(31.4), 100).at.length).toBe(0);
  const told = describeBurst({ times_s: Float64Array.from({ length: 6000 }, (_, i) => i / 100), valve_box_kpa: noise });
  expect(told.beats_per_min).toBeNull();
  expect(told.notes.join(' ')).toMatch(/No beats stand out/);
});

test('another unit or another zero finds the same closings', () => {
  const { trace } = simulatedBurst({ beats_per_min: 72, samples_per_s: 200, seconds: 30 });
  const { at } = findClosures(trace, 200);
  for (const [scale, offset] of [
    [0.145, 0],
    [0.01, 1],
    [1, 101.3],
  ] as const) {
    const changed = findClosures(
      trace.map((p) => p * scale + offset),
      200,
    ).at;
    expect(changed.length).toBe(at.length);
    for (let i = 0; i < at.length; i++) expect(changed[i]!).toBeCloseTo(at[i]!, 6);
  }
});

test('beats per minute are within a thousandth and their interval holds the truth', () => {
  let held = 0;
  for (let seed = 1; seed <= 40; seed++) {
    const { trace, closings_s } = simulatedBurst({ beats_per_min: 57, samples_per_s: 100, seconds: 60, seed });
    const truth = (60 * (closings_s.length - 1)) / (closings_s.at(-1)! - closings_s[0]!);
    const { beats_per_min } = describeBurst({
      times_s: Float64Array.from(trace, (_, i) => i / 100),
      valve_box_kpa: trace,
    });
    expect(Math.abs(beats_per_min!.value / truth - 1)).toBeLessThan(1e-3);
    if (beats_per_min!.low <= truth && truth <= beats_per_min!.high) held++;
  }
  expect(held).toBeGreaterThan(30);
});

test("the chamber's ripple alone gives the count", () => {
  const period = 60 / 66;
  const next = random(11);
  const chamber = Float64Array.from({ length: 3000 }, (_, i) => {
    const phase = (i / 100 / period) % 1;
    return 276 + (phase < 0.15 ? (phase / 0.15) * 6 : 6 * (1 - (phase - 0.15) / 0.85)) + next() * 0.4;
  });
  const told = describeBurst({ times_s: Float64Array.from(chamber, (_, i) => i / 100), chamber_kpa: chamber });
  expect(told.beats_per_min!.value).toBeCloseTo(66, 0);
  expect(told.notes[0]).toMatch(/ripple/);
});

// Source: Cramér–Rao bound for the frequency of a real sinusoid in white noise, 24σ²/(A²N(N²−1)) rad²/sample²
// (Rife & Boorstyn 1974; Kay 1993; from memory, recomputed in the project's reference pack).
test('on a noisy sinusoid the rate is as good as crossings allow: within sixty times the Cramér–Rao bound', () => {
  const [rate, count, sigma, amplitude] = [20, 1200, 0.1, 0.8];
  const bound_hz = (Math.sqrt((24 * sigma ** 2) / (amplitude ** 2 * count * (count ** 2 - 1))) * rate) / (2 * Math.PI);
  const next = random(5);
  const normal = () => Math.sqrt(-2 * Math.log(next() + 1e-12)) * Math.cos(2 * Math.PI * next());
  const trace = Float64Array.from(
    { length: count },
    (_, i) => amplitude * Math.sin((2 * Math.PI * 0.85 * i) / rate + 0.3) + sigma * normal(),
  );
  const told = describeBurst({ times_s: Float64Array.from(trace, (_, i) => i / rate), valve_box_kpa: trace });
  expect(Math.abs(told.beats_per_min!.value / 60 - 0.85)).toBeLessThan(60 * bound_hz);
});
