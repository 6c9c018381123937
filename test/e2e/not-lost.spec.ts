import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, goOnline, passTime, test } from './fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, SHIFT_KEY } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test.describe('@sync what only a browser shows', () => {
  test('two tabs tap without network; each tap is in the book once', async ({ mill, tablet }) => {
    const first = new LoomsidePage(tablet.page);
    await first.open();
    await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await first.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
    await new SyncBadge(tablet.page).says('In the book');
    const other = await tablet.context.newPage();
    const second = new LoomsidePage(other);
    await second.open();
    await expect(second.card(1)).toBeVisible();

    await goOffline(mill, tablet);
    await first.tap(1, 'Warp break');
    await second.tap(2, 'Warp break');
    await first.tap(1, 'Warp break');
    await second.tap(2, 'Weft break');
    await new SyncBadge(tablet.page).says('4 waiting');
    await new SyncBadge(other).says('4 waiting');
    await goOnline(mill, tablet);
    await passTime(mill, MINUTE, tablet);
    await new SyncBadge(tablet.page).says('In the book');
    await new SyncBadge(other).says('In the book');
    const { lines } = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
    const counts = [1, 2].map((number) => {
      const figures = lines.find((one) => one.loomNumber === number)?.figures;
      return [figures?.warp.count, figures?.weft.count];
    });
    expect(counts).toEqual([
      [2, 0],
      [1, 1],
    ]);
  });

  test('a tap for which there is no room is not shown as saved, and the person is told', async ({
    mill,
    tablet,
  }) => {
    const { page, context } = tablet;
    const loomside = new LoomsidePage(page);
    await loomside.open();
    await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
    await new SyncBadge(page).says('In the book');
    const chromium = await context.newCDPSession(page);
    await chromium.send('Storage.overrideQuotaForOrigin', { origin: mill.url, quotaSize: 1 });
    const button = loomside.card(1).getByRole('button', { name: /^Warp break, / });
    // Chromium remembers for half a minute how much room there was.
    let taps = 0;
    await expect(async () => {
      taps++;
      await button.click();
      await expect(page.getByText(/Not saved: this device’s storage is full/)).toBeVisible({
        timeout: 2_000,
      });
    }).toPass({ timeout: 60_000 });
    await expect(button).toHaveAttribute('aria-label', `Warp break, ${taps - 1} this shift`);
    await chromium.send('Storage.overrideQuotaForOrigin', { origin: mill.url });
    await loomside.tap(2, 'Warp break');
  });

  test('what a tablet cannot send, it exports, and the foreman brings it in', async ({
    mill,
    tablet,
    desk,
  }) => {
    const loomside = new LoomsidePage(tablet.page);
    const badge = new SyncBadge(tablet.page);
    await loomside.open();
    await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
    await badge.says('In the book');
    mill.proxy.cut();
    await tablet.context.setOffline(true);
    await loomside.tap(1, 'Warp break');
    await loomside.tap(2, 'Weft break');
    await badge.says('2 waiting');
    await badge.open();
    const download = tablet.page.waitForEvent('download');
    await badge.panel.getByRole('button', { name: 'Export as a file' }).click();
    const file = await (await download).path();

    mill.proxy.mend();
    await new DeskSignIn(desk.page).signIn('foreman');
    const office = new SyncBadge(desk.page);
    await office.open();
    await office.panel.locator('input[type=file]').setInputFiles(file);
    await expect(office.panel).toContainText('2 entries are in the book.');
    await tablet.context.setOffline(false);
    await passTime(mill, MINUTE, tablet);
    await badge.says('In the book');
    const { lines } = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
    expect(lines.find((one) => one.loomNumber === 1)?.figures.warp.count).toBe(1);
    expect(lines.find((one) => one.loomNumber === 2)?.figures.weft.count).toBe(1);
  });
});
