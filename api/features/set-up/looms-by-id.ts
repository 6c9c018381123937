import { In } from 'typeorm';
import { LoomRow } from '../../database/entities/index.js';
import { wrongField } from '../../middleware/api-error.js';
import type { SetUpChange } from './set-up-change.js';

/** Reads looms that a form names and whoever asks has a say over. Throws where one is not there. */
export async function loomsById(
  change: SetUpChange,
  ids: readonly string[],
  pathOf: (index: number) => string,
): Promise<(id: string) => LoomRow> {
  const rows = await change.tx.findBy(LoomRow, { id: In([...new Set(ids)]) });
  const byId = new Map(rows.map((row) => [row.id, row]));
  const missing = ids.findIndex((id) => !byId.has(id));
  if (missing >= 0) throw wrongField(pathOf(missing), 'There is no such loom. Choose it on the plan.');
  for (const row of rows) change.requireOwn(row.shedId);
  return (id) => {
    const row = byId.get(id);
    if (!row) throw new Error(`No loom ${id}.`);
    return row;
  };
}
