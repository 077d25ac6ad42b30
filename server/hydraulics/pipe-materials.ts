import type { PipeMaterial } from '../shapes/installation';

/** What a pipe wall does to a pressure wave: stiffness and sideways strain. */
export interface PipeModuli {
  /** Young's modulus, Pa; the short-term value for plastics, which is what a wave feels. */
  young_pa: number;
  /** Poisson's ratio of the wall, without a unit. */
  poisson: number;
}

/*
 * Handbook values, from memory: middle of the usual range (steel 200–210, ductile iron 165–172, cast iron 80–120, copper 110–130,
 * PVC-U 2.4–3.5, HDPE 0.7–1.2 and concrete 20–35 GPa). Roughness after Moody (1944), from memory: steel as galvanised pipe.
 */
const properties: Record<PipeMaterial, PipeModuli & { roughness_mm: number }> = {
  steel: { young_pa: 200e9, poisson: 0.3, roughness_mm: 0.15 },
  'ductile iron': { young_pa: 165e9, poisson: 0.28, roughness_mm: 0.12 },
  'cast iron': { young_pa: 100e9, poisson: 0.25, roughness_mm: 0.26 },
  copper: { young_pa: 120e9, poisson: 0.35, roughness_mm: 0.0015 },
  'PVC-U': { young_pa: 3e9, poisson: 0.45, roughness_mm: 0.0015 },
  HDPE: { young_pa: 0.9e9, poisson: 0.46, roughness_mm: 0.0015 },
  concrete: { young_pa: 28e9, poisson: 0.18, roughness_mm: 0.3 },
};

/** Young's modulus and Poisson's ratio of a pipe material at about 20 °C. Handbook values, from memory; plastics vary by a third. */
export function pipeModuli(material: PipeMaterial): PipeModuli {
  const { young_pa, poisson } = properties[material];
  return { young_pa, poisson };
}

/** Equivalent sand roughness of a pipe in fair condition, mm. After Moody (1944), from memory; age can raise it tenfold in iron. */
export function pipeRoughness_mm(material: PipeMaterial): number {
  return properties[material].roughness_mm;
}
