import type { EntityManager } from 'typeorm';
import type { HoldReason } from '../../../shared/contract/errors.js';
import { loomsNamedBy } from '../../../shared/entries/entry.js';
import { insertRows, list } from './bulk.js';
import { ChangeLog } from './change-log.js';
import { closedLinesChangedBy } from './closed-lines.js';
import { entriesById, ENTRY_COLUMNS, EntryWeb, type StoredEntry } from './entry-store.js';
import { renewFittings } from './fitting-store.js';
import { decide, EVERY_SHIFT, hold } from './holds.js';
import { LineStore } from './line-store.js';
import { LinesToWrite } from './lines-to-write.js';
import type { MillFacts } from './mill-facts.js';
import { StandStore, widest } from './stand-store.js';
import { TouchedLines, type Touch } from './touched-lines.js';
import { Shifts } from './which-shift.js';

/** An entry that passed every check, with what the server fixed. */
export interface NewEntry {
  readonly row: Readonly<Record<(typeof ENTRY_COLUMNS)[number], string | number | null>> & {
    readonly id: string;
  };
  /** It waits for a decision, whatever the shift. */
  readonly hold: HoldReason | null;
}

/** The mill's own hand, where nobody decided. */
export const BY_THE_BOOK = 'the-book';

/**
 * Keeps the book in one transaction: stores entries, finds what they touch, holds what touches a closed shift, and
 * keeps the read models (stands, fittings, lines) in step. Lines are written at the end, each once.
 */
export class Bookkeeper {
  readonly shifts: Shifts;
  readonly lines: LineStore;
  readonly toWrite = new LinesToWrite();
  readonly changes = new ChangeLog();
  /** Why entries of this batch wait. */
  readonly held = new Map<string, HoldReason>();
  private readonly stands: StandStore;

  constructor(
    readonly tx: EntityManager,
    readonly facts: MillFacts,
    shifts?: Shifts,
  ) {
    this.shifts = shifts ?? new Shifts(tx);
    this.lines = new LineStore(tx, facts, this.shifts);
    this.stands = new StandStore(tx, facts);
  }

  /** Stores entries and books them. Gives those that had waited for one of them and count from now. */
  async store(entries: readonly NewEntry[]): Promise<{ stored: StoredEntry[]; freed: StoredEntry[] }> {
    await insertRows(
      this.tx,
      'entry',
      ENTRY_COLUMNS,
      entries.map(({ row }) => ENTRY_COLUMNS.map((column) => row[column])),
    );
    const stored = await entriesById(
      this.tx,
      entries.map(({ row }) => row.id),
    );
    const holds = new Map(entries.flatMap((one) => (one.hold ? [[one.row.id, one.hold] as const] : [])));
    for (const one of await this.withoutTarget(stored))
      if (!holds.has(one.id)) holds.set(one.id, 'target-missing');
    for (const [id, reason] of holds) this.held.set(id, reason);
    await hold(
      this.tx,
      [...holds].map(([entryId, reason]) => ({ entryId, shiftKey: EVERY_SHIFT, reason })),
    );
    const freed = await this.freedBy(stored);
    for (const one of stored) {
      this.changes.add(one.shedId, 'entry', one.id);
      if (one.shiftKey !== null) this.toWrite.touch(one.shiftKey);
    }
    await this.book([...stored.filter((one) => !holds.has(one.id)), ...freed], [...stored, ...freed]);
    return { stored, freed };
  }

  /**
   * Lets entries count. What of it touches a closed shift is held for that shift; with `restate` it counts there too,
   * and the closed shifts that it touches are given back, to be signed again.
   */
  async book(
    counting: readonly StoredEntry[],
    named: readonly StoredEntry[] = [],
    restate = false,
  ): Promise<string[]> {
    const web = new EntryWeb(this.tx);
    await web.add([...counting, ...named]);
    await this.nameLooms(named, web);
    const touched = new TouchedLines(web, this.facts, this.shifts);
    for (const entry of counting) await touched.addEntry(entry);

    const stops = [...touched.stops.values()].map((one) => one.stop);
    if (stops.length > 0) {
      const before = await this.stands.of(stops.map((one) => one.id));
      const after = await this.stands.resolve(web, stops);
      // Until it is known what is held, whoever looks for the stops of a shift must find them as before and as after.
      await this.stands.write(stops, widest(before, after));
      await touched.addStands([...before, ...after]);
    }
    if (touched.fittedLooms.size > 0) {
      const changed = await renewFittings(this.tx, [...touched.fittedLooms.keys()]);
      await touched.addFittings(changed);
      for (const loomId of new Set(changed.map((one) => one.loomId)))
        this.changes.add(this.facts.looms.get(loomId)?.shedId ?? null, 'fitting', loomId);
    }
    const closed = await this.apply(touched.all, web, restate);
    if (stops.length > 0) await this.stands.write(stops, await this.stands.resolve(web, stops));
    return closed;
  }

  /** Writes the lines and the change numbers. */
  async finish(): Promise<{ shedIds: (string | null)[]; seq: number | null }> {
    await this.toWrite.flush(this.lines, this.shifts);
    return this.changes.write(this.tx);
  }

