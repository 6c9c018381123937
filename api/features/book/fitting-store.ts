import type { EntityManager } from 'typeorm';
import type { Fitting } from '../../../shared/contract/reference.js';
import { resolveFittings } from '../../../shared/entries/fittings.js';
import type { FittingRow } from '../../database/entities/index.js';
import { insertRows, list } from './bulk.js';
import { EVERY_SHIFT, holdsOf } from './holds.js';
import { warpChangeWeb } from './line-store.js';

/** A time during which something else is on a loom than before. */
export interface ChangedFitting {
  readonly loomId: string;
  readonly from: number;
  /** The loom's next fitting; null: none. */
  readonly until: number | null;
}

/** Makes the fittings of looms anew; gives the times during which they changed. */
export async function renewFittings(
  tx: EntityManager,
  loomIds: readonly string[],
): Promise<ChangedFitting[]> {
  const before = (
    await tx.query<FittingRow[]>(
      `SELECT * FROM "fitting" WHERE "loomId" IN (SELECT value FROM json_each(?))`,
      [list(loomIds)],
    )
  ).map((row): Fitting => ({ ...row }));
  const entries = await warpChangeWeb(tx, loomIds);
  const out = new Set(
    (await holdsOf(tx, entries.keys()))
      .filter((one) => one.shiftKey === EVERY_SHIFT && one.state !== 'accepted')
      .map((one) => one.entryId),
  );
  const looms = new Set(loomIds);
  const after = resolveFittings([...entries.values()].filter((one) => !out.has(one.id))).filter((one) =>
    looms.has(one.loomId),
  );
  const changed = [...differing(before, after), ...differing(after, before)];
  if (changed.length === 0) return [];
  await tx.query(`DELETE FROM "fitting" WHERE "id" IN (SELECT value FROM json_each(?))`, [
    list([...before, ...after].map((one) => one.id)),
  ]);
  await insertRows(
    tx,
    'fitting',
    ['id', 'loomId', 'effectiveAt', 'warpId', 'clothId', 'how'],
    after.map((one) => [one.id, one.loomId, one.effectiveAt, one.warpId, one.clothId, one.how]),
  );
  return changed;
}

/** Times of the fittings that are in `some` but not, or not so, in `others`. */
function differing(some: readonly Fitting[], others: readonly Fitting[]): ChangedFitting[] {
  const same = new Map(others.map((one) => [one.id, JSON.stringify(pick(one))]));
  return some
    .filter((one) => same.get(one.id) !== JSON.stringify(pick(one)))
    .map((one) => {
      const later = some
        .filter((other) => other.loomId === one.loomId && other.effectiveAt > one.effectiveAt)
        .map((other) => other.effectiveAt);
      return {
        loomId: one.loomId,
        from: one.effectiveAt,
        until: later.length > 0 ? Math.min(...later) : null,
      };
    });
}

const pick = ({ id, loomId, effectiveAt, warpId, clothId, how }: Fitting) => [
  id,
  loomId,
  effectiveAt,
  warpId,
  clothId,
  how,
];
