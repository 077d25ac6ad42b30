import { UserError } from '../shapes/problem';
import { type Visit, visit } from '../shapes/visit';
import type { Connection } from './open';

export interface KeptVisit {
  id: number;
  at_ms: number;
  visit: Visit;
}

export function listVisits(db: Connection, ramId: number): KeptVisit[] {
  const rows = db.prepare('select id, at_ms, body from visit where ram_id = ? order by at_ms').all(ramId) as {
    id: number;
    at_ms: number;
    body: string;
  }[];
  return rows.map((row) => ({ id: row.id, at_ms: row.at_ms, visit: visit.parse(JSON.parse(row.body)) }));
}

export function addVisit(db: Connection, ramId: number, at_ms: number, entered: Visit): KeptVisit {
  const taken = db.prepare('select 1 from visit where ram_id = ? and at_ms = ?').get(ramId, at_ms);
  if (taken !== undefined)
    throw new UserError(
      `A visit at ${entered.visited_at} is already kept for this ram. Nothing was added.`,
      'already there',
    );
  const { lastInsertRowid } = db
    .prepare('insert into visit (ram_id, at_ms, body) values (?, ?, ?)')
    .run(ramId, at_ms, JSON.stringify(entered));
  return { id: Number(lastInsertRowid), at_ms, visit: entered };
}