  private async apply(touches: readonly Touch[], web: EntryWeb, restate: boolean): Promise<string[]> {
    const closed = new Map<string, Touch[]>();
    for (const touch of touches) {
      const shift = await this.shifts.named(touch.shiftKey);
      if (shift?.state === 'closed') closed.set(shift.key, [...(closed.get(shift.key) ?? []), touch]);
      else if (touch.direct) this.toWrite.add(touch.shiftKey, touch.loomId);
      else if (await this.lines.hasLines(touch.shiftKey)) this.toWrite.add(touch.shiftKey, touch.loomId);
    }
    for (const [shiftKey, ofShift] of restate ? [] : closed) {
      const shift = await this.shifts.named(shiftKey);
      if (!shift) continue;
      const waits = new Set(ofShift.filter((one) => one.direct).map((one) => one.entryId));
      await this.holdFor(shiftKey, waits);
      const beside = ofShift.filter((one) => !waits.has(one.entryId));
      const changing = await closedLinesChangedBy(this.lines, shift, beside, web);
      await this.holdFor(shiftKey, changing);
      for (const one of beside) if (!changing.has(one.entryId)) this.toWrite.add(shiftKey, one.loomId);
    }
    return [...closed.keys()];
  }

  private async holdFor(shiftKey: string, entryIds: ReadonlySet<string>): Promise<void> {
    await hold(
      this.tx,
      [...entryIds].map((entryId) => ({ entryId, shiftKey, reason: 'shift-closed' as const })),
    );
    for (const entryId of entryIds) if (!this.held.has(entryId)) this.held.set(entryId, 'shift-closed');
  }

  /** Of these, the ones that name an entry or a batch that has not come. */
  private async withoutTarget(stored: readonly StoredEntry[]): Promise<StoredEntry[]> {
    const targets = new Set(stored.flatMap((one) => one.targetId ?? []));
    const batches = new Set(stored.flatMap((one) => one.targetBatchId ?? []));
    if (targets.size + batches.size === 0) return [];
    const ids = await this.tx.query<{ id: string }[]>(
      `SELECT "id" FROM "entry" WHERE "id" IN (SELECT value FROM json_each(?))`,
      [list(targets)],
    );
    const known = await this.tx.query<{ id: string }[]>(
      `SELECT DISTINCT "batchId" AS "id" FROM "entry" WHERE "batchId" IN (SELECT value FROM json_each(?))`,
      [list(batches)],
    );
    const there = new Set([...ids, ...known].map((one) => one.id));
    return stored.filter(
      (one) =>
        (one.targetId !== null || one.targetBatchId !== null) &&
        !(one.targetId !== null && there.has(one.targetId)) &&
        !(one.targetBatchId !== null && there.has(one.targetBatchId)),
    );
  }

  /** Entries that waited for one of these: they count from now. */
  private async freedBy(stored: readonly StoredEntry[]): Promise<StoredEntry[]> {
    const rows = await this.tx.query<{ id: string }[]>(
      `SELECT e."id" FROM "entry" e JOIN "entry_hold" h ON h."entryId" = e."id" AND h."shiftKey" = '*'
        WHERE h."reason" = 'target-missing' AND h."state" = 'held'
          AND (e."targetId" IN (SELECT value FROM json_each(?))
            OR e."targetBatchId" IN (SELECT value FROM json_each(?)))`,
      [list(stored.map((one) => one.id)), list(new Set(stored.flatMap((one) => one.batchId ?? [])))],
    );
    const freed = await entriesById(
      this.tx,
      rows.map((row) => row.id),
    );
    for (const one of freed) {
      await decide(this.tx, one.id, 'accepted', BY_THE_BOOK);
      this.held.delete(one.id);
      this.changes.add(one.shedId, 'entry', one.id);
    }
    return freed;
  }

  /** Writes which looms entries are about, by which a line finds them. */
  private async nameLooms(entries: readonly StoredEntry[], web: EntryWeb): Promise<void> {
    const looms = [...this.facts.looms.values()];
    const rows: (string | number | null)[][] = [];
    for (const one of entries) {
      for (const loomId of new Set(loomsNamedBy(one.entry, looms)))
        rows.push([loomId, one.seq, one.at, one.shiftKey]);
      if (one.entry.kind !== 'amend') continue;
      // A moved entry is found where it was moved to, by its amendment.
      const { change } = one.entry;
      for (const root of web.rootsOf(one)) {
        if (root === one) continue;
        const named = change.loomId === undefined ? loomsNamedBy(root.entry, looms) : [change.loomId];
        const [at, shiftKey] =
          one.changedAt === null ? [root.at, root.shiftKey] : [one.changedAt, one.shiftKey];
        for (const loomId of new Set(named)) rows.push([loomId, one.seq, at, shiftKey]);
      }
    }
    await insertRows(this.tx, 'entry_loom', ['loomId', 'seq', 'at', 'shiftKey'], rows, 'INSERT OR IGNORE');
  }
}
