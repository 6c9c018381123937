import type { EntityManager } from 'typeorm';
import { loomsNamedBy, type BookEntry, type Entry, type EntryKind } from '../../../shared/entries/entry.js';
import { upgradeEntry } from '../../../shared/entries/upgrades.js';
import { list, push } from './bulk.js';

/** A row of the `entry` table as SQL gives it. */
export interface EntryRecordRow {
  seq: number;
  id: string;
  kind: EntryKind;
  shedId: string;
  at: number;
  until: number | null;
  changedAt: number | null;
  shiftKey: string | null;
  targetId: string | null;
  targetBatchId: string | null;
  batchId: string | null;
  by: string;
  deviceId: string;
  deviceSeq: number;
  receivedAt: number;
  body: string;
}

/** An entry of the book, with its place in it. */
export interface StoredEntry extends BookEntry {
  readonly seq: number;
  readonly id: string;
  readonly kind: EntryKind;
  readonly shedId: string;
  readonly changedAt: number | null;
  readonly targetId: string | null;
  readonly targetBatchId: string | null;
  readonly batchId: string | null;
  readonly body: string;
}

export const ENTRY_COLUMNS = [
  'id',
  'kind',
  'shedId',
  'at',
  'until',
  'changedAt',
  'shiftKey',
  'targetId',
  'targetBatchId',
  'batchId',
  'by',
  'deviceId',
  'deviceSeq',
  'receivedAt',
  'body',
] as const;

export function storedEntry(row: EntryRecordRow): StoredEntry {
  const upgraded = upgradeEntry(JSON.parse(row.body) as Record<string, unknown>);
  if (upgraded.is !== 'current') throw new Error(`Entry ${row.id} has a schema that is no longer read.`);
  return {
    seq: row.seq,
    id: row.id,
    kind: row.kind,
    shedId: row.shedId,
    // It passed entrySchema when it was stored, and upgrades keep it so.
    entry: upgraded.entry as unknown as Entry,
    at: row.at,
    until: row.until,
    changedAt: row.changedAt,
    shiftKey: row.shiftKey,
    targetId: row.targetId,
    targetBatchId: row.targetBatchId,
    batchId: row.batchId,
    body: row.body,
  };
}

async function select(tx: EntityManager, where: string, values: Iterable<string | number>) {
  const rows = await tx.query<EntryRecordRow[]>(`SELECT * FROM "entry" WHERE ${where} ORDER BY "seq"`, [
    list(values),
  ]);
  return withLoomsAsBooked(tx, rows.map(storedEntry));
}

/**
 * A stop of a whole shed or row was of the looms that stood there when it came, which the book keeps beside it. Where
 * looms have been added or moved since, it names those instead, so that set-up changes no history: here nor, as it is
 * sent, on a tablet.
 */
export async function withLoomsAsBooked(
  tx: EntityManager,
  entries: readonly StoredEntry[],
): Promise<StoredEntry[]> {
  const wide = entries.filter((one) => one.entry.kind === 'shed-stop' && one.entry.scope.of !== 'looms');
  if (wide.length === 0) return [...entries];
  const looms = await tx.query<{ id: string; shedId: string; row: number }[]>(
    `SELECT "id", "shedId", "row" FROM "loom" WHERE "shedId" IN (SELECT value FROM json_each(?))`,
    [list(new Set(wide.map((one) => one.shedId)))],
  );
  const booked = new Map<number, string[]>();
  const rows = await tx.query<{ seq: number; loomId: string }[]>(
    `SELECT l."seq", l."loomId" FROM json_each(?) w JOIN json_each(?) m
       JOIN "entry_loom" l ON l."loomId" = m.value AND l."seq" = w.value`,
    [list(wide.map((one) => one.seq)), list(looms.map((one) => one.id))],
  );
  for (const { seq, loomId } of rows) push(booked, seq, loomId);
  return entries.map((one) => {
    const then = booked.get(one.seq);
    if (!then || one.entry.kind !== 'shed-stop' || one.entry.scope.of === 'looms') return one;
    const now = new Set(loomsNamedBy(one.entry, looms));
    if (then.length === now.size && then.every((loomId) => now.has(loomId))) return one;
    return { ...one, entry: { ...one.entry, scope: { of: 'looms', loomIds: then.sort() } } };
  });
}

export function entriesById(tx: EntityManager, ids: Iterable<string>): Promise<StoredEntry[]> {
  return select(tx, `"id" IN (SELECT value FROM json_each(?))`, ids);
}

export function entriesBySeq(tx: EntityManager, seqs: Iterable<number>): Promise<StoredEntry[]> {
  return select(tx, `"seq" IN (SELECT value FROM json_each(?))`, seqs);
}

