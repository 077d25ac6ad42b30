import { type Cycle, type CycleConstants, ramCycle } from '../hydraulics/ram-cycle';
import type { Observable } from '../shapes/figure';
import type { Cause } from '../shapes/finding';
import type { Installation } from '../shapes/installation';
import type { RegimeModel } from './expectation';

/** Shifts of the observables' logarithms that a cause makes at severity 1. What is not named does not move. */
export interface Signature {
  cause: Cause;
  shifts: Partial<Record<Observable, number>>;
  /** How often the cause is met before anything is seen, against the others (own choice). */
  prior: number;
}

const ln = Math.log;

/** A fall 15 % lower where no sensor sees it (reference 8.2); where one does, the expectation follows the fall and this is no cause. */
const lessWater: Signature = {
  cause: 'less water at the source',
  prior: 2,
  shifts: {
    beats_per_min: ln(0.85),
    delivery_l_per_day: ln(0.84),
    waste_l_per_beat: ln(1.18),
    delivered_l_per_beat: ln(0.988),
    chamber_head_m: ln(0.99),
  },
};

/**
 * Directions of every cause for this installation. Stroke and blockage come from the theory by perturbing its constants; what the theory has
 * no term for (leaks, air) is taken from a rigid-column model of two rams, computed for the project and not validated against a measured ram:
 * signs to be confirmed at the ram, sizes of the right order.
 */
export function signaturesFor(model: RegimeModel, installation: Installation): Signature[] {
  const meter = installation.sensors.find(
    (one) => one.channel === 'delivery_volume' || one.channel === 'delivery_flow',
  );
  const atRam = meter !== undefined && meter.place !== 'tank';
  const delivered = (share: number): Signature['shifts'] => ({
    delivered_l_per_beat: ln(share),
    delivery_l_per_day: ln(share),
  });
  const beats = (share: number, shifts: Signature['shifts']): Signature['shifts'] => ({
    ...shifts,
    beats_per_min: ln(share),
    delivery_l_per_day: (shifts.delivery_l_per_day ?? 0) + ln(share),
  });
  const fallSeen = installation.sensors.some((one) => one.channel === 'source_level');
  return [
    ...(fallSeen ? [] : [lessWater]),
    {
      cause: 'waste valve leaking',
      prior: 1,
      shifts: beats(1.03, {
        ...delivered(0.85),
        waste_l_per_beat: ln(1.01),
        chamber_head_m: ln(0.992),
        chamber_ripple_kpa: ln(0.84),
      }),
    },
    {
      cause: 'waste valve stroke grown',
      prior: 0.7,
      shifts: perturbed(
        model,
        installation,
        (c) => ({ ...c, closing_velocity_m_per_s: c.closing_velocity_m_per_s * 1.1 }),
        ln(1.2),
      ),
    },
    {
      cause: 'waste valve stroke shrunk',
      prior: 0.5,
      shifts: perturbed(
        model,
        installation,
        (c) => ({ ...c, closing_velocity_m_per_s: c.closing_velocity_m_per_s * 0.9 }),
        ln(0.83),
      ),
    },
    {
      cause: 'delivery valve leaking back',
      prior: 1,
      shifts: beats(1.02, { ...delivered(0.77), waste_l_per_beat: ln(0.98), chamber_head_m: ln(0.99) }),
    },
    { cause: 'air chamber losing air', prior: 1, shifts: { chamber_ripple_kpa: ln(2) } },
    {
      cause: 'intake or drive pipe blocked',
      prior: 1,
      shifts: perturbed(model, installation, (c) => ({ ...c, loss_coefficient: c.loss_coefficient * 1.5 }), 0),
    },
    {
      cause: 'air in the drive pipe',
      prior: 0.4,
      shifts: beats(0.88, { ...delivered(0.98), waste_l_per_beat: ln(0.93) }),
    },
    atRam
      ? {
          cause: 'delivery pipe leaking',
          prior: 1,
          shifts: {
            ...delivered(1.07),
            chamber_head_m: ln(0.94),
            tank_against_meter: ln(0.8),
            beats_per_min: ln(0.993),
          },
        }
      : {
          cause: 'delivery pipe leaking',
          prior: 1,
          shifts: { ...delivered(0.8), chamber_head_m: ln(0.94), beats_per_min: ln(0.993) },
        },
    {
      cause: 'delivery pipe partly blocked',
      prior: 0.7,
      shifts: { ...delivered(0.88), chamber_head_m: ln(1.14), chamber_ripple_kpa: ln(1.03) },
    },
  ];
}

/** Shifts by theory when a constant of this ram changes; the sign rules of the reference where theory has no beat any more. */
function perturbed(
  model: RegimeModel,
  installation: Installation,
  change: (constants: CycleConstants) => CycleConstants,
  ripple: number,
): Signature['shifts'] {
  const heads = { fall_m: model.fall_m, lift_m: model.lift_m };
  const before = model.constants && ramCycle(installation.drive_pipe, heads, model.constants);
  const after = model.constants && ramCycle(installation.drive_pipe, heads, change(model.constants));
  if (!before || !after) return {};
  const shift = (pick: (cycle: Cycle) => number) => ln(pick(after) / pick(before));
  return {
    beats_per_min: shift((c) => c.beats_per_min),
    waste_l_per_beat: shift((c) => c.waste_l_per_beat),
    delivered_l_per_beat: shift((c) => c.delivered_l_per_beat),
    delivery_l_per_day: shift((c) => c.delivery_lps),
    chamber_ripple_kpa: ripple,
  };
}
