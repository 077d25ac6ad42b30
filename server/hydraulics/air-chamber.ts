/*
 * The air chamber: p·V^n = const with absolute pressures. Slow changes are isothermal (n = 1); at the beat n is 1.0 to 1.4, about
 * 1.2 in small metal chambers (Parmakian; Wylie & Streeter, from memory).
 */
import { requirePositive } from './impossible';

/** Exponent of the air's compression within a beat where nothing better is known; 1.0 to 1.4 bound it. */
export const BEAT_EXPONENT = 1.2;

/** What a beat puts into the chamber, and the pressure it meets. */
export interface ChamberBeat {
  /** Water taken in and given out again within a beat, L: see `storedPerBeat_l`. */
  stored_l: number;
  /** Absolute pressure at the low point of the ripple, kPa: the mean less half the ripple. */
  absolute_kpa: number;
  /** 1 (isothermal) to 1.4 (adiabatic). */
  exponent?: number;
}

/**
 * Peak-to-peak ripple of a chamber's pressure, kPa, from the air in it: p·((V/(V − ΔV))^n − 1).
 * Null where the stored water is not less than the air: such a chamber is full of water.
 * Throws RangeError for volumes or pressures that are not above 0 or an exponent outside 1 to 1.4.
 */
export function chamberRipple_kpa({
  air_l,
  stored_l,
  absolute_kpa,
  exponent = BEAT_EXPONENT,
}: ChamberBeat & { air_l: number }): number | null {
  requirePositive(air_l, 'an air volume', 'L');
  requireBeat(stored_l, absolute_kpa, exponent);
  return stored_l < air_l ? absolute_kpa * ((air_l / (air_l - stored_l)) ** exponent - 1) : null;
}

/**
 * Air in a chamber, L, from the ripple it lets through: the exact inverse of `chamberRipple_kpa`. The exponent alone leaves ±17 %.
 * Throws RangeError for a ripple, volume or pressure that is not above 0 or an exponent outside 1 to 1.4.
 */
export function airVolume_l({
  ripple_kpa,
  stored_l,
  absolute_kpa,
  exponent = BEAT_EXPONENT,
}: ChamberBeat & { ripple_kpa: number }): number {
  requirePositive(ripple_kpa, 'a ripple', 'kPa');
  requireBeat(stored_l, absolute_kpa, exponent);
  // 1 − (1 + Δp/p)^(−1/n), without losing digits to a small ripple
  return stored_l / -Math.expm1(-Math.log1p(ripple_kpa / absolute_kpa) / exponent);
}

/**
 * Water a beat leaves in the chamber, L: it delivers for a part of its period while the delivery pipe draws evenly all of it.
 * Throws RangeError unless the pumping time is within the period and all are above 0.
 */
export function storedPerBeat_l(delivered_l_per_beat: number, pumping_s: number, period_s: number): number {
  requirePositive(delivered_l_per_beat, 'a delivery per beat', 'L');
  requirePositive(pumping_s, 'a pumping time', 's');
  if (!(period_s > pumping_s && period_s < Number.POSITIVE_INFINITY))
    throw new RangeError(`a period of ${period_s} s; more than the pumping time of ${pumping_s} s was expected`);
  return delivered_l_per_beat * (1 - pumping_s / period_s);
}

/**
 * Volume of an amount of air brought from one absolute pressure to another, in the unit of the volume given (Boyle for n = 1).
 * Throws RangeError for a volume or pressure that is not above 0 or an exponent outside 1 to 1.4.
 */
export function compressedAir_l(
  air_l: number,
  from_absolute_kpa: number,
  to_absolute_kpa: number,
  exponent = 1,
): number {
  requirePositive(from_absolute_kpa, 'an absolute pressure', 'kPa');
  requireBeat(air_l, to_absolute_kpa, exponent);
  return air_l * (from_absolute_kpa / to_absolute_kpa) ** (1 / exponent);
}

function requireBeat(volume_l: number, absolute_kpa: number, exponent: number): void {
  requirePositive(volume_l, 'a volume', 'L');
  requirePositive(absolute_kpa, 'an absolute pressure', 'kPa');
  if (!(exponent >= 1 && exponent <= 1.4)) throw new RangeError(`an exponent of ${exponent}; 1 to 1.4 was expected`);
}
