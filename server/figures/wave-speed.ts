import { pipeModuli } from '../hydraulics/pipe-materials';
import { waveSpeed } from '../hydraulics/surge';
import { soundSpeed, waterDensity } from '../hydraulics/water';
import type { Installation } from '../shapes/installation';

/** Wave speed of the drive pipe by Korteweg; steel with a usual wall where the installation does not say. */
export function driveWaveSpeed({ drive_pipe, water_temperature_c = 15 }: Installation): number {
  const moduli = pipeModuli(drive_pipe.material ?? 'steel');
  const wall_mm = drive_pipe.wall_mm ?? Math.max(3, drive_pipe.bore_mm * 0.07);
  const density = waterDensity(water_temperature_c);
  return waveSpeed({
    bulk_modulus_pa: density * soundSpeed(water_temperature_c) ** 2,
    density_kg_per_m3: density,
    bore_mm: drive_pipe.bore_mm,
    wall_mm,
    ...moduli,
  });
}
