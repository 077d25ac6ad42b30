/*
 * Local time of a zone to UTC. The zone's rules come from the runtime's IANA data through @date-fns/tz; offsets are asked once a day,
 * and quarter by quarter of an hour only on days on which the clocks change (Lord Howe moves by half an hour).
 */
import { tzOffset } from '@date-fns/tz';

const DAY_MS = 86_400_000;
const QUARTER_MS = 900_000;

export class ZoneOffsets {
  private readonly atDays = new Map<number, number>();
  private readonly quarters = new Map<number, number[]>();
  private readonly fixed_ms: number | null;

  /** @param zone 'utc', a fixed offset such as +05:45, or an IANA zone */
  constructor(private readonly zone: string) {
    const fixed = /^([+-])(\d{2}):(\d{2})$/.exec(zone);
    this.fixed_ms =
      zone === 'utc'
        ? 0
        : fixed
          ? (fixed[1] === '-' ? -1 : 1) * (Number(fixed[2]) * 60 + Number(fixed[3])) * 60_000
          : null;
  }

  /** The one offset (ms ahead of UTC) that holds through a whole local day and its neighbours, or null where the clocks change near it. */
  offsetThroughDay(localDay: number): number | null {
    if (this.fixed_ms !== null) return this.fixed_ms;
    const first = this.atDay(localDay - 1);
    return this.atDay(localDay) === first && this.atDay(localDay + 1) === first && this.atDay(localDay + 2) === first
      ? first
      : null;
  }

  /** The instants that a local time may mean: none in an hour that is left out, two in an hour that comes twice, earlier first. */
  instants(local_ms: number): number[] {
    const day = this.offsetThroughDay(Math.floor(local_ms / DAY_MS));
    if (day !== null) return [local_ms - day];
    const quarter = Math.floor(local_ms / QUARTER_MS);
    let offsets = this.quarters.get(quarter);
    if (offsets === undefined) {
      const start = quarter * QUARTER_MS;
      // the offsets of the days around it are the only ones that can hold
      const candidates = [...new Set([-1, 0, 1, 2].map((days) => this.ask(start + (days - 0.5) * DAY_MS)))];
      offsets = candidates.filter((offset) => this.ask(start - offset) === offset).sort((a, b) => b - a);
      this.quarters.set(quarter, offsets);
    }
    return offsets.map((offset) => local_ms - offset);
  }

  private atDay(day: number): number {
    let offset = this.atDays.get(day);
    if (offset === undefined) {
      offset = this.ask(day * DAY_MS);
      this.atDays.set(day, offset);
    }
    return offset;
  }

  private ask(utc_ms: number): number {
    return this.fixed_ms ?? tzOffset(this.zone, new Date(utc_ms)) * 60_000;
  }
}
