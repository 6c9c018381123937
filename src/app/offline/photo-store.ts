import type { ErrorCode } from '@shared/contract/errors';
import { result, type LocalDatabase } from './local-database';
import { isReadable, RECORD_VERSION } from './records';

/** A photo that the server has not got yet. Kept as bytes: not every browser keeps a `Blob` in its store. */
export interface PhotoRecord {
  readonly v: number;
  readonly id: string;
  /** The `repair` entry that names it, or will. */
  readonly repairId: string;
  readonly bytes: ArrayBuffer;
  readonly type: string;
  /** Device's clock. */
  readonly takenAt: number;
  /** The repair was logged: it waits to be sent. Before that it belongs to what is being written. */
  readonly logged: boolean;
  /** Why the server will not have it; null: it has not said so. */
  readonly code: ErrorCode | null;
}

export type NewPhoto = Pick<PhotoRecord, 'id' | 'repairId' | 'bytes' | 'type' | 'takenAt'>;

/** Photos on this device's disk until they are in the book. Every write is durable when it resolves. */
export class PhotoStore {
  constructor(private readonly database: LocalDatabase) {}

  async add(photo: NewPhoto): Promise<void> {
    const record: PhotoRecord = { ...photo, v: RECORD_VERSION, logged: false, code: null };
    await this.database.transact(['photos'], 'readwrite', (transaction) =>
      result(transaction.objectStore('photos').put(record, record.id)),
    );
  }

  async all(): Promise<PhotoRecord[]> {
    const raw = await this.database.transact(['photos'], 'readonly', (transaction) =>
      result<unknown[]>(transaction.objectStore('photos').getAll()),
    );
    return raw.filter((one): one is PhotoRecord => isReadable(one)).sort((a, b) => (a.id < b.id ? -1 : 1));
  }

  async ofRepair(repairId: string): Promise<PhotoRecord[]> {
    return (await this.all()).filter((photo) => photo.repairId === repairId);
  }

  /** From now on these wait to be sent (or, the repair not being saved after all, do not yet). */
  async markLogged(ids: readonly string[], logged: boolean): Promise<void> {
    await this.change(ids, (photo) => ({ ...photo, logged }));
  }

  async refuse(id: string, code: ErrorCode): Promise<void> {
    await this.change([id], (photo) => ({ ...photo, code }));
  }

  async drop(ids: readonly string[]): Promise<void> {
    await this.database.transact(['photos'], 'readwrite', async (transaction) => {
      for (const id of ids) await result(transaction.objectStore('photos').delete(id));
    });
  }

  /** Drops pictures of what was never logged. */
  async prune(before: number): Promise<void> {
    const old = (await this.all()).filter(({ logged, takenAt }) => !logged && takenAt < before);
    if (old.length > 0) await this.drop(old.map(({ id }) => id));
  }

  private async change(ids: readonly string[], make: (photo: PhotoRecord) => PhotoRecord): Promise<void> {
    await this.database.transact(['photos'], 'readwrite', async (transaction) => {
      const store = transaction.objectStore('photos');
      for (const id of ids) {
        const known = await result<unknown>(store.get(id));
        if (isReadable(known)) await result(store.put(make(known as unknown as PhotoRecord), id));
      }
    });
  }
}
