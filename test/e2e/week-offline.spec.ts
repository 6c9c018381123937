import type { Page } from '@playwright/test';
import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, goOnline, passTime, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, TABLET } from './fixtures/mill-facts.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

const WEEK = 7 * 86_400_000;
const TAPS = 20_000;
/** Real seconds that starting and unlocking may take with all of them waiting: a fence for a busy machine, no measure. */
const OPENED = 30;
/** Of these the browser has the second copy alone. */
const LOST = 1_000;

test('@sync a tablet opens quickly with 20,000 taps of a week, and sends them all', async ({
  mill,
  tablet,
}) => {
  test.setTimeout(400_000);
  const first = new LoomsidePage(tablet.page);
  await first.open();
  await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await first.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  await new SyncBadge(tablet.page).says('In the book');
  await waitForServiceWorker(tablet.page);
  await goOffline(mill, tablet);
  await first.tap(1, 'Warp break');
  const numbered = await tapForAWeek(
    tablet.page,
    TAPS - 1,
    LOOMS.map(({ id }) => id),
  );
  await tablet.page.close();
  await passTime(mill, WEEK, tablet);

  const page = await tablet.context.newPage();
  const began = performance.now();
  await page.goto('/loomside');
  const door = new FloorSignIn(page);
  await expect(page.locator('app-floor-sign-in-panel')).toBeVisible({ timeout: 60_000 });
  await door.unlock(PEOPLE.weaver.worksNumber, PIN);
  const badge = new SyncBadge(page);
  await badge.says(/^20.?000 waiting/);
  const opened = performance.now();
  expect((opened - began) / 1_000).toBeLessThan(OPENED);

  await goOnline(mill, tablet);
  await passTime(mill, MINUTE, tablet);
  await expect(page.locator('app-sync-badge')).toContainText('In the book', { timeout: 240_000 });
  const { devices } = await (await BookHand.signIn(mill, 'manager')).devices();
  expect(devices.find(({ id }) => id === TABLET.id)).toMatchObject({
    lastSeq: numbered,
    gaps: 0,
    waiting: 0,
  });
  await expect.poll(() => copiesIn(page)).toBe(0);
});

/** Makes of the one tap that waits so many more, spread over the week after it, in both of the browser's stores. */
function tapForAWeek(page: Page, count: number, loomIds: string[]): Promise<number> {
  return page.evaluate(
    async ({ count, loomIds, week, lost }) => {
      const done = <T>(request: IDBRequest<T>) =>
        new Promise<T>((resolve, reject) => {
          request.onsuccess = () => resolve(request.result);
          request.onerror = () => reject(request.error);
        });
      const database = await done(indexedDB.open('shedbeat'));
      const transaction = database.transaction(['outbox', 'facts'], 'readwrite');
      const outbox = transaction.objectStore('outbox');
      const [one] = (await done(outbox.getAll())) as [{ entry: Record<string, unknown> & { at: number } }];
      const { entry } = one;
      const seq = Number(entry['deviceSeq']);
      const records = Array.from({ length: count }, (_, n) => {
        const at = entry.at + Math.floor(((n + 1) * week) / (count + 1));
        const time = at.toString(16).padStart(12, '0');
        const place = n.toString(16).padStart(12, '0');
        const id = `${time.slice(0, 8)}-${time.slice(8)}-7000-8000-${place}`;
        const tap = { id, deviceSeq: seq + n + 1, at, recordedAt: at, loomId: loomIds[n % loomIds.length] };
        return { ...one, savedAt: at, entry: { ...entry, ...tap } };
      });
      for (const record of records.slice(0, -lost)) outbox.put(record, record.entry.id);
      transaction.objectStore('facts').put(seq + count - lost, `seq:${String(entry['deviceId'])}`);
      await new Promise((resolve) => (transaction.oncomplete = resolve));
      database.close();
      for (let from = 0; from < count; from += 200)
        await Promise.all(
          records.slice(from, from + 200).map(async (record) => {
            const { id } = record.entry;
            const copies = await caches.open(`shedbeat-outbox-copy-${id.slice(-1)}`);
            await copies.put(`/outbox-copy/${id}`, Response.json(record));
          }),
        );
      return seq + count;
    },
    { count, loomIds, week: WEEK, lost: LOST },
  );
}

/** Second copies of entries that are not in the book. */
function copiesIn(page: Page): Promise<number> {
  return page.evaluate(async () => {
    const names = (await caches.keys()).filter((name) => name.startsWith('shedbeat-outbox-copy'));
    let count = 0;
    for (const name of names) count += (await (await caches.open(name)).keys()).length;
    return count;
  });
}
