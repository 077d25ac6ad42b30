import { z } from 'zod';
import { observable } from './figure';

export const condition = z.enum(['holding', 'slipping', 'failing', 'stopped', 'no word']);
export type Condition = z.infer<typeof condition>;

export const findingClass = z.enum(['watch', 'plan a visit', 'go now']);
export type FindingClass = z.infer<typeof findingClass>;

export const cause = z.enum([
  'waste valve leaking',
  'waste valve stroke grown',
  'waste valve stroke shrunk',
  'delivery valve leaking back',
  'air chamber losing air',
  'intake or drive pipe blocked',
  'air in the drive pipe',
  'delivery pipe leaking',
  'delivery pipe partly blocked',
  'less water at the source',
  'stopped with the waste valve open',
  'stopped with the waste valve shut',
  'stopped, source dry',
  'sensor in doubt',
  'not told by these sensors',
]);
export type Cause = z.infer<typeof cause>;

/** A dated departure from what the ram should do. */
export const finding = z.object({
  finding_id: z.string().meta({ description: 'Stable while the same departure lasts.' }),
  ram: z.string(),
  class: findingClass,
  open: z.boolean(),
  began_on: z.iso.date().meta({ description: 'When the change began, from all the data.' }),
  noticed_on: z.iso.date().meta({ description: 'First day on which the data up to that day suffice.' }),
  ended_on: z.iso.date().nullable(),
  observable: observable.nullable().meta({ description: 'The observable whose chart signalled; null for a stop.' }),
  size: z.object({ value: z.number(), low: z.number(), high: z.number() }).nullable().meta({
    description: 'Relative change against expectation, such as -0.12, over the latest two weeks, with a 95 % interval.',
  }),
  sentence: z.string(),
  causes: z.array(z.object({ cause, probability: z.number().min(0).max(1) })).meta({ description: 'Likeliest first.' }),
  tied: z.array(cause).meta({ description: 'Causes that the fitted sensors cannot tell apart.' }),
  evidence: z.array(z.object({ text: z.string(), speaks: z.enum(['for', 'against']) })),
  checks: z.array(z.string()).meta({ description: 'What to do at the ram, in order.' }),
  cautions: z.array(z.string()),
  parts: z.array(z.string()),
  litres_lost_per_day: z.number().nullable(),
  litres_lost: z.number().nullable(),
});
export type Finding = z.infer<typeof finding>;

export const setUpSpan = z.object({
  from: z.iso.date(),
  to: z.iso.date(),
  days: z.number().int(),
  provisional: z.boolean().meta({ description: 'True while fewer than 20 good days are in it.' }),
});
export type SetUpSpan = z.infer<typeof setUpSpan>;
