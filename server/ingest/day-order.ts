/*
 * Whether 05/04/2025 is 5 April or May 4, decided from the whole file: by a field above 12, else by how time runs on from one day to
 * the next under either reading, else because a file holds no records from the future. Never row by row.
 */
import { type DateFields, type DayOrder, dateFields, dayOf } from './stamps';

type Order = Exclude<DayOrder, null>;
const orders: Order[] = ['day first', 'month first', 'year first'];
/** Nobody's logger leaves out three weeks at every midnight. */
const LEAP_DAYS = 20;

interface Hypothesis {
  impossible: number;
  leaps: number;
  latest: number;
  previous: number;
}

export class DayOrderEvidence {
  /** Distinct days seen, and the first of them that can be read in two ways. */
  days = 0;
  ambiguous: { text: string; readings: { order: Order; days: number }[] } | null = null;
  private readonly under: Record<Order, Hypothesis>;
  private stated: Order | null = null;
  private withinDay = false;
  private dots = false;
  private last = '';

  constructor(private readonly now_ms: number) {
    const fresh = (): Hypothesis => ({
      impossible: 0,
      leaps: 0,
      latest: Number.NEGATIVE_INFINITY,
      previous: Number.NaN,
    });
    this.under = { 'day first': fresh(), 'month first': fresh(), 'year first': fresh() };
  }

  /** Takes the date text of the next record; a stamp with a time of day is fine. */
  add(text: string): void {
    // most records are of the same day as the one before
    if (this.last !== '' && text.startsWith(this.last)) {
      this.withinDay = true;
      return;
    }
    const fields = dateFields(text.trim());
    if (fields === null) return;
    this.last = text.slice(0, text.length - fields.rest.length);
    if (/\d$/.test(this.last) && fields.rest === '') this.last = text;
    this.days++;
    if (fields.order !== null) {
      this.stated = fields.order;
      return;
    }
    this.dots ||= fields.dots;
    this.weigh(fields, this.last.trim());
  }

  private weigh(fields: DateFields, text: string): void {
    const readings: { order: Order; days: number }[] = [];
    for (const order of orders) {
      const hypothesis = this.under[order];
      const day = dayOf({ ...fields, order: order === 'year first' && !fields.shortYear ? null : order }, order);
      if ('why' in day) {
        hypothesis.impossible++;
        continue;
      }
      readings.push({ order, days: day.days });
      const step = day.days - hypothesis.previous;
      if (step < 0 || step > LEAP_DAYS) hypothesis.leaps++;
      hypothesis.latest = Math.max(hypothesis.latest, day.days);
      hypothesis.previous = day.days;
    }
    if (this.ambiguous === null && new Set(readings.map((reading) => reading.days)).size > 1)
      this.ambiguous = { text, readings };
  }

  /** The order that the file tells, or null where it does not. */
  order(): DayOrder {
    if (this.stated !== null) return this.stated;
    if (this.days === 0) return null;
    const possible = this.least((order) => this.under[order].impossible, 0.2);
    if (possible.length === 1) return possible[0]!;
    // one record a day may be one a month, so days must hold several records
    const steady = this.withinDay ? this.least((order) => this.under[order].leaps, 0.25, possible) : possible;
    if (steady.length === 1) return steady[0]!;
    const today = this.now_ms / 86_400_000 + 1;
    const past = steady.filter((order) => this.under[order].latest <= today);
    if (past.length === 1) return past[0]!;
    // dates with dots are written day first wherever they are written
    return this.dots && this.ambiguous !== null && past.includes('day first') ? 'day first' : null;
  }

  /** The hypotheses with clearly the fewest faults: none against some, or less than a share of the others'. */
  private least(faults: (order: Order) => number, share: number, among: Order[] = orders): Order[] {
    const fewest = Math.min(...among.map(faults));
    return among.filter((order) => faults(order) === fewest || faults(order) * share < fewest);
  }
}
