import type { PushResult } from '@shared/contract/sync';
import type { Entry } from '@shared/entries/entry';
import { numberEntry, type Unnumbered } from './entry-draft';
import { result, type LocalDatabase } from './local-database';
import { notSaved } from './not-saved';
import {
  factOf,
  MARK,
  newOutboxRecord,
  upgradeOutboxRecord,
  type OutboxRecord,
  type OutboxState,
} from './records';

/**
 * Entries on their way to the book, a key each. What is durable when:
 * - `append` resolves: the entries and the device's next number are on disk, all or none.
 * - `settle` resolves: the server's word on them is on disk. Acknowledged ones move to `sent` in that transaction and
 *   stay there for 14 days; until then a crash means that they are sent again, which the book takes as duplicates.
 * An entry leaves this device's storage only acknowledged and 14 days old, or refused, exported and dismissed.
 */
export class Outbox {
  constructor(private readonly database: LocalDatabase) {}

  /**
   * Stores entries of one act in one transaction and numbers them there, so that two tabs never give the same
   * number. Throws `NotSaved`; then none of them is stored.
   */
  async append(entries: readonly Unnumbered[]): Promise<OutboxRecord[]> {
    try {
      return await this.database.transact(['outbox', 'facts'], 'readwrite', async (transaction) => {
        const outbox = transaction.objectStore('outbox');
        const facts = transaction.objectStore('facts');
        // All is asked at once and nothing waited for that the commit says anyway: a finger waits for this.
        const keys = [...new Set(entries.map(({ deviceId }) => seqKey(deviceId)))];
        const [found, numbers] = await Promise.all([
          Promise.all(entries.map(({ id }) => result<unknown>(outbox.get(id)))),
          Promise.all(keys.map((key) => result<unknown>(facts.get(key)))),
        ]);
        const last = new Map(keys.map((key, place) => [key, numberOf(numbers[place])]));
        const records = entries.map((unnumbered, place) => {
          // Found where a connection was lost after the commit and the work is done again.
          const known = upgradeOutboxRecord(found[place]);
          if (known) return known;
          const key = seqKey(unnumbered.deviceId);
          const seq = (last.get(key) ?? 0) + 1;
          const record = newOutboxRecord(numberEntry(unnumbered, seq), unnumbered.recordedAt);
          last.set(key, seq);
          outbox.put(record, record.entry.id);
          return record;
        });
        for (const [key, seq] of last) facts.put(seq, key);
        transaction.commit();
        return records;
      });
    } catch (error) {
      throw notSaved(error);
    }
  }

  /** The oldest waiting entries, at most `limit`, in the order in which they were made. */
  async nextBatch(limit: number): Promise<Entry[]> {
    const found = await this.inState('waiting', limit);
    return found.map((record) => record.entry);
  }

  countWaiting(): Promise<number> {
    return this.database.transact(['outbox'], 'readonly', (transaction) =>
      result(
        transaction
          .objectStore('outbox')
          .index('state')
          .count('waiting' satisfies OutboxState),
      ),
    );
  }

  /** Everything that is not simply in the book. */
  async all(): Promise<OutboxRecord[]> {
    const raw = await this.database.transact(['outbox'], 'readonly', (transaction) =>
      result<unknown[]>(transaction.objectStore('outbox').getAll()),
    );
    return raw.map(upgradeOutboxRecord).filter((record) => record !== null);
  }

  /** Acknowledged since a moment (device's clock): what may not have come back by a pull yet. */
  async sentSince(moment: number): Promise<OutboxRecord[]> {
    const raw = await this.database.transact(['sent'], 'readonly', (transaction) =>
      result<unknown[]>(
        transaction.objectStore('sent').index('settledAt').getAll(IDBKeyRange.lowerBound(moment)),
      ),
    );
    return raw.map(upgradeOutboxRecord).filter((record) => record !== null);
  }

  /**
   * Keeps the server's word on what was pushed, and where the book stood with it. Returns the changed records.
   */
  settle(
    batch: readonly Entry[],
    results: readonly PushResult[],
    now: number,
    mark?: string,
  ): Promise<OutboxRecord[]> {
    return this.database.transact(['outbox', 'sent', 'facts'], 'readwrite', async (transaction) => {
      const outbox = transaction.objectStore('outbox');
      const sent = transaction.objectStore('sent');
      if (mark !== undefined) await result(transaction.objectStore('facts').put(factOf(mark), MARK));
      const changed: OutboxRecord[] = [];
      for (const answer of results) {
        const pushed = batch[answer.index];
        // The place decides; a result that names another entry than stands there is no word on either.
        if (!pushed || (answer.id !== null && answer.id !== pushed.id)) continue;
        const record = upgradeOutboxRecord(await result<unknown>(outbox.get(pushed.id)));
        if (!record) continue;
        const settled = settledRecord(record, answer, now);
        if (settled.state === 'stored') {
          await result(sent.put(settled, pushed.id));
          await result(outbox.delete(pushed.id));
        } else await result(outbox.put(settled, pushed.id));
        changed.push(settled);
      }
      return changed;
    });
  }

  /** Entries that the server was too old for wait again. Returns the changed records. */
  requeueLater(): Promise<OutboxRecord[]> {
    return this.change('later', (record) => ({ ...record, state: 'waiting', code: null }));
  }

  /** One entry that is larger than the server takes at all. */
  async refuse(id: string, code: OutboxRecord['code'], now: number): Promise<OutboxRecord[]> {
    return this.update([id], (record) => ({ ...record, state: 'refused', code, settledAt: now }));
  }

