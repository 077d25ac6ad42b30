/** Where a continuous function changes its sign between two places where it has different ones, to the last bits. */
export function bisect(from: number, to: number, of: (x: number) => number): number {
  const rising = of(to) > of(from);
  let [low, high] = [from, to];
  for (let halvings = 0; halvings < 60; halvings++) {
    const middle = (low + high) / 2;
    if (of(middle) > 0 === rising) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}

const GRID = 40;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/** Place of a function's least value between two places: the best of a grid, refined by golden section around it. */
export function placeOfLeast(from: number, to: number, of: (x: number) => number): number {
  const step = (to - from) / GRID;
  const values = Array.from({ length: GRID + 1 }, (_, i) => of(from + i * step));
  let best = 0;
  for (let i = 1; i <= GRID; i++) if (values[i]! < values[best]!) best = i;
  let [low, high] = [from + Math.max(0, best - 1) * step, from + Math.min(GRID, best + 1) * step];
  for (let cut = 0; cut < 40; cut++) {
    const [left, right] = [high - GOLDEN * (high - low), low + GOLDEN * (high - low)];
    if (of(left) <= of(right)) high = right;
    else low = left;
  }
  return (low + high) / 2;
}
