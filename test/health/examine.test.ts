import { expect, test } from 'vitest';
import { examine } from '../../server/health/examine';
import type { SpanFigures } from '../../server/shapes/figure';
import type { Cause } from '../../server/shapes/finding';
import { type Fault, ram, simulatedDays } from './simulated-days';

const look = (days: SpanFigures[], set_up_anew_on: string[] = []) =>
  examine({ ram: 'Test', installation: ram, days, set_up_anew_on, set_up_span: null, stops: [] });
const dayOf = (date: string) => Math.round((Date.parse(date) - Date.UTC(2030, 0, 1)) / 86_400_000);

test('healthy rams with hard seasons stay quiet: at most one finding in twenty ram-years', () => {
  let findings = 0;
  for (let seed = 1; seed <= 20; seed++)
    findings += look(simulatedDays({ days: 395, swing: 0.2, seed, ripple: true, waste: seed % 2 === 0 })).findings
      .length;
  expect(findings).toBeLessThanOrEqual(1);
});

test('less water alone is no worse ram, and is said so', () => {
  const days = simulatedDays({ days: 120, swing: 0, seed: 4 });
  const dry = simulatedDays({ days: 120, swing: 0, seed: 4 }).map((day, d) =>
    d < 60 ? day : simulatedDays({ days: 120, swing: 0.18, seed: 40 + (d % 1) })[d]!,
  );
  expect(look(days).condition).toBe('holding');
  expect(look(dry).findings.filter((one) => one.class !== 'watch')).toEqual([]);
});

const faults: [Cause, Fault & { ripple_sensor?: boolean; waste_sensor?: boolean }][] = [
  [
    'waste valve leaking',
    {
      from: 100,
      grows: 60,
      beats: 1.07,
      delivered: 0.83,
      head: 0.99,
      ripple: 0.83,
      ripple_sensor: true,
      waste_sensor: true,
    },
  ],
  [
    'delivery valve leaking back',
    { from: 100, grows: 60, beats: 1.02, delivered: 0.78, head: 0.99, ripple_sensor: true, waste_sensor: true },
  ],
  [
    'intake or drive pipe blocked',
    {
      from: 100,
      grows: 60,
      constants: (c, severity) => ({ ...c, loss_coefficient: c.loss_coefficient * (1 + 1.5 * severity) }),
      waste_sensor: true,
    },
  ],
  [
    'waste valve stroke grown',
    {
      from: 100,
      grows: 60,
      constants: (c, severity) => ({
        ...c,
        closing_velocity_m_per_s: c.closing_velocity_m_per_s * (1 + 0.12 * severity),
      }),
      waste_sensor: true,
    },
  ],
  ['delivery pipe leaking', { from: 100, grows: 60, beats: 0.99, delivered: 0.8, head: 0.93 }],
  ['delivery pipe partly blocked', { from: 100, grows: 60, delivered: 0.86, head: 1.15 }],
  ['air chamber losing air', { from: 100, grows: 60, ripple: 3, ripple_sensor: true }],
];

test.each(faults)(
  '%s is noticed within a fortnight of costing a tenth, with its cause among the first two',
  (cause, { ripple_sensor, waste_sensor, ...fault }) => {
    for (let seed = 1; seed <= 5; seed++) {
      const { findings, condition } = look(
        simulatedDays({ days: 260, swing: 0.1, seed, fault, ripple: ripple_sensor, waste: waste_sensor }),
      );
      const found = findings.find((one) => one.open)!;
      expect(found, `seed ${seed}`).toBeDefined();
      expect(condition).not.toBe('holding');
      const bite = Math.min(fault.delivered ?? 1, 0.9);
      const tenth = fault.from + fault.grows * Math.min(1, Math.log(0.9) / Math.log(bite));
      expect(dayOf(found.noticed_on), `seed ${seed}`).toBeLessThanOrEqual(tenth + 14);
      expect(dayOf(found.noticed_on)).toBeGreaterThanOrEqual(100);
      expect(Math.abs(dayOf(found.began_on) - 100), `seed ${seed} began`).toBeLessThan(25);
      expect(
        found.causes.slice(0, 2).map((one) => one.cause),
        `seed ${seed}`,
      ).toContain(cause);
      expect(found.cautions.join(' ')).toMatch(/drive-pipe valve slowly/);
      expect(found.checks.length).toBeGreaterThan(0);
    }
  },
);

test('what was noticed by a day does not depend on what came after', () => {
  const fault: Fault = { from: 100, grows: 60, beats: 1.07, delivered: 0.83 };
  const days = simulatedDays({ days: 260, seed: 2, fault });
  const whole = look(days).findings.at(-1)!;
  const noticed = dayOf(whole.noticed_on);
  expect(look(days.slice(0, noticed)).findings).toEqual([]);
  expect(look(days.slice(0, noticed + 1)).findings[0]!.noticed_on).toBe(whole.noticed_on);
});

test('a repair that cures closes the finding, and its loss is told', () => {
  const fault: Fault = { from: 100, grows: 50, until: 190, beats: 1.07, delivered: 0.8 };
  const { findings, condition } = look(simulatedDays({ days: 300, seed: 3, fault }));
  expect(condition).toBe('holding');
  expect(findings).toHaveLength(1);
  expect(findings[0]!.open).toBe(false);
  expect(Math.abs(dayOf(findings[0]!.ended_on!) - 190)).toBeLessThan(8);
  expect(findings[0]!.litres_lost!).toBeGreaterThan(1000);
});

test('a ram set up anew is judged by its new set-up', () => {
  const fault: Fault = {
    from: 150,
    grows: 1,
    constants: (c, severity) => ({
      ...c,
      closing_velocity_m_per_s: c.closing_velocity_m_per_s * (1 - 0.15 * severity),
    }),
  };
  const days = simulatedDays({ days: 300, seed: 6, fault });
  const { findings, condition, set_up_spans } = look(days, [days[149]!.date!]);
  expect(set_up_spans).toHaveLength(2);
  expect(condition).toBe('holding');
  expect(findings.filter((one) => one.open)).toEqual([]);
});

test('with a few days only, nothing is claimed', () => {
  const short = look(simulatedDays({ days: 5, seed: 1 }));
  expect(short.findings).toEqual([]);
  expect(short.sentence).toMatch(/too few/);
});

test('a stop that lasts comes before all else', () => {
  const days = simulatedDays({ days: 80, seed: 8 });
  const stop = {
    from_ms: Date.UTC(2030, 2, 20),
    to_ms: null,
    from_on: '2030-03-20',
    to_on: null,
    waste_valve: 'open' as const,
  };
  const { condition, findings } = examine({
    ram: 'Test',
    installation: ram,
    days,
    set_up_anew_on: [],
    set_up_span: null,
    stops: [stop],
  });
  expect(condition).toBe('stopped');
  expect(findings[0]).toMatchObject({
    class: 'go now',
    open: true,
    causes: [{ cause: 'stopped with the waste valve open' }, { cause: 'stopped, source dry' }],
  });
});
