/** Runs in the browser, as text: what is measured there. Times in ms by `performance.now()`. */

export interface PutTimes {
  readonly durable: number[];
  readonly painted: number[];
}

export interface TapTimes extends PutTimes {
  /** Until the finger's mark is on the screen, before anything is saved. */
  readonly seen: number[];
}

declare global {
  interface Window {
    /** Called whenever a transaction that writes in the outbox is complete. */
    outboxDone?: (at: number) => void;
  }
}

/** Before the application starts: its clock is the mill's, and its outbox is watched. */
export function watch(ahead: number): void {
  const now = Date.now.bind(Date);
  Date.now = () => now() + ahead;
  const open = IDBDatabase.prototype.transaction;
  IDBDatabase.prototype.transaction = function (stores, mode, options) {
    const transaction = open.call(this, stores, mode, options);
    if (mode === 'readwrite' && [stores].flat().includes('outbox'))
      transaction.addEventListener('complete', () => window.outboxDone?.(performance.now()));
    return transaction;
  };
}

/** A bare strict put, and a change of the page painted after it, in an empty page. */
export async function barePuts(rounds: number): Promise<PutTimes> {
  const database = await new Promise<IDBDatabase>((resolve, reject) => {
    const request = indexedDB.open('bench-put', 1);
    request.onupgradeneeded = () => request.result.createObjectStore('puts');
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('IndexedDB did not open.'));
  });
  const times: PutTimes = { durable: [], painted: [] };
  const line = document.body.appendChild(document.createElement('p'));
  for (let round = 0; round < rounds; round++) {
    await new Promise((resolve) => setTimeout(resolve, 150 + Math.random() * 100));
    const began = performance.now();
    await new Promise<void>((resolve) => {
      const transaction = database.transaction('puts', 'readwrite', { durability: 'strict' });
      transaction.objectStore('puts').put({ round, words: 'x'.repeat(400) }, round);
      transaction.oncomplete = () => resolve();
    });
    times.durable.push(performance.now() - began);
    line.textContent = `put ${round}`;
    await new Promise<void>((resolve) =>
      requestAnimationFrame(() => {
        const channel = new MessageChannel();
        channel.port1.onmessage = () => resolve();
        channel.port2.postMessage(null);
      }),
    );
    times.painted.push(performance.now() - began);
  }
  database.close();
  return times;
}

/** Taps on the looms' cards in turn, until each is durable, and until its count stands on the screen. */
export async function taps(rounds: number): Promise<TapTimes> {
  const times: TapTimes = { seen: [], durable: [], painted: [] };
  const painted = (): Promise<number> =>
    new Promise((resolve) =>
      requestAnimationFrame(() => {
        const channel = new MessageChannel();
        channel.port1.onmessage = () => resolve(performance.now());
        channel.port2.postMessage(null);
      }),
    );
  const buttons = [...document.querySelectorAll<HTMLElement>('app-loom-card .tap[aria-label$="this shift"]')];
  for (let round = 0; round < rounds; round++) {
    await new Promise((resolve) => setTimeout(resolve, 150 + Math.random() * 100));
    const button = buttons[round % buttons.length];
    if (!button) throw new Error('There is no loom to tap on.');
    const durable = new Promise<number>((resolve) => {
      window.outboxDone = resolve;
    });
    const changed = (attribute: string): Promise<number> =>
      new Promise((resolve) => {
        const observer = new MutationObserver(() => {
          observer.disconnect();
          void painted().then(resolve);
        });
        observer.observe(button, { attributeFilter: [attribute] });
      });
    const seen = changed('aria-busy');
    const counted = changed('aria-label');
    const began = performance.now();
    button.click();
    times.seen.push((await seen) - began);
    times.durable.push((await durable) - began);
    times.painted.push((await counted) - began);
  }
  return times;
}
