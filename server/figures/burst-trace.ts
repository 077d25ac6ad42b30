/** The most points a drawn trace has; more are drawn as least and greatest of each bucket. */
const MOST = 4000;

/** A burst's pressure as a page draws it: the valve box where it was measured, else the chamber. */
export function traceOf(burst: {
  beats: { samples_per_s: number };
  traces: { channel: string; unit: string; values: Float64Array }[];
}): { channel: string; unit: string; at_s: number[]; min: (number | null)[]; max: (number | null)[] } {
  const trace = burst.traces.find((one) => one.channel === 'valve_box_pressure') ?? burst.traces[0];
  const out = {
    channel: trace?.channel ?? '',
    unit: trace?.unit ?? '',
    at_s: [] as number[],
    min: [] as (number | null)[],
    max: [] as (number | null)[],
  };
  if (trace === undefined) return out;
  const per = Math.max(1, Math.ceil(trace.values.length / MOST));
  for (let first = 0; first < trace.values.length; first += per) {
    let least = Number.POSITIVE_INFINITY;
    let greatest = Number.NEGATIVE_INFINITY;
    for (let i = first; i < Math.min(first + per, trace.values.length); i++) {
      const value = trace.values[i]!;
      if (value < least) least = value;
      if (value > greatest) greatest = value;
    }
    const empty = least > greatest;
    out.at_s.push(Number(((first + (per - 1) / 2) / burst.beats.samples_per_s).toFixed(5)));
    out.min.push(empty ? null : least);
    out.max.push(empty ? null : greatest);
  }
  return out;
}
