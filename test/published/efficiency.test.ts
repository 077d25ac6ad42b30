import { expect, test } from 'vitest';
import { efficiencyDAubuisson, efficiencyRankine } from '../../server/hydraulics/efficiency';
import { convert } from '../../server/units/units';

/** Textbooks state the drive flow Q; the program takes the waste, Q − q. */
const ofDrive = (drive: number, delivery: number, fall_m: number, lift_m: number) => ({
  waste_lps: drive - delivery,
  delivery_lps: delivery,
  fall_m,
  lift_m,
});

/** Delivery at which a ram has an efficiency: worked back from the definition the program holds. */
const deliveryAt = (efficiency: number, drive: number, fall_m: number, lift_m: number): number => {
  const tried = drive / 100;
  return (tried * efficiency) / efficiencyDAubuisson(ofDrive(drive, tried, fall_m, lift_m))!;
};

test('the worked example of both efficiencies: Q 30, q 3 L/s, H 4, h 18 m', () => {
  // Source: civinnovate.com, "Determine D'Aubuisson's and Rankine's efficiencies" (2025): 0.45 and 42/108
  const flow = ofDrive(30, 3, 4, 18);
  expect(efficiencyDAubuisson(flow)).toBeCloseTo(0.45, 12);
  expect(efficiencyRankine(flow)).toBeCloseTo(42 / 108, 12);
});

test('shares delivered at a head ratio', () => {
  // Source: an encyclopaedia's article on the hydraulic ram: at h/H 5 and 70 % a share of 0.14, at h/H 2 0.35; all of it at 1/5
  expect(deliveryAt(0.7, 1, 2, 10)).toBeCloseTo(0.14, 12);
  expect(deliveryAt(0.7, 1, 1, 2)).toBeCloseTo(0.35, 12);
  expect(deliveryAt(1, 1, 2, 10)).toBeCloseTo(0.2, 12);
  // Source: New International Encyclopædia, "Hydraulic Ram": 100 gal falling 15 ft raise 15 gal to 100 ft without loss
  expect(deliveryAt(1, 100, 15, 100)).toBeCloseTo(15, 12);
});

test.each([
  // Source: ratios in Starbuck, Sanitary Plumbing, and The Building Trades Pocketbook; efficiencies computed from them
  { ratio: 5, daubuisson: 0.7142857143, rankine: 0.6666666667 },
  { ratio: 10, daubuisson: 0.7142857143, rankine: 0.6923076923 },
])('a $ratio-fold lift that delivers 1 part in 7 of each fall', ({ ratio, daubuisson, rankine }) => {
  const flow = ofDrive(1, ratio === 5 ? 1 / 7 : 1 / 14, 1, ratio);
  expect(efficiencyDAubuisson(flow)).toBeCloseTo(daubuisson, 9);
  expect(efficiencyRankine(flow)).toBeCloseTo(rankine, 9);
});

test('the design sheet: 65 L/min at 60 %, fall 10 m, 12 m above the intake', () => {
  // Source: ram design sheet (scribd.com/document/515843485): prints 17.73 L/min and 63.77 W with g 9.81
  const delivery = deliveryAt(0.6, 65, 10, 22);
  expect(delivery).toBeCloseTo(17.7272727, 6);
  expect((9.81 * delivery * 22) / 60).toBeCloseTo(63.765, 2);
});

test('the training problem, and a lift wrongly taken from the spring instead of the ram', () => {
  // Source: Peace Corps, Training Manual in Hydrams (1981), attachment 5-A, question 2; answer computed
  const drive = convert(10, 'gpm', 'L/s');
  const daily = (lift_ft: number) => convert(deliveryAt(0.5, drive, 20, lift_ft), 'L/s', 'gpd');
  expect(daily(120)).toBeCloseTo(1200, 8);
  expect(convert(daily(120), 'gal', 'L')).toBeCloseTo(4542.494, 3);
  // negative check: the wrong datum promises 20 % too much
  expect(daily(100)).toBeCloseTo(1440, 8);
});

test('drive water for a village and its cattle', () => {
  // Source: Peace Corps, Training Manual in Hydrams (1981), attachment 10-M; arithmetic computed
  const demand_gpm = convert(100 * 20 + 35 * 30, 'gpd', 'gpm');
  expect(demand_gpm).toBeCloseTo(2.11806, 5);
  expect(demand_gpm / deliveryAt(0.5, 1, 20, 90)).toBeCloseTo(19.0625, 6);
});

test('textbook problem: Q 20, q 2 L/s, H 3, h 20 m', () => {
  // From memory: R. K. Bansal, Fluid Mechanics and Hydraulic Machines
  const flow = ofDrive(20, 2, 3, 20);
  expect(efficiencyDAubuisson(flow)).toBeCloseTo(0.6666666667, 9);
  expect(efficiencyRankine(flow)).toBeCloseTo(0.6296296296, 9);
});

test('textbook problem: the delivery pipe takes 11 points off a ram of 86 %', () => {
  // From memory: R. K. Bansal, Fluid Mechanics and Hydraulic Machines; Fanning's factor 0.009, g 9.81: loss 4.4246 m
  const friction = 4.4246;
  expect(efficiencyDAubuisson(ofDrive(50, 5, 4, 30 + friction))).toBeCloseTo(0.86061, 4);
  expect(efficiencyDAubuisson(ofDrive(50, 5, 4, 30))).toBeCloseTo(0.75, 12);
  expect(efficiencyRankine(ofDrive(50, 5, 4, 30 + friction))).toBeCloseTo(0.84513, 4);
});

test('what has no efficiency has none: no water, no waste, impossible heads', () => {
  // Common practice, no source: a quotient by zero is no figure
  expect(efficiencyDAubuisson({ delivery_lps: 0, waste_lps: 1, fall_m: 2, lift_m: 9 })).toBe(0);
  expect(efficiencyDAubuisson({ delivery_lps: 0, waste_lps: 0, fall_m: 2, lift_m: 9 })).toBeNull();
  expect(efficiencyRankine({ delivery_lps: 1, waste_lps: 0, fall_m: 2, lift_m: 9 })).toBeNull();
  expect(efficiencyRankine({ delivery_lps: 1, waste_lps: 1, fall_m: 9, lift_m: 2 })).toBeNull();
  expect(efficiencyDAubuisson({ delivery_lps: 1, waste_lps: 1, fall_m: 0, lift_m: 9 })).toBeNull();
  expect(efficiencyDAubuisson({ delivery_lps: -1, waste_lps: 3, fall_m: 2, lift_m: 9 })).toBeNull();
  expect(efficiencyDAubuisson({ delivery_lps: Number.NaN, waste_lps: 3, fall_m: 2, lift_m: 9 })).toBeNull();
});
