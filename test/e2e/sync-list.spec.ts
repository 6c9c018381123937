import type { Page } from '@playwright/test';
import { ENTRY_SCHEMA_VERSION } from '../../shared/entries/entry.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, passTime, test } from './fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, SHIFT_END, SHIFT_KEY } from './fixtures/mill-facts.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test('what is held, refused or for a newer server is listed with its sentence', async ({ mill, tablet }) => {
  const { page } = tablet;
  const loomside = new LoomsidePage(page);
  const badge = new SyncBadge(page);
  await loomside.open();
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  await badge.says('In the book');

  await goOffline(mill, tablet);
  await loomside.tap(1, 'Warp break');
  await loomside.tap(2, 'Warp break');
  await loomside.tap(3, 'Weft break');
  await badge.says('3 waiting');
  await badge.open();
  await expect(badge.panel).toContainText('Waiting to be sent');
  await page.keyboard.press('Escape');

  // Loom 3's came from a newer application than the server is; loom 2 turns out to have come later; the shift is closed.
  await fromANewerApplication(page, 'loom-3');
  await mill.setNow(SHIFT_END + 10 * MINUTE);
  await mill.boot();
  await mill.change(`UPDATE "loom" SET "from" = ${SHIFT_END} WHERE "id" = 'loom-2'`);
  const foreman = await BookHand.signIn(mill, 'foreman');
  const closed = await foreman.log({ kind: 'close', shiftKey: SHIFT_KEY });
  expect(closed.results[0]?.result).toBe('stored');
  const tabletNow = await page.evaluate(() => Date.now());
  await tablet.context.clock.fastForward(mill.now() - tabletNow);
  mill.proxy.mend();
  await tablet.context.setOffline(false);
  await badge.says(/needs? a look/);

  await badge.open();
  await expect(badge.panel).toContainText('Held for the foreman');
  await expect(badge.panel).toContainText('The shift was closed before this came.');
  await expect(badge.panel).toContainText('Not taken by the book');
  await expect(badge.panel).toContainText('The loom was not in the shed at that time.');
  await expect(badge.panel).toContainText('For a newer server');

  const download = page.waitForEvent('download');
  await badge.panel.getByRole('button', { name: 'Export as a file' }).click();
  expect((await download).suggestedFilename()).toContain('not-in-the-book.json');
  await badge.panel.getByRole('button', { name: 'Put away' }).click();
  await expect(badge.panel).not.toContainText('Not taken by the book');
});

test('an answer that was lost makes no second entry: sent again, it is known', async ({ mill, tablet }) => {
  const { page } = tablet;
  const loomside = new LoomsidePage(page);
  const badge = new SyncBadge(page);
  await loomside.open();
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  await badge.says('In the book');

  mill.proxy.loseAnswers();
  await loomside.tap(1, 'Warp break');
  await badge.says('1 waiting');
  mill.proxy.mend();
  await passTime(mill, 5 * MINUTE, tablet);
  await badge.says('In the book');
  const sheet = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
  expect(sheet.lines.find((one) => one.loomNumber === 1)?.figures.warp.count).toBe(1);
});

/** Gives the waiting entry of a loom the schema of a later version, as that version would have stored it. */
async function fromANewerApplication(page: Page, loomId: string): Promise<void> {
  const changed = await page.evaluate(
    ({ wanted, newer }) =>
      new Promise<number>((resolve, reject) => {
        const opening = indexedDB.open('shedbeat');
        opening.onerror = () => reject(opening.error);
        opening.onsuccess = () => {
          const transaction = opening.result.transaction('outbox', 'readwrite');
          const store = transaction.objectStore('outbox');
          let count = 0;
          store.openCursor().onsuccess = (event) => {
            const cursor = (event.target as IDBRequest<IDBCursorWithValue | null>).result;
            if (!cursor) return;
            const record = cursor.value as { entry: { loomId?: string; schema: number } };
            if (record.entry.loomId === wanted) {
              record.entry.schema = newer;
              cursor.update(record);
              count++;
            }
            cursor.continue();
          };
          transaction.oncomplete = () => {
            opening.result.close();
            resolve(count);
          };
        };
      }),
    { wanted: loomId, newer: ENTRY_SCHEMA_VERSION + 1 },
  );
  expect(changed).toBe(1);
}
