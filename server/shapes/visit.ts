import { z } from 'zod';

/** What was done at a ram, in trade words. */
export const visitAction = z.enum([
  'cleaned strainer',
  'cleaned intake',
  'flushed drive pipe',
  'repaired drive pipe',
  'replaced waste valve rubber',
  'adjusted stroke',
  'replaced delivery valve rubber',
  'recharged air chamber',
  'cleared snifter',
  'cleared delivery pipe',
  'repaired delivery pipe',
  'tightened bolts',
  'restarted',
  'stopped on purpose',
  'replaced logger battery',
  'set logger clock',
  'zeroed sensor',
  'other',
]);
export type VisitAction = z.infer<typeof visitAction>;

/** Actions after which the ram is not the ram it was: they open a new set-up span. */
export const actionsThatChangeTheRam: readonly VisitAction[] = ['adjusted stroke'];

export const bucketTest = z.object({
  of: z.enum(['delivery', 'waste']),
  litres: z
    .number()
    .gt(0, { error: (i) => `a bucket of ${i.input} litres; it must be above 0` })
    .max(10_000),
  seconds: z
    .array(
      z
        .number()
        .gt(0, { error: (i) => `a filling time of ${i.input} s; it must be above 0` })
        .max(86_400),
    )
    .min(1)
    .max(20)
    .meta({ description: 'Filling time of each repeat.' }),
});
export type BucketTest = z.infer<typeof bucketTest>;

export const visit = z.object({
  visited_at: z.iso
    .datetime({ offset: true, local: true })
    .or(z.iso.date())
    .meta({ description: 'When, as local time of the ram (2031-05-03T10:20), with an offset, or the day alone.' }),
  who: z.string().max(80).optional(),
  running_on_arrival: z.boolean().optional(),
  bucket_tests: z.array(bucketTest).max(20).default([]),
  counted_beats: z
    .object({ beats: z.number().int().gt(0), seconds: z.number().gt(0) })
    .optional()
    .meta({ description: 'Beats counted by ear or eye over a stopwatch time, at the bucket tests.' }),
  fall_m: z.number().gt(0).max(60).optional().meta({ description: 'Fall measured on the day.' }),
  gauge_kpa: z.number().min(0).max(5_000).optional(),
  tank_level_m: z.number().min(0).max(50).optional(),
  logger_clock: z
    .object({
      logger: z.iso.datetime({ offset: true, local: true }),
      true_time: z.iso.datetime({ offset: true, local: true }),
    })
    .optional(),
  actions: z.array(visitAction).max(20).default([]),
  opens_set_up_span: z.boolean().optional().meta({
    description: 'Whether what was done makes earlier expectations void; decided from the actions unless stated.',
  }),
  parts_used: z.array(z.string().max(80)).max(40).default([]),
  note: z.string().max(4_000).optional(),
});
export type Visit = z.infer<typeof visit>;
