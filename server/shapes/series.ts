import { z } from 'zod';

const column = z.array(z.number().nullable());

/** At most 1,000 buckets of least, mean and greatest, column by column so that a phone parses them quickly. */
export const bucketSeries = z.object({
  name: z.string().meta({ description: 'A channel, or a figure such as fall_m.' }),
  unit: z.string(),
  from: z.iso.datetime(),
  to: z.iso.datetime(),
  at_ms: z.array(z.number()).meta({ description: 'Middle of each bucket, UTC milliseconds.' }),
  min: column,
  mean: column,
  max: column,
});
export type BucketSeries = z.infer<typeof bucketSeries>;

/** The season charts of one ram on one time axis: a figure with its interval and what was expected. */
export const seasonFigure = z.object({
  min: column,
  mean: column,
  max: column,
  low: column.meta({ description: 'Lower end of the 95 % interval, mean over the bucket.' }),
  high: column,
  expected_low: column,
  expected_high: column,
});

export const seasonCharts = z.object({
  from: z.iso.datetime(),
  to: z.iso.datetime(),
  days_per_bucket: z.number(),
  at_ms: z.array(z.number()),
  fall_m: seasonFigure,
  beats_per_min: seasonFigure,
  delivery_l_per_day: seasonFigure,
  efficiency_daubuisson: seasonFigure,
});
export type SeasonCharts = z.infer<typeof seasonCharts>;

export const burstBeat = z.object({
  closed_at_s: z.number().meta({ description: 'Closing of the waste valve, seconds from the first sample.' }),
  period_s: z.number().nullable().meta({ description: 'Time to the next closing; null for the last.' }),
  peak_kpa: z.number().nullable(),
  doubtful: z.boolean(),
});

/** What a burst of fast pressure samples tells. */
export const burstBeats = z.object({
  at: z.iso.datetime().nullable(),
  seconds: z.number(),
  samples_per_s: z.number(),
  channel: z.string(),
  beats_per_min: z.object({ value: z.number(), low: z.number(), high: z.number() }).nullable(),
  beats: z.array(burstBeat),
  notes: z.array(z.string()),
});
export type BurstBeats = z.infer<typeof burstBeats>;
