/**
 * Fast samples whose stamps are written to the whole second share a stamp: they are spread evenly over it, in place. A group with
 * fewer samples than usual at the start of a burst ends with its second, one at the end begins with it.
 * @param ready samples of whole groups; those from `ready` to `count` belong to the group that is still running
 * @param usualGroup samples to a stamp as seen so far, 0 where nothing has been seen
 */
export function spreadEqualStamps(
  times_ms: Float64Array,
  count: number,
  ready: number,
  usualGroup: number,
): { spread: number; usualGroup: number } {
  let usual = usualGroup;
  for (let from = 0; from < ready; ) {
    const to = groupEnd(times_ms, from, ready);
    usual = Math.max(usual, to - from);
    from = to;
  }
  if (usual < 2) return { spread: 0, usualGroup: usual };
  let spread = 0;
  let span = Number.POSITIVE_INFINITY;
  for (let from = 0; from < ready; ) {
    const to = groupEnd(times_ms, from, ready);
    const stamp = times_ms[from]!;
    const next = to < count ? times_ms[to]! : stamp + span;
    if (next > stamp) span = Math.min(span, next - stamp, 1000);
    if (!Number.isFinite(span)) span = 1000;
    const step = span / usual;
    const size = to - from;
    // a burst that begins within a second has lost the first samples of it
    const begins = from === 0 && usualGroup === 0 && size < usual && next - stamp <= 1000;
    for (let i = 1; i <= size; i++) times_ms[to - i] = stamp + (begins ? usual - i : size - i) * step;
    if (size > 1) spread += size;
    from = to;
  }
  return { spread, usualGroup: usual };
}

function groupEnd(times_ms: Float64Array, from: number, ready: number): number {
  let to = from + 1;
  while (to < ready && times_ms[to] === times_ms[from]) to++;
  return to;
}
