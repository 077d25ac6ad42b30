/*
 * From the local time of a record to its instant. The hour that comes twice when summer time ends is told apart by the order
 * of the records; an hour that does not exist is refused; so is a clock that was plainly never set.
 */
import { ZoneOffsets } from './zone-offsets';

const DAY_MS = 86_400_000;
const HOUR_MS = 3_600_000;
/** Loggers that lost their battery wake up in 1970, 1980 or 2000. */
const FIRST_BELIEVED_MS = Date.UTC(2001, 0, 1);
/** A clock that falls back by more than a year among rising records was reset. */
const LONGEST_FALL_MS = 366 * DAY_MS;

export class StampClock {
  /** Stamps in an hour that does not exist, and local days on which the hour that comes twice was written only once. */
  inMissingHour = 0;
  readonly writtenOnce: string[] = [];
  private readonly zone: ZoneOffsets;
  private readonly lastBelieved_ms: number;
  private day = Number.NaN;
  private offset_ms = 0;
  private earliestBelieved_ms = FIRST_BELIEVED_MS;
  private previousLocal = Number.NaN;
  private previous = Number.NaN;
  private direction = 0;
  private step = 0;
  private twice: 'no' | 'first' | 'second' = 'no';

  constructor(
    private readonly zoneName: string,
    now_ms: number,
    private readonly isBurst: boolean,
  ) {
    this.zone = new ZoneOffsets(zoneName);
    this.lastBelieved_ms = now_ms + DAY_MS;
  }

  /** The instant of a local time in the plain case, or NaN where `instant` must look closer. */
  quick(local_ms: number): number {
    if (this.twice !== 'no') return Number.NaN;
    const day = Math.floor(local_ms / DAY_MS);
    if (day !== this.day) {
      const offset = this.zone.offsetThroughDay(day);
      if (offset === null) return Number.NaN;
      this.day = day;
      this.offset_ms = offset;
    }
    const at = local_ms - this.offset_ms;
    if (at < this.earliestBelieved_ms || at > this.lastBelieved_ms) return Number.NaN;
    this.follow(local_ms, at);
    return at;
  }

  /** The instant of a local time, or why it has none. */
  instant(local_ms: number): number | string {
    const found = this.zone.instants(local_ms);
    if (found.length === 0) {
      this.inMissingHour++;
      return `${localText(local_ms)} does not exist in ${this.zoneName}: the clocks went forward over it`;
    }
    const doubt = this.doubt(found[0]!);
    if (doubt !== null) return doubt;
    const at = found.length === 1 ? found[0]! : this.choose(found as [number, number], local_ms);
    if (found.length === 1 && this.twice !== 'no') this.leaveDoubleHour(local_ms, at);
    this.follow(local_ms, at);
    return at;
  }

  /** An instant that the file states by itself, or why it is not believed. */
  stated(at: number): number | string {
    const doubt = this.doubt(at);
    if (doubt === null) this.follow(at, at);
    return doubt ?? at;
  }

  private doubt(at: number): string | null {
    if (at < FIRST_BELIEVED_MS) return `the logger's clock was not set: ${dateText(at)} is before 2001`;
    if (at > this.lastBelieved_ms)
      return `the logger's clock was not set right: ${dateText(at)} is more than a day in the future`;
    if (at < this.earliestBelieved_ms)
      return `the logger's clock fell back by more than a year, to ${dateText(at)}: it was probably reset`;
    return null;
  }

  private choose([first, second]: [number, number], local_ms: number): number {
    if (local_ms === this.previousLocal && this.isBurst) return this.previous;
    const isSecond =
      this.direction >= 0
        ? this.previous > first || (this.previous === first && !this.isBurst)
        : !(this.previous < second || this.previous === second);
    const picked = isSecond ? second : first;
    // going backwards, the later of the two comes first
    this.twice = this.twice === 'second' || isSecond === this.direction >= 0 ? 'second' : 'first';
    return picked;
  }

  /** A clock that does not follow summer time writes the double hour once: its next stamp is one step on, but an hour and a step later. */
  private leaveDoubleHour(local_ms: number, at: number): void {
    const local = local_ms - this.previousLocal;
    if (
      this.twice === 'first' &&
      this.direction > 0 &&
      local <= HOUR_MS &&
      local <= 2 * this.step &&
      at - this.previous > local
    )
      this.writtenOnce.push(localText(local_ms).slice(0, 10));
    this.twice = 'no';
  }

  private follow(local_ms: number, at: number): void {
    const step = local_ms - this.previousLocal;
    if (this.direction === 0 && step !== 0 && !Number.isNaN(step)) this.direction = Math.sign(step);
    if (step > 0) this.step = step;
    // one damaged stamp far ahead must not put the rest of the file out of belief: two in a row must say so
    if (this.direction > 0)
      this.earliestBelieved_ms = Math.max(this.earliestBelieved_ms, Math.min(at, this.previous) - LONGEST_FALL_MS);
    this.previousLocal = local_ms;
    this.previous = at;
  }
}

const localText = (local_ms: number): string => new Date(local_ms).toISOString().slice(0, 16).replace('T', ' ');

function dateText(at: number): string {
  return Math.abs(at) < 8e15 ? new Date(at).toISOString().slice(0, 16).replace('T', ' ') : 'that date';
}
