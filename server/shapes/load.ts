import { z } from 'zod';
import { channelName } from './channel';
import { fileReading, previewRow, readingQuestion } from './reading';

/** A file that has been received and looked at, before anything is stored. */
export const upload = z.object({
  upload_id: z.string(),
  ram: z.string(),
  file: z.string(),
  bytes: z.number().int(),
  sha256: z.string(),
  already_loaded: z.object({ load_id: z.number().int(), loaded_at: z.iso.datetime() }).nullable(),
  remembered: z
    .boolean()
    .meta({ description: 'True where the reading accepted for this logger last time fits again.' }),
  reading: fileReading,
  questions: z.array(readingQuestion),
  preview: z.array(previewRow),
});
export type Upload = z.infer<typeof upload>;

export const refusal = z.object({ line: z.number().int(), reason: z.string() });
export type Refusal = z.infer<typeof refusal>;

export const channelReceipt = z.object({
  channel: channelName,
  label: z.string(),
  unit: z.string(),
  values: z.number().int(),
  missing: z.number().int(),
});

/** What one load did. */
export const receipt = z.object({
  load_id: z.number().int(),
  ram: z.string(),
  file: z.string(),
  sha256: z.string(),
  bytes: z.number().int(),
  kind: z.enum(['log', 'burst']),
  loaded_at: z.iso.datetime(),
  rows_read: z.number().int(),
  rows_new: z.number().int(),
  rows_known: z.number().int().meta({ description: 'Rows that were already stored, value for value.' }),
  rows_contradicting: z
    .number()
    .int()
    .meta({ description: 'Rows that an earlier file told otherwise; the newer file wins.' }),
  rows_refused: z.number().int(),
  refusals: z.array(refusal).meta({ description: 'The first of the refused lines, with the reason.' }),
  notes: z.array(z.string()).meta({ description: 'What else a person should know of this file.' }),
  first_at: z.iso.datetime().nullable(),
  last_at: z.iso.datetime().nullable(),
  step_s: z.number().nullable().meta({ description: 'Usual time between records.' }),
  gaps: z.array(z.object({ from: z.iso.datetime(), to: z.iso.datetime() })),
  channels: z.array(channelReceipt),
  days_recomputed: z.number().int(),
  reading: fileReading,
});
export type Receipt = z.infer<typeof receipt>;

/** How far a load has come. */
export const loadProgress = z.object({
  job_id: z.string(),
  ram: z.string(),
  file: z.string(),
  stage: z.enum(['waiting', 'reading', 'computing', 'done', 'failed']),
  share: z.number().min(0).max(1),
  rows: z.number().int(),
  load_id: z.number().int().nullable(),
  error: z.string().nullable(),
});
export type LoadProgress = z.infer<typeof loadProgress>;
