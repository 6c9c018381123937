import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import type {
  changeRecordQuerySchema,
  changeRecordSchema,
  RecordedChange,
} from '../../../shared/contract/set-up.js';
import type { RecordedChangeRow } from '../../database/entities/index.js';

/** Changes in one answer. */
const PAGE = 50;

/**
 * The record of changes, newest first. `q` is looked for in who, what, the thing's name, the reason and the fields as
 * they were and are; capitals make no difference (of the letters a to z, as SQLite has it).
 */
export async function readChanges(
  from: EntityManager,
  { q = '', before }: z.infer<typeof changeRecordQuerySchema>,
): Promise<z.infer<typeof changeRecordSchema>> {
  const wanted = `%${q.trim().replace(/[\\%_]/g, '\\$&')}%`;
  const columns = ['byName', 'what', 'name', 'reason', 'before', 'after'];
  const rows = await from.query<RecordedChangeRow[]>(
    `SELECT * FROM "recorded_change" WHERE "seq" < ?
        AND (${columns.map((column) => `"${column}" LIKE ? ESCAPE '\\'`).join(' OR ')})
      ORDER BY "seq" DESC LIMIT ?`,
    [Number(before ?? Number.MAX_SAFE_INTEGER), ...columns.map(() => wanted), PAGE + 1],
  );
  return { changes: rows.slice(0, PAGE).map(toChange), more: rows.length > PAGE };
}

function toChange(row: RecordedChangeRow): RecordedChange {
  return { ...row, before: fieldsOf(row.before), after: fieldsOf(row.after) };
}

function fieldsOf(json: string | null): Record<string, unknown> | null {
  return json === null ? null : (JSON.parse(json) as Record<string, unknown>);
}
