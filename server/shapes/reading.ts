import { z } from 'zod';
import { channelName } from './channel';

export const textEncoding = z.enum(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252']);
export type TextEncoding = z.infer<typeof textEncoding>;

/** How the stamps of a file are written. `fields` are dates written out; the others are plain numbers. */
export const timeForm = z.enum([
  'fields',
  'epoch seconds',
  'epoch milliseconds',
  'spreadsheet days',
  'seconds from start',
]);

export const timeReading = z.object({
  columns: z
    .array(z.number().int().min(0))
    .min(1)
    .max(2)
    .meta({ description: 'Column of the stamp, or of date and of time. From 0.' }),
  form: timeForm,
  day_order: z
    .enum(['day first', 'month first', 'year first'])
    .nullable()
    .meta({ description: 'Order of the date fields; null where the file does not tell.' }),
  zone: z
    .string()
    .regex(/^(ram|utc|[+-]\d{2}:\d{2}|[A-Za-z_]+(\/[A-Za-z0-9_+-]+)+)$/)
    .meta({
      description: "'ram' (local time of the ram's zone), 'utc', a fixed offset such as +05:45, or an IANA zone.",
    }),
  stamp_marks: z
    .enum(['end', 'start'])
    .meta({ description: 'Whether a stamp marks the end or the start of its interval.' }),
  start_at: z.iso.datetime().nullable().meta({ description: "Start of the burst, UTC, for 'seconds from start'." }),
});
export type TimeReading = z.infer<typeof timeReading>;

export const columnReading = z.object({
  index: z.number().int().min(0),
  label: z.string(),
  channel: channelName.nullable().meta({ description: 'Null: the column is kept in the original only.' }),
  unit: z
    .string()
    .nullable()
    .meta({ description: 'Unit of the column; null means the unit of the sensor or of the channel.' }),
});
export type ColumnReading = z.infer<typeof columnReading>;

/** Everything needed to read one file, guessed from the file, correctable, and remembered for the logger. */
export const fileReading = z.object({
  kind: z.enum(['log', 'burst']).meta({ description: 'A slow log, or a burst of fast pressure samples.' }),
  encoding: textEncoding,
  delimiter: z.enum([',', ';', '\t', '|', ' ']).meta({ description: 'A blank stands for a run of blanks.' }),
  decimal_mark: z.enum(['.', ',']),
  header_line: z.number().int().min(1).nullable(),
  units_line: z.number().int().min(1).nullable(),
  first_record_line: z.number().int().min(1),
  time: timeReading,
  columns: z.array(columnReading),
});
export type FileReading = z.infer<typeof fileReading>;

/** Something the file itself cannot decide, asked plainly. */
export const readingQuestion = z.object({
  about: z.enum(['day order', 'channel', 'time zone', 'start of burst', 'unit']),
  question: z.string(),
  column: z.number().int().nullable(),
  choices: z.array(z.object({ label: z.string(), value: z.string() })),
  must_answer: z.boolean().meta({ description: 'True where nothing can be stored before it is answered.' }),
});
export type ReadingQuestion = z.infer<typeof readingQuestion>;

export const previewRow = z.object({
  line: z.number().int(),
  words: z.array(z.string()).meta({ description: "The row in the file's own words." }),
  at: z.iso.datetime().nullable(),
  values: z
    .array(z.number().nullable())
    .meta({ description: 'One per column of the reading, in the unit of the file.' }),
  refused: z.string().nullable(),
});
export type PreviewRow = z.infer<typeof previewRow>;
