import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import { type LoomRow, MillRow } from '../../database/entities/index.js';

/**
 * Why a loom cannot be out of use from a moment on; null: it can. Nothing that was logged of it may lie in a time when
 * it was not there, and it must not stand: somebody would wait for it to run. A stop of the whole shed says nothing of
 * one loom.
 */
export async function whyNotUntil(tx: EntityManager, loom: LoomRow, until: number): Promise<string | null> {
  if (until <= loom.from)
    return `Loom ${loom.number} is in the shed since ${await localMoment(tx, loom.from)}. Choose a later time.`;
  const [stand] = await tx.query<{ from: number }[]>(
    `SELECT s."from" FROM "stand" s JOIN "entry" e ON e."id" = s."stopId"
      WHERE s."loomId" = ? AND s."until" IS NULL AND e."kind" <> 'shed-stop' ORDER BY s."from" LIMIT 1`,
    [loom.id],
  );
  if (stand)
    return (
      `Loom ${loom.number} stands since ${await localMoment(tx, stand.from)}. ` +
      'Say when that stop ended, or take it back, then take the loom out of use.'
    );
  const [last] = await tx.query<{ at: number }[]>(
    `SELECT l."at" FROM "entry_loom" l JOIN "entry" e ON e."seq" = l."seq"
      WHERE l."loomId" = ? AND e."kind" <> 'shed-stop' ORDER BY l."at" DESC LIMIT 1`,
    [loom.id],
  );
  if (last && last.at >= until)
    return `Something was logged of loom ${loom.number} at ${await localMoment(tx, last.at)}. Choose a later time.`;
  return null;
}

/** A moment in words, by the mill's clock: 9 Mar 2026, 14:05. */
async function localMoment(tx: EntityManager, at: number): Promise<string> {
  const mill = await tx.findOneBy(MillRow, { id: 1 });
  return DateTime.fromMillis(at, { zone: mill?.timeZone ?? 'utc', locale: 'en-GB' }).toFormat(
    'd LLL yyyy, HH:mm',
  );
}
