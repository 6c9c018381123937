import type { ErrorCode, HoldReason } from '@shared/contract/errors';
import type { PulledEntry } from '@shared/contract/sync';
import type { Entry } from '@shared/entries/entry';

/**
 * What the device keeps, as it lies in IndexedDB. Each record names its version; `upgrade…` takes every older one.
 * A record of a newer version is left where it lies: it is not lost, a newer application reads it.
 */
export const RECORD_VERSION = 1;

/**
 * waiting: not yet acknowledged. stored: in the book (lies in `sent`). held: in the book, waits for a decision.
 * refused: not in the book, stays here until exported and dismissed. later: the server is older than the entry.
 */
export type OutboxState = 'waiting' | 'stored' | 'held' | 'refused' | 'later';

export interface OutboxRecord {
  readonly v: number;
  /** Counts the changes of this record, so that tabs do not take an older one for the newer. */
  readonly rev: number;
  readonly entry: Entry;
  readonly state: OutboxState;
  /** Device's clock. */
  readonly savedAt: number;
  /** When the server answered; 0: never. */
  readonly settledAt: number;
  /** As the server fixed them. */
  readonly at: number | null;
  readonly shiftKey: string | null;
  readonly code: ErrorCode | null;
  readonly detail: string | null;
  readonly hold: HoldReason | null;
  /** When it was exported to a file. */
  readonly exportedAt: number | null;
}

/** A fact with the version of its form. */
export interface Fact<T> {
  readonly v: number;
  readonly value: T;
}

export function factOf<T>(value: T): Fact<T> {
  return { v: RECORD_VERSION, value };
}

/** The fact's key: what the book said of itself when it last acknowledged entries of this device. */
export const MARK = 'mark';

/** A pulled entry; `at` stands outside for its index. */
export interface BookRecord {
  readonly v: number;
  readonly at: number;
  readonly pulled: PulledEntry;
}

export function newOutboxRecord(entry: Entry, savedAt: number): OutboxRecord {
  return {
    v: RECORD_VERSION,
    rev: 1,
    entry,
    state: 'waiting',
    savedAt,
    settledAt: 0,
    at: null,
    shiftKey: null,
    code: null,
    detail: null,
    hold: null,
    exportedAt: null,
  };
}

/** Whether this application can read a record (see `RECORD_VERSION`). */
export function isReadable(record: unknown): record is { v: number } {
  return (
    typeof record === 'object' &&
    record !== null &&
    'v' in record &&
    typeof record.v === 'number' &&
    record.v <= RECORD_VERSION
  );
}

/** Takes an outbox record of any version up to ours. Null: newer than this application. */
export function upgradeOutboxRecord(record: unknown): OutboxRecord | null {
  // Version 1 is the first: a later one adds its step here and its frozen example to test/frozen.
  return isReadable(record) ? (record as OutboxRecord) : null;
}

export function upgradeBookRecord(record: unknown): BookRecord | null {
  return isReadable(record) ? (record as BookRecord) : null;
}
