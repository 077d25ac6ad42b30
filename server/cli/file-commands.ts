import { statSync } from 'node:fs';
import path from 'node:path';
import { inspectFile, inspectWith } from '../ingest/inspect';
import { fileSource } from '../ingest/source';
import { beatsOfFile } from '../loading/beats-of-file';
import { sha256Of } from '../loading/file-identity';
import { type FileToLoad, loadFile, ramContext } from '../loading/load-file';
import type { Receipt } from '../shapes/load';
import { UserError } from '../shapes/problem';
import { type FileReading, fileReading } from '../shapes/reading';
import { loadOfFile, loadReceipt } from '../store/loads';
import { type Connection, openStore } from '../store/open';
import { findRam, type StoredRam } from '../store/rams';
import { ownData, print, readJson, readOptions, required } from './options';
import { table } from './table';

/** Corrections to the guessed reading that the command line offers; the rest by --reading FILE.json. */
const readingOptions = {
  ram: { type: 'string' },
  reading: { type: 'string' },
  'day-order': { type: 'string' },
  zone: { type: 'string' },
  'start-at': { type: 'string' },
  inspect: { type: 'boolean' },
} as const;

interface Corrections {
  reading?: string;
  'day-order'?: string;
  zone?: string;
  'start-at'?: string;
}

export async function loadCommand(args: string[]): Promise<number> {
  const { values, positionals: files } = readOptions(args, readingOptions);
  if (files.length === 0) throw new UserError('Which files? Expected clackwatch load FILE… --ram NAME.');
  const db = openStore(values.data ?? ownData());
  const results: object[] = [];
  let worst = 0;
  try {
    const ram = findRam(db, required(values.ram, '--ram NAME'));
    for (const place of files) {
      try {
        results.push(values.inspect ? await inspectOne(db, ram, place, values) : await loadOne(db, ram, place, values));
      } catch (error) {
        if (!(error instanceof UserError)) throw error;
        // one bad file does not stop the others
        process.stderr.write(`${error.message}\n`);
        results.push({ file: path.basename(place), error: error.message });
        worst = 2;
      }
    }
  } finally {
    db.close();
  }
  const readable = results.filter((one) => !('error' in one));
  print(values.json, files.length === 1 ? results[0] : results, () =>
    readable.flatMap((one) =>
      values.inspect ? inspectionLines(one) : receiptLines(one as Receipt & { already_loaded?: boolean }),
    ),
  );
  return worst;
}

export async function beatsCommand(args: string[]): Promise<number> {
  const { values, positionals } = readOptions(args, readingOptions);
  const place = required(positionals[0], 'The file with the burst');
  const db = openStore(values.data ?? ownData());
  try {
    const ram = findRam(db, required(values.ram, '--ram NAME'));
    const file = await fileAt(place);
    const reading = await acceptedReading(db, ram, file, values);
    const beats = await beatsOfFile(db, ram, file, reading, Date.now());
    print(values.json, beats, () => [
      beats.beats_per_min === null
        ? `${file.name}: no beats found.`
        : `${file.name}: ${beats.beats.length} beats in ${beats.seconds.toFixed(1)} s, ${beats.beats_per_min.value.toFixed(2)} a minute (${beats.beats_per_min.low.toFixed(2)} to ${beats.beats_per_min.high.toFixed(2)}).`,
      ...beats.notes,
    ]);
    return 0;
  } finally {
    db.close();
  }
}

async function fileAt(place: string): Promise<FileToLoad> {
  let bytes: number;
  try {
    const found = statSync(place);
    if (!found.isFile()) throw new UserError(`${place} is not a file.`);
    bytes = found.size;
  } catch (error) {
    if (error instanceof UserError) throw error;
    throw new UserError(`${place} cannot be opened. Is the name right?`, 'not found');
  }
  return { path: place, name: path.basename(place), bytes, sha256: await sha256Of(place) };
}

/** The guessed reading with the corrections of the command line; what remains undecided is asked as an error. */
async function acceptedReading(
  db: Connection,
  ram: StoredRam,
  file: FileToLoad,
  corrections: Corrections,
): Promise<FileReading> {
  const looked = await look(db, ram, file, corrections);
  const open = looked.questions.find((question) => question.must_answer);
  if (open !== undefined) {
    const options =
      open.about === 'day order'
        ? ' Answer with --day-order "day first" or --day-order "month first".'
        : open.about === 'start of burst'
          ? ' Answer with --start-at INSTANT.'
          : ' Answer with --reading FILE.json (start from the "reading" that --inspect --json prints).';
    throw new UserError(`${file.name}: ${open.question}${options} Nothing was stored.`, 'cannot be read');
  }
  return looked.reading;
}

