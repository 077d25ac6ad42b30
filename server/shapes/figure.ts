import { z } from 'zod';

/** How a figure was obtained, best first. `stated` is a number taken from the installation sheet as it stands. */
export const footing = z.enum(['metered', 'from tank', 'bucket-scaled', 'from beats', 'from theory', 'stated']);
export type Footing = z.infer<typeof footing>;

/** A figure with its 95 % interval, its footing and the input that dominates its doubt. */
export const figure = z.object({
  value: z.number(),
  low: z.number(),
  high: z.number(),
  footing,
  dominated_by: z.string().optional().meta({ description: 'The input that contributes most to the interval.' }),
});
export type Figure = z.infer<typeof figure>;

/** What a ram should do at a day's fall and lift, with a 95 % interval. */
export const expectation = z.object({ value: z.number(), low: z.number(), high: z.number() });
export type Expectation = z.infer<typeof expectation>;

/** The figures of one span of time (an interval, an hour or a local day). Null where the sensors do not allow a figure. */
export const spanFigures = z.object({
  from: z.iso.datetime().meta({ description: 'Start of the span, UTC.' }),
  to: z.iso.datetime().meta({ description: 'End of the span, UTC.' }),
  date: z.iso.date().optional().meta({ description: "The local day in the ram's zone, where the span is a day." }),
  coverage: z.number().min(0).max(1).meta({ description: 'Share of the span for which usable records exist.' }),
  running_share: z
    .number()
    .min(0)
    .max(1)
    .nullable()
    .meta({ description: 'Share of the covered time in which the ram beat.' }),
  fall_m: figure.nullable(),
  lift_m: figure.nullable(),
  chamber_head_m: figure
    .nullable()
    .meta({ description: 'Mean chamber pressure as a head above the waste valve outlet.' }),
  chamber_ripple_kpa: figure.nullable(),
  beats_per_min: figure.nullable().meta({ description: 'Beats over covered time; a stopped ram counts as 0.' }),
  beats_per_min_running: figure.nullable().meta({ description: 'Beats over the time in which the ram beat.' }),
  delivery_l_per_day: figure.nullable(),
  tank_inflow_l_per_day: figure
    .nullable()
    .meta({ description: 'Delivery as the tank sees it, kept beside a meter at the ram.' }),
  waste_l_per_day: figure.nullable(),
  drive_l_per_day: figure.nullable(),
  delivered_l_per_beat: figure.nullable(),
  waste_l_per_beat: figure.nullable(),
  efficiency_daubuisson: figure.nullable(),
  efficiency_rankine: figure.nullable(),
});
export type SpanFigures = z.infer<typeof spanFigures>;

/** Observables that can be compared with what the ram should do. */
export const observable = z.enum([
  'beats_per_min',
  'delivered_l_per_beat',
  'waste_l_per_beat',
  'delivery_l_per_day',
  'chamber_head_m',
  'chamber_ripple_kpa',
  'tank_against_meter',
]);
export type Observable = z.infer<typeof observable>;

/** A local day's figures with what was expected of the ram at that day's fall and lift. */
export const dayFigures = spanFigures.extend({
  date: z.iso.date(),
  expected: z.partialRecord(observable, expectation),
});
export type DayFigures = z.infer<typeof dayFigures>;
