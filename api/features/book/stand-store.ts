import type { EntityManager } from 'typeorm';
import type { Stand } from '../../../shared/entries/projection-input.js';
import { resolveStands } from '../../../shared/entries/stands.js';
import { insertRows, list, push } from './bulk.js';
import type { EntryWeb, StoredEntry } from './entry-store.js';
import { EVERY_SHIFT, holdsOf } from './holds.js';
import type { MillFacts } from './mill-facts.js';

/**
 * The read model of timed stops as intervals. It serves to find the stops that overlap a shift; the projection cuts
 * them itself. So where shifts see a stop differently (a correction is held for one of them), the wider is kept.
 */
export class StandStore {
  constructor(
    private readonly tx: EntityManager,
    private readonly facts: MillFacts,
  ) {}

  async of(stopIds: Iterable<string>): Promise<Stand[]> {
    return this.tx.query<Stand[]>(
      `SELECT "stopId", "loomId", "from", "until", "cause" FROM "stand"
        WHERE "stopId" IN (SELECT value FROM json_each(?))`,
      [list(stopIds)],
    );
  }

  /** The stops' intervals by what is in the book now. */
  async resolve(web: EntryWeb, stops: readonly StoredEntry[]): Promise<Stand[]> {
    const entries = web.reach(stops);
    const waiting = (
      await holdsOf(
        this.tx,
        entries.map((one) => one.id),
      )
    ).filter((one) => one.state !== 'accepted');
    const nowhere = new Set(waiting.filter((one) => one.shiftKey === EVERY_SHIFT).map((one) => one.entryId));
    const somewhere = new Set(waiting.map((one) => one.entryId));
    const looms = [...this.facts.looms.values()];
    const stopIds = new Set(stops.map((one) => one.id));
    const without = (out: ReadonlySet<string>) =>
      resolveStands(
        entries.filter((one) => !out.has(one.id)),
        looms,
      ).filter((one) => stopIds.has(one.stopId));
    const most = without(nowhere);
    return somewhere.size > nowhere.size ? widest(most, without(somewhere)) : most;
  }

  async write(stops: readonly StoredEntry[], stands: readonly Stand[]): Promise<void> {
    const { tx } = this;
    await tx.query(`DELETE FROM "stand" WHERE "stopId" IN (SELECT value FROM json_each(?))`, [
      list(stops.map((one) => one.id)),
    ]);
    const shedOf = (loomId: string) => this.facts.looms.get(loomId)?.shedId ?? '';
    await insertRows(
      tx,
      'stand',
      ['stopId', 'loomId', 'shedId', 'from', 'until', 'cause'],
      stands.map((one) => [one.stopId, one.loomId, shedOf(one.loomId), one.from, one.until, one.cause]),
    );
  }
}

/** One interval a stop and loom, the hull of all that are given. */
export function widest(...all: (readonly Stand[])[]): Stand[] {
  const byKey = new Map<string, Stand[]>();
  for (const stand of all.flat()) push(byKey, `${stand.stopId} ${stand.loomId}`, stand);
  return [...byKey.values()].flatMap((stands) => {
    const [first] = stands;
    return first ? [{ ...first, ...hullOf(stands) }] : [];
  });
}

function hullOf(stands: readonly Stand[]): Pick<Stand, 'from' | 'until'> {
  return {
    from: Math.min(...stands.map((one) => one.from)),
    until: stands.some((one) => one.until === null)
      ? null
      : Math.max(...stands.map((one) => one.until ?? one.from)),
  };
}
