import { z } from 'zod';
import { condition, finding, setUpSpan } from '../shapes/finding';
import { readExamination } from '../store/days';
import { type Connection, setting } from '../store/open';
import type { StoredRam } from '../store/rams';
import { recordExtent } from '../store/series-read';
import { METHOD, refreshFigures } from './recompute';

const examination = z.object({
  set_up_spans: z.array(setUpSpan),
  findings: z.array(finding),
  condition,
  sentence: z.string(),
  delivery_against_expected: z.number().nullable(),
  litres_lost_per_day: z.number().nullable(),
});

export type Examination = z.infer<typeof examination> & {
  last_record_ms: number | null;
  days_without_word: number | null;
};

/** Loggers are read a few times a year: only when no record is younger than this is there no word of a ram. */
const NO_WORD_DAYS = 200;

/** The instant for which a page holds: the demonstration's calendar stands still, otherwise it is now. */
export function pageInstant(db: Connection, now_ms: number): number {
  const stands = setting(db, 'demonstration_as_of');
  return stands === null ? now_ms : new Date(stands).getTime();
}

/** What is known of a ram's health at an instant. Results of an older method are made anew first. */
export function examinationOf(db: Connection, ram: StoredRam, at_ms: number): Examination {
  let kept = readExamination(db, ram.id);
  if (kept !== null && kept.method !== METHOD) {
    db.transaction(() => refreshFigures(db, ram))();
    kept = readExamination(db, ram.id);
  }
  const last_record_ms = recordExtent(db, ram.id)?.last_ms ?? null;
  const days_without_word = last_record_ms === null ? null : Math.max(0, (at_ms - last_record_ms) / 86_400_000);
  if (kept === null || last_record_ms === null)
    return {
      set_up_spans: [],
      findings: [],
      condition: 'no word',
      sentence: 'No logger file has been loaded for this ram yet.',
      delivery_against_expected: null,
      litres_lost_per_day: null,
      last_record_ms,
      days_without_word,
    };
  const known = examination.parse(JSON.parse(kept.body));
  if (days_without_word !== null && days_without_word > NO_WORD_DAYS)
    return {
      ...known,
      condition: 'no word',
      sentence: `The last record is ${Math.round(days_without_word)} days old; nothing can be said of the ram today. When last heard of: ${known.sentence}`,
      last_record_ms,
      days_without_word,
    };
  return { ...known, last_record_ms, days_without_word };
}