  /** What was acknowledged or held since a moment waits again: the server's book is not the one that had it. */
  resend(since: number): Promise<OutboxRecord[]> {
    return this.database.transact(['outbox', 'sent'], 'readwrite', async (transaction) => {
      const outbox = transaction.objectStore('outbox');
      const sent = transaction.objectStore('sent');
      const again = await result<unknown[]>(sent.index('settledAt').getAll(IDBKeyRange.lowerBound(since)));
      const held = await result<unknown[]>(outbox.index('state').getAll('held' satisfies OutboxState));
      const changed: OutboxRecord[] = [];
      for (const raw of [...again, ...held]) {
        const record = upgradeOutboxRecord(raw);
        if (!record) continue;
        const waiting: OutboxRecord = { ...record, rev: record.rev + 1, state: 'waiting', hold: null };
        await result(outbox.put(waiting, record.entry.id));
        await result(sent.delete(record.entry.id));
        changed.push(waiting);
      }
      return changed;
    });
  }

  /** Drops acknowledged entries older than the window in which they may be asked for again. */
  prune(before: number): Promise<void> {
    return this.database.transact(['sent'], 'readwrite', async (transaction) => {
      const sent = transaction.objectStore('sent');
      const old = await result(sent.index('settledAt').getAllKeys(IDBKeyRange.upperBound(before, true)));
      for (const key of old) await result(sent.delete(key));
    });
  }

  markExported(ids: readonly string[], now: number): Promise<OutboxRecord[]> {
    return this.update(ids, (record) => ({ ...record, exportedAt: now }));
  }

  /** Drops a refused entry that has been exported; any other stays. Returns whether it is gone. */
  dismiss(id: string): Promise<boolean> {
    return this.database.transact(['outbox'], 'readwrite', async (transaction) => {
      const outbox = transaction.objectStore('outbox');
      const record = upgradeOutboxRecord(await result<unknown>(outbox.get(id)));
      if (record?.state !== 'refused' || record.exportedAt === null) return false;
      await result(outbox.delete(id));
      return true;
    });
  }

  /** A held entry was decided on: either way it is in the book, with that decision, and nothing waits here any more. */
  decided(decided: ReadonlySet<string>, now: number): Promise<OutboxRecord[]> {
    return this.database.transact(['outbox', 'sent'], 'readwrite', async (transaction) => {
      const outbox = transaction.objectStore('outbox');
      const sent = transaction.objectStore('sent');
      const changed: OutboxRecord[] = [];
      // Few are held, many may be pulled: the held ones are looked through.
      const held = await result<unknown[]>(outbox.index('state').getAll('held' satisfies OutboxState));
      for (const record of held.map(upgradeOutboxRecord)) {
        if (!record || !decided.has(record.entry.id)) continue;
        const { id } = record.entry;
        const rev = record.rev + 1;
        const stored: OutboxRecord = { ...record, rev, state: 'stored', settledAt: now, hold: null };
        await result(sent.put(stored, id));
        await result(outbox.delete(id));
        changed.push(stored);
      }
      return changed;
    });
  }

  private async inState(state: OutboxState, limit?: number): Promise<OutboxRecord[]> {
    const raw = await this.database.transact(['outbox'], 'readonly', (transaction) =>
      result<unknown[]>(transaction.objectStore('outbox').index('state').getAll(state, limit)),
    );
    return raw.map(upgradeOutboxRecord).filter((record) => record !== null);
  }

  private async change(
    state: OutboxState,
    to: (record: OutboxRecord) => OutboxRecord,
  ): Promise<OutboxRecord[]> {
    const found = await this.inState(state);
    return this.update(
      found.map((record) => record.entry.id),
      to,
      state,
    );
  }

  private update(
    ids: readonly string[],
    to: (record: OutboxRecord) => OutboxRecord,
    only?: OutboxState,
  ): Promise<OutboxRecord[]> {
    return this.database.transact(['outbox'], 'readwrite', async (transaction) => {
      const outbox = transaction.objectStore('outbox');
      const changed: OutboxRecord[] = [];
      for (const id of ids) {
        const record = upgradeOutboxRecord(await result<unknown>(outbox.get(id)));
        if (!record || (only && record.state !== only)) continue;
        const next = { ...to(record), rev: record.rev + 1 };
        await result(outbox.put(next, id));
        changed.push(next);
      }
      return changed;
    });
  }
}

/** The fact that holds a device's last number. */
function seqKey(deviceId: string): string {
  return `seq:${deviceId}`;
}

function numberOf(kept: unknown): number {
  return typeof kept === 'number' ? kept : 0;
}

function settledRecord(record: OutboxRecord, answer: PushResult, now: number): OutboxRecord {
  const common = {
    ...record,
    rev: record.rev + 1,
    settledAt: now,
    at: answer.at ?? record.at,
    shiftKey: answer.shiftKey ?? record.shiftKey,
    code: answer.code ?? null,
    detail: answer.detail ?? null,
    hold: answer.hold ?? null,
  };
  switch (answer.result) {
    case 'stored':
      return { ...common, state: 'stored' };
    case 'duplicate':
      // With the reason why it waits, where what the book holds already is held.
      return { ...common, state: answer.hold ? 'held' : 'stored' };
    case 'held':
      return { ...common, state: 'held' };
    case 'refused':
      return { ...common, state: 'refused' };
    case 'later':
      return { ...common, state: 'later' };
  }
}
