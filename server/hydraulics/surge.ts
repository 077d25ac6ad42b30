/* Water hammer: how fast a pressure wave runs in a pipe, and what pressure a stopped column makes. */
import { requireNotNegative, requirePositive } from './impossible';
import type { PipeModuli } from './pipe-materials';

/** How a pipe may stretch along its axis when its pressure rises. */
export type Restraint = 'anchored throughout' | 'anchored upstream' | 'expansion joints';

/** A pipe full of water as a wave feels it. */
export interface ElasticPipe extends PipeModuli {
  /** Bulk modulus of the water, Pa: density times sound speed squared. */
  bulk_modulus_pa: number;
  density_kg_per_m3: number;
  bore_mm: number;
  wall_mm: number;
  /** Anchored throughout unless stated, as a buried or clamped drive pipe is. */
  restraint?: Restraint;
  /** Thick unless stated: it holds for every wall and comes to the thin-walled form as the wall thins. */
  wall?: 'thin' | 'thick';
}

/**
 * Speed of a pressure wave in a pipe, m/s, by Korteweg (1878) with the wall's restraint: a = √(K/ρ) / √(1 + c·K·D/(E·e)).
 * Free air in the water slows it far below this. Throws RangeError for a bore, wall or modulus that is not above 0.
 * Source: thick wall anchored throughout as in a published surge script; the other restraints after Wylie & Streeter (from memory).
 */
export function waveSpeed(pipe: ElasticPipe): number {
  const { bulk_modulus_pa, density_kg_per_m3, bore_mm, wall_mm, young_pa, poisson } = pipe;
  requirePositive(bulk_modulus_pa, 'a bulk modulus', 'Pa');
  requirePositive(density_kg_per_m3, 'a density', 'kg/m³');
  requirePositive(bore_mm, 'a bore', 'mm');
  requirePositive(wall_mm, 'a wall', 'mm');
  // an endlessly stiff wall is allowed: it is the rigid pipe of the textbooks
  if (!(young_pa > 0)) throw new RangeError(`a Young's modulus of ${young_pa} Pa; a number above 0 was expected`);
  if (!(poisson >= 0 && poisson <= 0.5)) throw new RangeError(`a Poisson's ratio of ${poisson}; 0 to 0.5 was expected`);
  const yielding = (wallFactor(pipe) * bulk_modulus_pa * bore_mm) / (young_pa * wall_mm);
  return Math.sqrt(bulk_modulus_pa / density_kg_per_m3 / (1 + yielding));
}

function wallFactor({
  restraint = 'anchored throughout',
  wall = 'thick',
  poisson,
  bore_mm,
  wall_mm,
}: ElasticPipe): number {
  const thin = { 'anchored throughout': 1 - poisson ** 2, 'anchored upstream': 1 - poisson / 2, 'expansion joints': 1 }[
    restraint
  ];
  if (wall === 'thin') return thin;
  const thickness = wall_mm / bore_mm;
  return thin / (1 + thickness) + 2 * thickness * (1 + poisson);
}

/** What is stopped, and in what. */
export interface StoppedColumn {
  density_kg_per_m3: number;
  velocity_change_m_per_s: number;
}

/**
 * Pressure rise of a column stopped within 2L/a, Pa: Δp = ρ·a·Δv (Joukowsky 1898). No column separation.
 * Throws RangeError for a negative velocity change, or a density or wave speed that is not above 0.
 */
export function joukowskyPressure_pa(column: StoppedColumn & { wave_speed_m_per_s: number }): number {
  requirePositive(column.density_kg_per_m3, 'a density', 'kg/m³');
  requirePositive(column.wave_speed_m_per_s, 'a wave speed', 'm/s');
  requireNotNegative(column.velocity_change_m_per_s, 'a velocity change', 'm/s');
  return column.density_kg_per_m3 * column.wave_speed_m_per_s * column.velocity_change_m_per_s;
}

/**
 * Mean pressure rise of a rigid column stopped evenly over a time well above 2L/a, Pa: Δp = ρ·L·Δv/t. The peak may reach twice this
 * (Michaud). Throws RangeError for a negative velocity change, or a density, length or time that is not above 0.
 */
export function slowClosurePressure_pa(column: StoppedColumn & { length_m: number; closing_s: number }): number {
  requirePositive(column.density_kg_per_m3, 'a density', 'kg/m³');
  requirePositive(column.length_m, 'a pipe length', 'm');
  requirePositive(column.closing_s, 'a closing time', 's');
  requireNotNegative(column.velocity_change_m_per_s, 'a velocity change', 'm/s');
  return (column.density_kg_per_m3 * column.length_m * column.velocity_change_m_per_s) / column.closing_s;
}

/** Time in which a wave runs to the far end of a pipe and back, s: 2L/a. Full ringing of a pipe shut at one end takes twice as long. */
export function reflectionTime_s(length_m: number, wave_speed_m_per_s: number): number {
  requirePositive(length_m, 'a pipe length', 'm');
  requirePositive(wave_speed_m_per_s, 'a wave speed', 'm/s');
  return (2 * length_m) / wave_speed_m_per_s;
}
