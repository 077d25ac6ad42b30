import { z } from 'zod';
import { examinationOf, pageInstant } from '../figures/examination';
import { instantOf } from '../figures/local-days';
import { visitsOf } from '../figures/ram-detail';
import { refreshFigures } from '../figures/recompute';
import { everyChoices, figuresOf } from '../figures/span-figures';
import { installation } from '../shapes/installation';
import { UserError } from '../shapes/problem';
import { visit } from '../shapes/visit';
import type { Connection } from '../store/open';
import { openStore } from '../store/open';
import { addRam, findRam, listRams } from '../store/rams';
import { addVisit } from '../store/visits';
import { ownData, print, readJson, readOptions, required } from './options';
import { shown, table } from './table';

/** Opens the data folder for the length of one command. */
export function withStore<T>(data: string | undefined, work: (db: Connection) => T): T {
  const db = openStore(data ?? ownData());
  try {
    return work(db);
  } finally {
    db.close();
  }
}

export function ramsCommand(args: string[]): number {
  const { values, positionals } = readOptions(args, {});
  const [verb, file] = positionals;
  if (verb === 'schema') {
    process.stdout.write(`${JSON.stringify(z.toJSONSchema(installation, { io: 'input' }), null, 2)}\n`);
    return 0;
  }
  if (verb === 'add') {
    const described = readJson(required(file, 'The file with the description of the ram'), installation);
    const ram = withStore(values.data, (db) => addRam(db, described));
    print(values.json, { key: ram.key, name: ram.name }, () => [`Added ${ram.name}.`]);
    return 0;
  }
  if (verb !== undefined && verb !== 'list')
    throw new UserError(`"rams ${verb}" is not a command; expected rams, rams add FILE.json or rams schema.`);
  withStore(values.data, (db) => {
    const at_ms = pageInstant(db, Date.now());
    const rows = listRams(db).map((ram) => {
      const { condition, sentence } = examinationOf(db, ram, at_ms);
      return { key: ram.key, name: ram.name, condition, sentence, installation: ram.installation };
    });
    print(values.json, rows, () =>
      rows.length === 0
        ? ['No rams yet. Add one: clackwatch rams add FILE.json']
        : table(
            ['ram', 'condition', 'why'],
            rows.map((row) => [row.name, row.condition, row.sentence]),
          ),
    );
  });
  return 0;
}

export function visitsCommand(args: string[]): number {
  const { values, positionals } = readOptions(args, { ram: { type: 'string' } });
  const [verb, file] = positionals;
  const name = required(values.ram, '--ram NAME');
  if (verb === 'add') {
    const body = readJson(required(file, 'The file with the visit'), z.union([visit, z.array(visit).min(1)]));
    const entered = Array.isArray(body) ? body : [body];
    const kept = withStore(values.data, (db) => {
      const ram = findRam(db, name);
      // all of the file's visits or none
      return db.transaction(() => {
        const ids = entered.map(
          (one) => addVisit(db, ram.id, instantOf(one.visited_at, ram.installation.time_zone), one).id,
        );
        refreshFigures(db, ram);
        return visitsOf(db, ram).filter((one) => ids.includes(one.visit_id));
      })();
    });
    print(values.json, kept, () => [`Kept ${kept.length} visit${kept.length === 1 ? '' : 's'} of ${name}.`]);
    return 0;
  }
  if (verb !== undefined && verb !== 'list')
    throw new UserError(`"visits ${verb}" is not a command; expected visits list or visits add FILE.json.`);
  withStore(values.data, (db) => {
    const rows = visitsOf(db, findRam(db, name));
    print(values.json, rows, () =>
      table(
        ['on', 'who', 'actions', 'note'],
        rows.map((row) => [row.on, row.who ?? '', row.actions.join(', '), row.note ?? '']),
      ),
    );
  });
  return 0;
}

export function figuresCommand(args: string[]): number {
  const { values } = readOptions(args, {
    ram: { type: 'string' },
    from: { type: 'string' },
    to: { type: 'string' },
    every: { type: 'string' },
  });
  const name = required(values.ram, '--ram NAME');
  const every = z.enum(everyChoices).safeParse(values.every ?? 'day');
  if (!every.success)
    throw new UserError(`--every ${values.every} is not known; expected one of ${everyChoices.join(', ')}.`);
  withStore(values.data, (db) => {
    const ram = findRam(db, name);
    const at = (stamp: string | undefined) =>
      stamp === undefined ? null : instantOf(stamp, ram.installation.time_zone);
    const rows = figuresOf(db, ram, { from_ms: at(values.from), to_ms: at(values.to) }, every.data);
    print(values.json, rows, () =>
      table(
        [
          every.data === 'day' ? 'day' : 'from (UTC)',
          'fall m',
          'beats/min',
          'delivery L/day',
          'footing',
          "D'Aubuisson",
          'Rankine',
        ],
        rows.map((row) => [
          row.date ?? row.from.slice(0, 16),
          shown(row.fall_m),
          shown(row.beats_per_min),
          shown(row.delivery_l_per_day),
          row.delivery_l_per_day?.footing ?? '',
          shown(row.efficiency_daubuisson),
          shown(row.efficiency_rankine),
        ]),
      ),
    );
  });
  return 0;
}

/** Exit status 3 tells a scheduled job that somebody should go now. */
export function findingsCommand(args: string[]): number {
  const { values } = readOptions(args, { ram: { type: 'string' }, all: { type: 'boolean' } });
  return withStore(values.data, (db) => {
    const at_ms = pageInstant(db, Date.now());
    const rams = values.ram === undefined ? listRams(db) : [findRam(db, values.ram)];
    const found = rams
      .flatMap((ram) => examinationOf(db, ram, at_ms).findings)
      .filter((one) => values.json || values.all || one.open);
    print(values.json, found, () =>
      found.length === 0
        ? ['Nothing to say: no open findings.']
        : found.flatMap((one) => [
            `${one.ram}: ${one.class}${one.open ? '' : ` (ended ${one.ended_on ?? ''})`}`,
            `  ${one.sentence}`,
            `  Began ${one.began_on}, noticed ${one.noticed_on}. Likeliest: ${one.causes
              .slice(0, 2)
              .map((c) => `${c.cause} (${Math.round(c.probability * 100)} %)`)
              .join(', ')}.`,
            ...one.checks.slice(0, 3).map((check, i) => `  ${i + 1}. ${check}`),
            ...(one.cautions.length > 0 ? [`  Take care: ${one.cautions[0]}`] : []),
          ]),
    );
    return found.some((one) => one.open && one.class === 'go now') ? 3 : 0;
  });
}
