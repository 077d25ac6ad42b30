/** Watches the stamps of a file go by and keeps the longest gaps, without keeping the stamps. */
export class RecordGaps {
  private readonly steps: number[] = [];
  private readonly longest: { from_ms: number; to_ms: number }[] = [];
  private earlier = Number.NaN;

  add(times_ms: Float64Array, count: number): void {
    for (let i = 0; i < count; i++) {
      const at = times_ms[i]!;
      // some files begin with their newest record
      const step = Math.abs(at - this.earlier);
      if (step > 0) {
        if (this.steps.length < 5_000) this.steps.push(step);
        if (step > 3 * (this.steps[0] ?? step)) this.keep(Math.min(this.earlier, at), Math.max(this.earlier, at));
      }
      this.earlier = at;
    }
  }

  /** Usual time between records, seconds. */
  usualStep_s(): number | null {
    if (this.steps.length === 0) return null;
    const sorted = [...this.steps].sort((a, b) => a - b);
    return sorted[sorted.length >> 1]! / 1000;
  }

  /** Gaps of more than three usual steps, the longest hundred, in order of time. */
  gaps(): { from: string; to: string }[] {
    const usual_ms = (this.usualStep_s() ?? 0) * 1000;
    return this.longest
      .filter((gap) => gap.to_ms - gap.from_ms > 3 * usual_ms)
      .sort((a, b) => a.from_ms - b.from_ms)
      .map((gap) => ({ from: new Date(gap.from_ms).toISOString(), to: new Date(gap.to_ms).toISOString() }));
  }

  private keep(from_ms: number, to_ms: number): void {
    this.longest.push({ from_ms, to_ms });
    if (this.longest.length <= 200) return;
    this.longest.sort((a, b) => b.to_ms - b.from_ms - (a.to_ms - a.from_ms));
    this.longest.length = 100;
  }
}
