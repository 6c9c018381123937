import type { EntityManager } from 'typeorm';
import { insertRows } from './bulk.js';
import { versionsKnownTo } from './kept-versions.js';
import { LineStore } from './line-store.js';
import { readMillFacts } from './mill-facts.js';
import { lastSignedTotals, signedLooms, signedTotals } from './signed-totals.js';
import { Shifts } from './which-shift.js';

/** Whose word a restatement is: it stands in the record of changes. */
export interface Restatement {
  readonly by: string;
  /** Milliseconds since 1970. */
  readonly at: number;
  /** Number of the command in the record of changes. */
  readonly changeSeq: number;
}

/** Before the number of a command, where a signed version else names its `close` or `accept`. */
export const RECALCULATED = 'recalculated:';

/**
 * States a closed shift again with what is now in force: where its totals are others, they are signed as the next
 * version beside the earlier ones, and the shift stays closed. What is held for it stays held.
 *
 * @returns whether its totals are others now
 */
export async function restateShift(
  tx: EntityManager,
  shiftKey: string,
  { by, at, changeSeq }: Restatement,
): Promise<boolean> {
  const shifts = new Shifts(tx);
  const shift = await shifts.named(shiftKey);
  const signed = await lastSignedTotals(tx, shiftKey);
  if (shift?.state !== 'closed' || signed === null) return false;
  const facts = await readMillFacts(tx);
  const store = new LineStore(tx, facts, shifts);
  // In the order that was signed, so that the same figures give the same sums to the last bit.
  const before = (await signedLooms(tx, shiftKey)) ?? [];
  const now = new Set(store.loomsNow(shift));
  const looms = [...before.filter((id) => now.has(id)), ...[...now].filter((id) => !before.includes(id))];
  const source = await store.gather(shift, looms, { fresh: true });
  if (signedTotals(looms.map((id) => source.project(id))) === signed) return false;
  await store.dropOthers(shift, looms);
  const lines = await store.write(shift, looms, { fresh: true });
  const [last] = await tx.query<{ version: number }[]>(
    `SELECT MAX("version") AS "version" FROM "signed_totals" WHERE "shiftKey" = ?`,
    [shiftKey],
  );
  await insertRows(
    tx,
    'signed_totals',
    ['shiftKey', 'version', 'at', 'by', 'entryId', 'totals', 'versionIds'],
    [
      [
        shiftKey,
        (last?.version ?? 0) + 1,
        at,
        by,
        `${RECALCULATED}${changeSeq}`,
        signedTotals(lines),
        JSON.stringify(versionsKnownTo(lines, facts)),
      ],
    ],
  );
  return true;
}
