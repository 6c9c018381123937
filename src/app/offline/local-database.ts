import type { UseStore } from 'idb-keyval';

/**
 * Object stores. `sent`: acknowledged entries of the last 14 days, to be sent again if the server lost them. `photos`:
 * pictures that the server has not got yet. `seen`: reports as they were last seen, for when there is no network.
 */
export const STORES = ['outbox', 'sent', 'entries', 'shifts', 'fittings', 'facts', 'photos', 'seen'] as const;
export type StoreName = (typeof STORES)[number];

/** 2 brought `photos` and `seen`. */
const VERSION = 2;

/** A promise of a request's result, for use inside a transaction. */
export function result<T>(request: IDBRequest<T>): Promise<T> {
  return new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error);
  });
}

/**
 * The device's IndexedDB. Every write is durable when `transact` resolves: it asks for strict durability (the
 * browser has flushed to disk, not only to its cache) and waits for the transaction's `complete`, not for the
 * request's `success`. A connection that was closed under us is opened again and the work done once more, which is
 * harmless, since a transaction that did not complete left nothing behind.
 */
export class LocalDatabase {
  private opening: Promise<IDBDatabase> | null = null;

  constructor(
    private readonly factory: IDBFactory,
    private readonly name = 'shedbeat',
  ) {}

  async transact<T>(
    stores: readonly StoreName[],
    mode: IDBTransactionMode,
    work: (transaction: IDBTransaction) => T | PromiseLike<T>,
  ): Promise<T> {
    try {
      return await this.once(stores, mode, work);
    } catch (error) {
      if (!isLostConnection(error)) throw error;
      this.forget();
      return this.once(stores, mode, work);
    }
  }

  /** One store as `idb-keyval` wants it, with our durability and our reopening. */
  store(name: StoreName): UseStore {
    return (mode, work) => this.transact([name], mode, (transaction) => work(transaction.objectStore(name)));
  }

  async close(): Promise<void> {
    const opening = this.opening;
    this.forget();
    (await opening?.catch(() => null))?.close();
  }

  private async once<T>(
    stores: readonly StoreName[],
    mode: IDBTransactionMode,
    work: (transaction: IDBTransaction) => T | PromiseLike<T>,
  ): Promise<T> {
    const database = await this.open();
    const transaction = database.transaction([...stores], mode, { durability: 'strict' });
    const complete = new Promise<void>((resolve, reject) => {
      // Listeners, not handlers: idb-keyval sets the handlers of transactions that it writes in.
      transaction.addEventListener('complete', () => resolve());
      transaction.addEventListener('abort', () =>
        reject(transaction.error ?? new DOMException('The transaction was aborted.', 'AbortError')),
      );
    });
    // Heard below; said here so that a failure of `work` that comes first leaves no unheard rejection.
    complete.catch(() => undefined);
    let value: T;
    try {
      value = await work(transaction);
    } catch (error) {
      abort(transaction);
      // Where the transaction failed of itself (quota), its own error says why.
      throw transaction.error ?? error;
    }
    await complete;
    return value;
  }

  private open(): Promise<IDBDatabase> {
    this.opening ??= this.connect().catch((error: unknown) => {
      this.opening = null;
      throw error;
    });
    return this.opening;
  }

  private connect(): Promise<IDBDatabase> {
    return new Promise((resolve, reject) => {
      const request = this.factory.open(this.name, VERSION);
      request.onupgradeneeded = () => upgrade(request.result);
      request.onerror = () => reject(request.error);
      request.onsuccess = () => {
        const database = request.result;
        // A newer version in another tab must not wait for us; we open again at the next use.
        database.onversionchange = () => {
          database.close();
          this.forget();
        };
        database.onclose = () => this.forget();
        resolve(database);
      };
    });
  }

  private forget(): void {
    this.opening = null;
  }
}

function upgrade(database: IDBDatabase): void {
  const has = (name: StoreName) => database.objectStoreNames.contains(name);
  if (!has('outbox')) database.createObjectStore('outbox').createIndex('state', 'state');
  if (!has('sent')) database.createObjectStore('sent').createIndex('settledAt', 'settledAt');
  if (!has('entries')) database.createObjectStore('entries').createIndex('at', 'at');
  for (const name of ['shifts', 'fittings', 'facts', 'photos', 'seen'] as const)
    if (!has(name)) database.createObjectStore(name);
}

function abort(transaction: IDBTransaction): void {
  try {
    transaction.abort();
  } catch {
    // It had ended already.
  }
}

/** Safari says UnknownError when its storage process went away; the others InvalidStateError. */
function isLostConnection(error: unknown): boolean {
  const name = error instanceof DOMException || error instanceof Error ? error.name : '';
  return name === 'InvalidStateError' || name === 'UnknownError';
}
