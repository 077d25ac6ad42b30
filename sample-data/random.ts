/** A seeded stream of numbers (mulberry32), so that every run of the generator makes the same valley. */
export interface Random {
  /** Uniform in [0, 1). */
  next(): number;
  /** Uniform in [low, high). */
  between(low: number, high: number): number;
  /** Standard normal. */
  normal(): number;
}

/** A stream of its own for each text, so that one ram's numbers do not move another's. */
export function randomFor(text: string): Random {
  let state = 0x811c9dc5;
  for (const letter of text) state = Math.imul(state ^ letter.charCodeAt(0), 0x01000193) >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  return {
    next,
    between: (low, high) => low + (high - low) * next(),
    // the sum of twelve uniforms is near enough to normal, and it has no wild tails
    normal: () => {
      let sum = -6;
      for (let i = 0; i < 12; i++) sum += next();
      return sum;
    },
  };
}
