import type { EntityManager } from 'typeorm';
import type { ShiftRow } from '../../database/entities/index.js';
import { LineStore } from './line-store.js';
import { readMillFacts } from './mill-facts.js';
import { shiftOf, Shifts } from './which-shift.js';

/**
 * Projects a shed's open shifts anew that reach past a moment, since what the mill is made of has changed: with what
 * is now in force, for the looms that now stood there. Shifts without lines get none; closed ones keep what was signed.
 */
export async function remakeLines(tx: EntityManager, shedId: string, from: number): Promise<void> {
  const rows = await tx.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "shedId" = ? AND "state" = 'open' AND "endsAt" > ?
       AND EXISTS (SELECT 1 FROM "loom_line" WHERE "shiftKey" = "shift"."key") ORDER BY "startsAt"`,
    [shedId, from],
  );
  if (rows.length === 0) return;
  const facts = await readMillFacts(tx);
  const store = new LineStore(tx, facts, new Shifts(tx));
  for (const row of rows) {
    const shift = shiftOf(row);
    const shown = store.loomsNow(shift);
    await store.dropOthers(shift, shown);
    await store.write(shift, shown);
  }
}
