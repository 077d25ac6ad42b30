/** A valve-box trace drawn phase by phase, for tests of the detector only; the demonstration's bursts come from its own simulator. */
export interface BurstShape {
  beats_per_min: number;
  samples_per_s: number;
  seconds: number;
  noise_kpa?: number;
  drift_kpa_per_s?: number;
  clip_kpa?: number;
  resolution_kpa?: number;
  runs_from_s?: number;
  runs_to_s?: number;
  seed?: number;
}

export function random(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}

export function simulatedBurst(shape: BurstShape): { trace: Float64Array; closings_s: number[] } {
  const {
    beats_per_min,
    samples_per_s,
    seconds,
    noise_kpa = 1,
    drift_kpa_per_s = 0,
    clip_kpa = Number.POSITIVE_INFINITY,
    resolution_kpa = 0.01,
    seed = 1,
  } = shape;
  const next = random(seed);
  const normal = () => Math.sqrt(-2 * Math.log(next() + 1e-12)) * Math.cos(2 * Math.PI * next());
  const period = 60 / beats_per_min;
  const closings_s: number[] = [];
  for (
    let at = (shape.runs_from_s ?? 0) + 0.37 * period;
    at < (shape.runs_to_s ?? seconds);
    at += period * (1 + 0.003 * normal())
  )
    closings_s.push(at);
  const pumping = 0.14 * period;
  const recoil = 0.05 * period;
  let beat = -1;
  const trace = Float64Array.from({ length: Math.round(seconds * samples_per_s) }, (_, i) => {
    const at = i / samples_per_s;
    while (beat + 1 < closings_s.length && closings_s[beat + 1]! <= at) beat++;
    const since = beat < 0 ? Number.POSITIVE_INFINITY : at - closings_s[beat]!;
    const nextIn = (closings_s[beat + 1] ?? Number.POSITIVE_INFINITY) - at;
    let pressure = nextIn > 2 * period && since > 2 * period ? 25 : 4;
    if (since < pumping) pressure = 280 + 70 * Math.exp(-since / 0.02) * Math.cos((2 * Math.PI * since) / 0.035);
    else if (since < pumping + recoil) pressure = -8;
    const value = Math.min(clip_kpa, pressure + noise_kpa * normal() + drift_kpa_per_s * at);
    return Math.round(value / resolution_kpa) * resolution_kpa;
  });
  return { trace, closings_s };
}
