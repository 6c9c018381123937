import type { EntityManager } from 'typeorm';
import type { RecordedChange } from '../../../shared/contract/set-up.js';
import { PersonRow } from '../../database/entities/index.js';
import { insertRows } from '../book/bulk.js';

/** What somebody did in set-up. `before` and `after` hold no secrets: no PIN, no password, no hash. */
export interface ChangeToRecord {
  /** The person's id; null: nobody signed in (a one-time link, the mill's own hand). */
  readonly by: string | null;
  /** Milliseconds since 1970. */
  readonly at: number;
  /** e.g. `loom`, `cloth`, `person`, `pattern`. */
  readonly what: string;
  /** The thing's own name at that moment, e.g. "Loom 14". */
  readonly name: string;
  readonly action: RecordedChange['action'];
  readonly effectiveAt?: number | null;
  readonly before?: object | null;
  readonly after?: object | null;
  readonly reason?: string | null;
}

/** Appends to the record of changes, inside the writer's transaction of the change itself. Gives the row's number. */
export async function recordChange(tx: EntityManager, change: ChangeToRecord): Promise<number> {
  await recordChanges(tx, [change]);
  const [last] = await tx.query<{ seq: number }[]>(`SELECT MAX("seq") AS "seq" FROM "recorded_change"`);
  return last?.seq ?? 0;
}

/** The same for several changes of one act, in their order. */
export async function recordChanges(tx: EntityManager, changes: readonly ChangeToRecord[]): Promise<void> {
  const names = new Map<string | null, string>([[null, 'Nobody signed in']]);
  for (const by of new Set(changes.map((one) => one.by)))
    if (by !== null) names.set(by, (await tx.findOneBy(PersonRow, { id: by }))?.name ?? by);
  await insertRows(
    tx,
    'recorded_change',
    ['at', 'by', 'byName', 'what', 'name', 'action', 'effectiveAt', 'before', 'after', 'reason'],
    changes.map((one) => [
      one.at,
      one.by,
      names.get(one.by) ?? '',
      one.what,
      one.name,
      one.action,
      one.effectiveAt ?? null,
      one.before ? JSON.stringify(one.before) : null,
      one.after ? JSON.stringify(one.after) : null,
      one.reason ?? null,
    ]),
  );
}

/** Of a change from one state to another, the fields that differ. */
export function differingFields(
  before: object,
  after: object,
): { before: Record<string, unknown>; after: Record<string, unknown> } {
  const [was, is] = [asRecord(before), asRecord(after)];
  const names = [...new Set([...Object.keys(was), ...Object.keys(is)])].filter(
    (name) => JSON.stringify(was[name]) !== JSON.stringify(is[name]),
  );
  const pick = (from: Record<string, unknown>) =>
    Object.fromEntries(names.flatMap((name) => (name in from ? [[name, from[name]]] : [])));
  return { before: pick(was), after: pick(is) };
}

/** Plain JSON, as it will be read again. */
function asRecord(value: object): Record<string, unknown> {
  return JSON.parse(JSON.stringify(value)) as Record<string, unknown>;
}