export function entriesTargeting(tx: EntityManager, ids: Iterable<string>): Promise<StoredEntry[]> {
  return select(tx, `"targetId" IN (SELECT value FROM json_each(?))`, ids);
}

export function entriesTargetingBatch(tx: EntityManager, ids: Iterable<string>): Promise<StoredEntry[]> {
  return select(tx, `"targetBatchId" IN (SELECT value FROM json_each(?))`, ids);
}

export function entriesOfBatch(tx: EntityManager, ids: Iterable<string>): Promise<StoredEntry[]> {
  return select(tx, `"batchId" IN (SELECT value FROM json_each(?))`, ids);
}

/**
 * Entries with everything that hangs together with them: what they name, and what corrects, ends or attends to
 * them, until nothing new comes.
 */
export class EntryWeb {
  readonly byId = new Map<string, StoredEntry>();
  private readonly byTarget = new Map<string, StoredEntry[]>();
  private readonly byTargetBatch = new Map<string, StoredEntry[]>();

  constructor(private readonly tx: EntityManager) {}

  /** Takes entries in and loads what hangs together with them. */
  async add(entries: readonly StoredEntry[]): Promise<void> {
    let fresh = this.take(entries);
    while (fresh.length > 0) {
      const found: StoredEntry[] = [];
      found.push(
        ...(await entriesTargeting(
          this.tx,
          fresh.map((one) => one.id),
        )),
      );
      const batches = new Set(fresh.flatMap((one) => one.batchId ?? []));
      if (batches.size > 0) found.push(...(await entriesTargetingBatch(this.tx, batches)));
      const named = new Set(fresh.flatMap((one) => one.targetBatchId ?? []));
      if (named.size > 0) found.push(...(await entriesOfBatch(this.tx, named)));
      const above = new Set(fresh.flatMap((one) => one.targetId ?? []).filter((id) => !this.byId.has(id)));
      if (above.size > 0) found.push(...(await entriesById(this.tx, above)));
      fresh = this.take(found);
    }
  }

  /** What an entry is about in the end: a correction's root, a batch's members; itself where it names nothing. */
  rootsOf(entry: StoredEntry): StoredEntry[] {
    if (entry.kind !== 'void' && entry.kind !== 'amend') return [entry];
    const roots = new Map<string, StoredEntry>();
    const seen = new Set<string>();
    const follow = (one: StoredEntry) => {
      if (seen.has(one.id)) return;
      seen.add(one.id);
      if (one.kind !== 'void' && one.kind !== 'amend') {
        roots.set(one.id, one);
        return;
      }
      const target = one.targetId === null ? undefined : this.byId.get(one.targetId);
      if (target) follow(target);
      if (one.targetBatchId !== null)
        for (const member of this.byId.values()) if (member.batchId === one.targetBatchId) follow(member);
    };
    follow(entry);
    return [...roots.values()];
  }

  /** The stop that an entry ends, calls for or attends to; itself where it is one. */
  stopOf(entry: StoredEntry): StoredEntry | null {
    let one: StoredEntry | undefined = entry;
    for (let steps = 0; one && steps < 8; steps += 1) {
      if (one.kind === 'stop' || one.kind === 'standing' || one.kind === 'shed-stop') return one;
      one = one.targetId === null ? undefined : this.byId.get(one.targetId);
    }
    return null;
  }

  /** Entries with all that corrects, ends or attends to them, and what they name. */
  reach(from: Iterable<StoredEntry>): StoredEntry[] {
    const reached = new Map<string, StoredEntry>();
    const waiting = [...from];
    for (let one = waiting.pop(); one; one = waiting.pop()) {
      if (reached.has(one.id)) continue;
      reached.set(one.id, one);
      waiting.push(...(this.byTarget.get(one.id) ?? []));
      if (one.batchId !== null) waiting.push(...(this.byTargetBatch.get(one.batchId) ?? []));
      const target = one.targetId === null ? undefined : this.byId.get(one.targetId);
      if (target) waiting.push(target);
    }
    return [...reached.values()];
  }

  /** Amendments of an entry, whether they hold or not. */
  amendmentsOf(entry: StoredEntry): StoredEntry[] {
    return (this.byTarget.get(entry.id) ?? []).filter((one) => one.kind === 'amend');
  }

  private take(entries: readonly StoredEntry[]): StoredEntry[] {
    const fresh: StoredEntry[] = [];
    for (const one of entries) {
      if (this.byId.has(one.id)) continue;
      this.byId.set(one.id, one);
      if (one.targetId !== null) push(this.byTarget, one.targetId, one);
      if (one.targetBatchId !== null) push(this.byTargetBatch, one.targetBatchId, one);
      fresh.push(one);
    }
    return fresh;
  }
}
