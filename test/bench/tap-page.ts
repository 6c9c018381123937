/** Runs in the browser, as text: what is measured there. Times in ms by `performance.now()`. */

export interface PutTimes {
  readonly durable: number[];
  readonly painted: number[];
}

export interface TapTimes extends PutTimes {
  /** Until the screen says anything at all: that it is saving, where that takes long, or the count. */
  readonly seen: number[];
}

declare global {
  interface Window {
    /** Called whenever a transaction that puts a new entry in the outbox is complete. */
    outboxDone?: (at: number) => void;
    /** A frame's own callbacks are running: what changes now is painted with this frame. */
    inFrame?: boolean;
  }
}

/** Before the application starts: its clock is the mill's, and its outbox is watched. */
export function watch(ahead: number): void {
  const now = Date.now.bind(Date);
  Date.now = () => now() + ahead;
  const put = IDBObjectStore.prototype.put;
  IDBObjectStore.prototype.put = function (value: unknown, key) {
    // A new entry: what the book says of an older one lies in the same store.
    if (this.name === 'outbox' && (value as { rev?: unknown }).rev === 1)
      this.transaction.addEventListener('complete', () => window.outboxDone?.(performance.now()));
    return put.call(this, value, key);
  };
  const request = window.requestAnimationFrame.bind(window);
  window.requestAnimationFrame = (callback) =>
    request((at) => {
      window.inFrame = true;
      try {
        callback(at);
      } finally {
        // Behind the observers of what the callback changed.
        queueMicrotask(() => (window.inFrame = false));
      }
    });
}

/** A bare strict put, and a change of the page painted after it, in an empty page. */
export async function barePuts(rounds: number): Promise<PutTimes> {
  await new Promise((resolve) => setTimeout(resolve, 500));
  const database = await new Promise<IDBDatabase>((resolve, reject) => {
    const request = indexedDB.open('bench-put', 1);
    request.onupgradeneeded = () => request.result.createObjectStore('puts');
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('IndexedDB did not open.'));
  });
  const times: PutTimes = { durable: [], painted: [] };
  document.body.textContent = '';
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

/**
 * Taps on the looms' cards in turn, until each is durable, and until its count stands on the screen.
 *
 * @param from which button is first
 */
export async function taps({ rounds, from }: { rounds: number; from: number }): Promise<TapTimes> {
  // A page that comes to the front asks the book for news.
  await new Promise((resolve) => setTimeout(resolve, 500));
  const times: TapTimes = { seen: [], durable: [], painted: [] };
  const painted = (): Promise<number> =>
    new Promise((resolve) => {
      const drawn = (): void => {
        const channel = new MessageChannel();
        channel.port1.onmessage = () => resolve(performance.now());
        channel.port2.postMessage(null);
      };
      if (window.inFrame) drawn();
      else requestAnimationFrame(drawn);
    });
  const buttons = [...document.querySelectorAll<HTMLElement>('app-loom-card .tap[aria-label$="this shift"]')];
  for (let round = 0; round < rounds; round++) {
    await new Promise((resolve) => setTimeout(resolve, 150 + Math.random() * 100));
    const button = buttons[(from + round) % buttons.length];
    if (!button) throw new Error('There is no loom to tap on.');
    const durable = new Promise<number>((resolve) => {
      window.outboxDone = resolve;
    });
    const changed = (attributeFilter: string[]): Promise<number> =>
      new Promise((resolve) => {
        const observer = new MutationObserver(() => {
          observer.disconnect();
          void painted().then(resolve);
        });
        observer.observe(button, { attributeFilter });
      });
    const seen = changed(['aria-busy', 'aria-label']);
    const counted = changed(['aria-label']);
    const began = performance.now();
    button.click();
    times.durable.push((await durable) - began);
    times.seen.push((await seen) - began);
    times.painted.push((await counted) - began);
  }
  return times;
}
