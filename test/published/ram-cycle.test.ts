import { expect, test } from 'vitest';
import { efficiencyDAubuisson } from '../../server/hydraulics/efficiency';
import { ramCycle } from '../../server/hydraulics/ram-cycle';

const pipe = { length_m: 12, bore_mm: 52.5 };
const heads = { fall_m: 2.5, lift_m: 15 };
const constants = {
  closing_velocity_m_per_s: 1.2,
  loss_coefficient: 10,
  dead_time_s: 0,
  delivered_share: 1,
  wave_speed_m_per_s: 1350,
};

test('a worked ram of 2.5 m fall and 15 m lift beats as the closed form says', () => {
  // Source: computed by hand from the closed form of the rigid-column theory (Lansford & Dugan 1941; Iversen 1975; equations from memory)
  const cycle = ramCycle(pipe, heads, constants)!;
  const expected = {
    steady_velocity_m_per_s: 2.21435,
    closing_ratio: 0.54192,
    acceleration_s: 0.65775,
    waste_l_per_beat: 0.90318,
    pumping_s: 0.11747,
    delivered_l_per_beat: 0.15258,
    recoil_velocity_m_per_s: 0.0908,
    recoil_s: 0.044444,
    beats_per_min: 73.2,
    drive_lps: 1.28803,
    delivery_lps: 0.18615,
    highest_lift_m: 167.69,
  };
  for (const [name, value] of Object.entries(expected))
    expect(Math.abs(cycle[name as keyof typeof expected] / value - 1), name).toBeLessThan(1e-4);
  expect(efficiencyDAubuisson({ ...cycle, ...heads })).toBeCloseTo(0.86712, 4);
});

test('the waste valve stays open below a fall of 0.734 m', () => {
  // Source: computed, H < K·v²/2g for the worked ram
  expect(ramCycle(pipe, { fall_m: 0.735, lift_m: 15 }, constants)).not.toBeNull();
  expect(ramCycle(pipe, { fall_m: 0.734, lift_m: 15 }, constants)).toBeNull();
});

test('a valve set to shut at 0.796 of the steady velocity delivers most', () => {
  // Source: derived, maximum of r²/artanh(r), at 0.79639; most delivery where lift is high and waves are fast
  const high = { fall_m: 1, lift_m: 1e6 };
  const steady = Math.sqrt((2 * 9.80665 * high.fall_m) / 10);
  const delivery = (ratio: number) =>
    ramCycle(pipe, high, { ...constants, closing_velocity_m_per_s: ratio * steady, wave_speed_m_per_s: 1e15 })!
      .delivery_lps;
  let [low, top] = [0.5, 0.95];
  while (top - low > 1e-7) {
    const [left, right] = [low + (top - low) / 3, top - (top - low) / 3];
    if (delivery(left) < delivery(right)) low = left;
    else top = right;
  }
  expect((low + top) / 2).toBeCloseTo(0.79639, 4);
});

test.each([
  // Source: computed table of r²/(−ln(1 − r²)), the energy the run-up keeps
  [0.3, 0.9543],
  [0.5, 0.869],
  [0.6, 0.8067],
  [0.7, 0.7277],
  [0.8, 0.6264],
  [0.9, 0.4877],
])('a closing ratio of %f keeps %f of the energy', (ratio, kept) => {
  const steady = Math.sqrt((2 * 9.80665 * 2.5) / 10);
  const cycle = ramCycle(pipe, heads, { ...constants, closing_velocity_m_per_s: ratio * steady })!;
  const rankine = (cycle.delivery_lps * 12.5) / (cycle.waste_lps * 2.5);
  expect(rankine).toBeCloseTo(kept, 4);
});
