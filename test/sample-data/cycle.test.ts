import { describe, expect, it } from 'vitest';
import { type RamState, runToRest } from '../../sample-data/cycle';
import { soundRam } from '../../sample-data/ram-state';
import { valley } from '../../sample-data/valley';

// Reference ram R1, loss-free closed form of the rigid column (derivation standard, after Lansford and Dugan; from memory):
// N 73.200 /min, waste 0.90318 L and delivery 0.15258 L a beat.
const r1: RamState = {
  ...soundRam({
    fall_m: 2.5,
    lift_m: 15,
    drive_m: 12,
    drive_mm: 52.5,
    drive_loss: 10,
    closing_mps: 1.2,
    wave_mps: 1350,
    air_l: 5000,
    delivery_m: 20,
    delivery_mm: 100,
  }),
  closing_time_s: 0,
  pumping_loss: 0,
  recoil: 1,
};

const change = (now: number, before: number) => now / before - 1;

describe('one beat of the demonstration', () => {
  it('agrees with the loss-free closed form within 2 %', () => {
    const cycle = runToRest(r1);
    expect(Math.abs(change(cycle.beats_per_min, 73.2))).toBeLessThan(0.02);
    expect(Math.abs(change(cycle.waste_l, 0.90318))).toBeLessThan(0.02);
    // what leaves the drive side, as the great chamber takes a while to pass it on
    expect(Math.abs(change(cycle.drive_l - cycle.waste_l, 0.15258))).toBeLessThan(0.02);
  });

  it('keeps its water: what the source gives goes over the waste valve or up the hill', () => {
    for (const { state } of valley) {
      const cycle = runToRest(state);
      expect(Math.abs(cycle.drive_l - cycle.waste_l - cycle.ram_l)).toBeLessThan(0.002 * cycle.ram_l);
      expect(Math.abs(change(cycle.tank_l, cycle.ram_l))).toBeLessThan(1e-6);
    }
  });

  it('beats 45 to 90 times a minute at each ram of the valley', () => {
    for (const { state } of valley) {
      const { beats_per_min } = runToRest(state);
      expect(beats_per_min).toBeGreaterThan(45);
      expect(beats_per_min).toBeLessThan(90);
    }
  });
});

describe('faults show the signs that their physics has', () => {
  const sound = valley.find((ram) => ram.key === 'pellandry')!.state;
  const before = runToRest(sound);
  const running = (changes: Partial<RamState>) => runToRest({ ...sound, ...changes });

  it('leaking waste seat: less delivered, no slower, smaller ripple', () => {
    const cycle = running({ seat_leak_m2: 20e-6 });
    expect(change(cycle.tank_lps, before.tank_lps)).toBeLessThan(-0.08);
    expect(cycle.beats_per_min).toBeGreaterThan(before.beats_per_min);
    expect(cycle.ripple_m).toBeLessThan(before.ripple_m);
  });

  it('leaking delivery valve: less delivered at nearly the same beat', () => {
    const cycle = running({ delivery_valve_leak_m2: 2e-6 });
    expect(change(cycle.tank_lps, before.tank_lps)).toBeLessThan(-0.15);
    expect(Math.abs(change(cycle.beats_per_min, before.beats_per_min))).toBeLessThan(0.04);
  });

  it('a great leak back at the delivery valve stops the ram with its waste valve shut', () => {
    expect(running({ delivery_valve_leak_m2: 40e-6 }).stopped).toBe('shut');
  });

  it('lost air: ripple four times as great at a quarter of the air, all else the same', () => {
    const cycle = running({ air_m3: sound.air_m3 / 4 });
    expect(cycle.ripple_m / before.ripple_m).toBeGreaterThan(3.6);
    expect(cycle.ripple_m / before.ripple_m).toBeLessThan(4.5);
    expect(Math.abs(change(cycle.tank_lps, before.tank_lps))).toBeLessThan(0.03);
  });

  it('blocked intake: slower beat, more litres a beat, less delivered, then a stop with the valve open', () => {
    const cycle = running({ drive_loss: sound.drive_loss * 2 });
    expect(change(cycle.beats_per_min, before.beats_per_min)).toBeLessThan(-0.08);
    expect(change(cycle.drive_l, before.drive_l)).toBeGreaterThan(0.08);
    expect(cycle.tank_lps).toBeLessThan(before.tank_lps);
    expect(running({ drive_loss: sound.drive_loss * 6 }).stopped).toBe('open');
  });

  it('leaking delivery pipe: more past the ram, less in the tank, lower chamber head', () => {
    const cycle = running({ delivery_pipe_leak_m2: 2e-6 });
    expect(cycle.ram_lps).toBeGreaterThan(before.ram_lps);
    expect(change(cycle.tank_lps, before.tank_lps)).toBeLessThan(-0.1);
    expect(cycle.chamber_m).toBeLessThan(before.chamber_m);
  });

  it('lower fall: slower beat and less delivered, in step with the fall, at the same drive flow', () => {
    const cycle = running({ fall_m: sound.fall_m * 0.8 });
    expect(change(cycle.beats_per_min, before.beats_per_min)).toBeCloseTo(-0.2, 1);
    expect(change(cycle.tank_lps, before.tank_lps)).toBeCloseTo(-0.21, 1);
    expect(Math.abs(change(cycle.drive_lps, before.drive_lps))).toBeLessThan(0.03);
  });
});
