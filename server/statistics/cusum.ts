/**
 * Two-sided tabular CUSUM (Page 1954) of standardised values: S⁺ = max(0, S⁺ + z − k), S⁻ = max(0, S⁻ − z − k); it signals when either
 * passes the decision interval h. Fed value by value, so that nothing later than a day can move what was noticed on it.
 */
export class Cusum {
  high = 0;
  low = 0;
  private highFrom = 0;
  private lowFrom = 0;
  private fed = 0;

  /** @param k allowance and @param h decision interval, both in standard deviations */
  constructor(
    private readonly k: number,
    private readonly h: number,
  ) {}

  /** Takes a value; +1 or -1 while the chart signals upwards or downwards, else 0. */
  add(z: number): -1 | 0 | 1 {
    this.fed++;
    this.high = Math.max(0, this.high + z - this.k);
    this.low = Math.max(0, this.low - z - this.k);
    if (this.high === 0) this.highFrom = this.fed;
    if (this.low === 0) this.lowFrom = this.fed;
    if (this.high > this.h && this.high >= this.low) return 1;
    return this.low > this.h ? -1 : 0;
  }

  /** How many values ago the side that signals last stood at 0: Page's estimate of when the change began. */
  runLength(direction: -1 | 1): number {
    return this.fed - (direction === 1 ? this.highFrom : this.lowFrom);
  }

  reset(): void {
    this.high = 0;
    this.low = 0;
    this.highFrom = this.fed;
    this.lowFrom = this.fed;
  }
}
