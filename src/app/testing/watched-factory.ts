import { IDBFactory } from 'fake-indexeddb';

/**
 * A fresh in-memory IndexedDB that a spec can look at and do harm to: it notes what happens in what order, can close
 * connections under the application's feet, and can make puts fail. Several `LocalDatabase`s on one are several tabs.
 */
export class WatchedFactory {
  private readonly inner = new IDBFactory();
  private readonly connections: IDBDatabase[] = [];
  /** `put`, `complete`, `abort` in the order in which they happened. */
  readonly happened: string[] = [];
  readonly durabilities: (string | undefined)[] = [];
  /** Called before each put; what it throws, the put fails with. */
  beforePut: (store: string, value: unknown) => void = () => undefined;

  /** What `LocalDatabase` is given. */
  get factory(): globalThis.IDBFactory {
    return new Proxy(this.inner, {
      get: (target, property) => {
        if (property === 'open') return (name: string, version?: number) => this.open(name, version);
        const value: unknown = Reflect.get(target, property);
        return typeof value === 'function' ? (value.bind(target) as unknown) : value;
      },
    }) as unknown as globalThis.IDBFactory;
  }

  /** As a browser does when its storage process goes away. */
  closeConnections(): void {
    for (const connection of this.connections.splice(0)) connection.close();
  }

  private open(name: string, version?: number): IDBOpenDBRequest {
    const request = this.inner.open(name, version) as unknown as IDBOpenDBRequest;
    request.addEventListener('success', () => this.watch(request.result));
    return request;
  }

  private watch(database: IDBDatabase): void {
    this.connections.push(database);
    const begin = database.transaction.bind(database);
    database.transaction = (stores, mode, options) => {
      const transaction = begin(stores, mode, options);
      if (mode === 'readwrite') {
        this.durabilities.push(options?.durability);
        transaction.addEventListener('complete', () => this.happened.push('complete'));
        transaction.addEventListener('abort', () => this.happened.push('abort'));
      }
      const open = transaction.objectStore.bind(transaction);
      transaction.objectStore = (store) => {
        const objects = open(store);
        const put = objects.put.bind(objects);
        objects.put = (value, key) => {
          this.beforePut(store, value);
          this.happened.push('put');
          return put(value, key);
        };
        return objects;
      };
      return transaction;
    };
  }
}

/** What a browser throws when its storage is full. */
export function quotaExceeded(): DOMException {
  return new DOMException('The quota has been exceeded.', 'QuotaExceededError');
}