async function look(db: Connection, ram: StoredRam, file: FileToLoad, corrections: Corrections) {
  const source = fileSource(file.path, file.name);
  const context = ramContext(db, ram, Date.now());
  const looked = corrections.reading === undefined ? await inspectFile(source, context) : null;
  const base = looked?.reading ?? readJson(corrections.reading!, fileReading);
  const time = {
    ...base.time,
    ...(corrections['day-order'] === undefined ? {} : { day_order: corrections['day-order'] }),
    ...(corrections.zone === undefined ? {} : { zone: corrections.zone }),
    ...(corrections['start-at'] === undefined ? {} : { start_at: corrections['start-at'] }),
  };
  const corrected = fileReading.safeParse({ ...base, time });
  if (!corrected.success)
    throw new UserError(
      `The reading of ${file.name} is not understood: ${corrected.error.issues[0]?.path.join('.')}: ${corrected.error.issues[0]?.message}`,
    );
  const changed = looked === null || JSON.stringify(corrected.data) !== JSON.stringify(looked.reading);
  return changed ? await inspectWith(source, context, corrected.data) : looked;
}

async function loadOne(
  db: Connection,
  ram: StoredRam,
  place: string,
  corrections: Corrections,
): Promise<Receipt & { already_loaded?: boolean }> {
  const file = await fileAt(place);
  const before = loadOfFile(db, ram.id, file.sha256);
  if (before !== null) {
    const earlier = loadReceipt(db, before.load_id);
    // the same file brings nothing: every row of it is known
    return {
      ...earlier,
      rows_known: earlier.rows_new + earlier.rows_known + earlier.rows_contradicting,
      rows_new: 0,
      rows_contradicting: 0,
      already_loaded: true,
    };
  }
  const reading = await acceptedReading(db, ram, file, corrections);
  const talks = process.stderr.isTTY;
  const receipt = await loadFile(db, ram, file, reading, {
    now_ms: Date.now(),
    onProgress: (stage, share, rows) => {
      if (talks) process.stderr.write(`\r${file.name}: ${stage} ${Math.round(share * 100)} %, ${rows} rows   `);
    },
  });
  if (talks) process.stderr.write('\n');
  return receipt;
}

async function inspectOne(db: Connection, ram: StoredRam, place: string, corrections: Corrections): Promise<object> {
  const file = await fileAt(place);
  return {
    file: file.name,
    sha256: file.sha256,
    already_loaded: loadOfFile(db, ram.id, file.sha256),
    ...(await look(db, ram, file, corrections)),
  };
}

function receiptLines(receipt: Receipt & { already_loaded?: boolean }): string[] {
  if (receipt.already_loaded)
    return [
      `${receipt.file}: loaded before, on ${receipt.loaded_at.slice(0, 10)} (load ${receipt.load_id}); nothing to add.`,
    ];
  return [
    `${receipt.file}: ${receipt.rows_read} rows read, ${receipt.rows_new} new, ${receipt.rows_known} known, ${receipt.rows_contradicting} contradicting, ${receipt.rows_refused} refused (load ${receipt.load_id}).`,
    ...(receipt.first_at === null
      ? []
      : [
          `  Records from ${receipt.first_at} to ${receipt.last_at}, every ${receipt.step_s} s, ${receipt.gaps.length} gaps.`,
        ]),
    ...table(
      ['  column', 'read as', 'unit', 'values', 'missing'],
      receipt.channels.map((c) => [`  ${c.label}`, c.channel, c.unit, String(c.values), String(c.missing)]),
    ),
    ...receipt.notes.map((note) => `  ${note}`),
    ...receipt.refusals.slice(0, 10).map((refusal) => `  line ${refusal.line}: ${refusal.reason}`),
    ...(receipt.refusals.length > 10 ? [`  … and ${receipt.refusals.length - 10} more lines; --json has them.`] : []),
  ];
}

function inspectionLines(one: object): string[] {
  return [JSON.stringify(one, null, 2)];
}
