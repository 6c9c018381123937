import type { EntityManager } from 'typeorm';
import type { RecordedChange } from '../../../shared/contract/set-up.js';
import { PersonRow, RecordedChangeRow } from '../../database/entities/index.js';

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
  const person = change.by === null ? null : await tx.findOneBy(PersonRow, { id: change.by });
  const inserted = await tx.insert(RecordedChangeRow, {
    at: change.at,
    by: change.by,
    byName: person?.name ?? change.by ?? 'Nobody signed in',
    what: change.what,
    name: change.name,
    action: change.action,
    effectiveAt: change.effectiveAt ?? null,
    before: change.before ? JSON.stringify(change.before) : null,
    after: change.after ? JSON.stringify(change.after) : null,
    reason: change.reason ?? null,
  });
  return Number(inserted.identifiers[0]?.['seq']);
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
