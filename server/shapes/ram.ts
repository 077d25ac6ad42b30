import { z } from 'zod';
import { channelName } from './channel';
import { figure, spanFigures } from './figure';
import { condition, finding, setUpSpan } from './finding';
import { installation } from './installation';
import { visit } from './visit';

/** One line of the rounds: the ram that needs a visit first stands on top. */
export const roundsRow = z.object({
  ram: z.string(),
  key: z.string().meta({ description: 'Name of the ram in addresses.' }),
  condition,
  sentence: z.string().meta({ description: 'Why the ram stands where it stands, in one sentence.' }),
  finding: finding.nullable(),
  litres_lost_per_day: z.number().nullable(),
  people_served: z.number().int().nullable(),
  last_record_at: z.iso.datetime().nullable(),
  days_without_word: z.number().nullable(),
  latest: z
    .object({
      date: z.iso.date(),
      beats_per_min: figure.nullable(),
      delivery_l_per_day: figure.nullable(),
      efficiency_daubuisson: figure.nullable(),
      fall_m: figure.nullable(),
    })
    .nullable(),
  delivery_against_expected: z
    .number()
    .nullable()
    .meta({ description: 'Delivery over the last two weeks as a share of expectation.' }),
  recent_delivery_l_per_day: z.array(z.number().nullable()).meta({ description: 'The last 60 days, oldest first.' }),
});
export type RoundsRow = z.infer<typeof roundsRow>;

export const rounds = z.object({
  as_of: z.iso.datetime().meta({ description: 'The instant for which the rounds hold.' }),
  demonstration: z.boolean(),
  rows: z.array(roundsRow),
});
export type Rounds = z.infer<typeof rounds>;

export const storedVisit = visit.extend({ visit_id: z.number().int(), at: z.iso.datetime(), on: z.iso.date() });
export type StoredVisit = z.infer<typeof storedVisit>;

export const channelExtent = z.object({
  channel: channelName,
  unit: z.string(),
  first_at: z.iso.datetime(),
  last_at: z.iso.datetime(),
  values: z.number().int(),
});

/** Everything the ram's page needs but its series. */
export const ramDetail = z.object({
  key: z.string(),
  installation,
  condition,
  sentence: z.string(),
  as_of: z.iso.datetime(),
  first_record_at: z.iso.datetime().nullable(),
  last_record_at: z.iso.datetime().nullable(),
  channels: z.array(channelExtent),
  set_up_span: setUpSpan.nullable(),
  latest: spanFigures.nullable().meta({ description: 'Figures of the latest good day.' }),
  findings: z.array(finding),
  visits: z.array(storedVisit),
  loads: z.array(
    z.object({ load_id: z.number().int(), file: z.string(), loaded_at: z.iso.datetime(), rows_new: z.number().int() }),
  ),
  bursts: z.array(
    z.object({
      burst_id: z.number().int(),
      at: z.iso.datetime(),
      seconds: z.number(),
      beats_per_min: z.number().nullable(),
    }),
  ),
});
export type RamDetail = z.infer<typeof ramDetail>;
