import type { Browser, Page } from '@playwright/test';
import { expectAccessible } from './fixtures/axe.js';
import {
  expect,
  goOffline,
  goOnline,
  makeTablet,
  openScreen,
  passTime,
  test,
  waitForServiceWorker,
  type Screen,
} from './fixtures/fixtures.js';
import { HOUR, LOOMS, MINUTE, PEOPLE, PIN } from './fixtures/mill-facts.js';
import type { MillServer } from './fixtures/mill-server.js';
import { expectTouchable } from './fixtures/touch-targets.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

const PHONE = { width: 360, height: 740 };
const TABLET_SIZE = { width: 1024, height: 768 };
const SIZES = [
  ['a phone', PHONE],
  ['a tablet', TABLET_SIZE],
] as const;
const START = LOOMS.map(({ number }) => [number, 1_000] as const);

/** A finger on a registered tablet or phone. */
async function touched(
  browser: Browser,
  mill: MillServer,
  size: { width: number; height: number },
): Promise<Screen> {
  const screen = await openScreen(browser, mill, size, { touch: true });
  await makeTablet(screen.context);
  return screen;
}

async function takeOver(page: Page): Promise<LoomsidePage> {
  const loomside = new LoomsidePage(page);
  await loomside.open();
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await loomside.takeOver(START);
  return loomside;
}

for (const [what, size] of SIZES)
  test.describe(`on ${what}`, { tag: '@loomside' }, () => {
    test('stops are counted, stand, change their cause and run, with network and without', async ({
      browser,
      mill,
    }) => {
      const screen = await touched(browser, mill, size);
      const { page } = screen;
      const loomside = await takeOver(page);
      await waitForServiceWorker(page);
      const badge = new SyncBadge(page);
      const card = loomside.card(1);

      await card.getByRole('button', { name: /^Warp break/ }).tap();
      await expect(card.getByRole('button', { name: 'Warp break, 1 this shift' })).toBeVisible();
      await page.getByRole('button', { name: 'Undo' }).first().tap();
      await expect(card.getByRole('button', { name: 'Warp break, 0 this shift' })).toBeVisible();

      await goOffline(mill, screen);
      await card.getByRole('button', { name: /^Weft break/ }).tap();
      await expect(card.getByRole('button', { name: 'Weft break, 1 this shift' })).toBeVisible();
      await card.getByRole('button', { name: 'Other stop' }).tap();
      const sheet = page.getByRole('dialog');
      await expectTouchable(page, `other stop on ${what}`);
      await sheet.getByRole('button', { name: 'Smash' }).first().tap();
      await expect(card.getByRole('button', { name: 'Running' })).toBeVisible();
      await card.getByRole('button', { name: 'Cause' }).tap();
      await sheet.getByRole('button', { name: 'No weaver' }).tap();
      await expect(card.getByText('No weaver', { exact: true })).toBeVisible();
      await passTime(mill, 4 * MINUTE, screen);
      await card.getByRole('button', { name: 'Running' }).tap();
      await expect(card.getByRole('button', { name: /^Weft break/ })).toBeVisible();
      await badge.says(/waiting/);

      await goOnline(mill, screen);
      await badge.says('In the book');
      // Later it is taken back from the loom's list, with a reason.
      await card.getByRole('link', { name: 'Loom 1, its list' }).tap();
      const row = page.getByRole('listitem').filter({ hasText: 'Weft break' });
      await row.getByRole('button', { name: 'Undo …' }).tap();
      await expectTouchable(page, `a loom's list on ${what}`);
      await page.getByRole('button', { name: 'Wrong loom' }).tap();
      await expect(row.getByText('taken back')).toBeVisible();
      // The commonest of this loom stands first next time.
      await page.getByRole('link', { name: 'Back to my looms' }).tap();
      await card.getByRole('button', { name: 'Other stop' }).tap();
      await expect(sheet.locator('section').first()).toContainText('Most on this loom');
      await expect(sheet.locator('section').first()).toContainText('Smash');
      await screen.context.close();
    });

    test('another’s loom opens by its label, is taken over for a while with a reading, and read in time', async ({
      browser,
      mill,
    }) => {
      const screen = await touched(browser, mill, size);
      const { page } = screen;
      await takeOver(page);
      await passTime(mill, HOUR, screen);
      // The relief: another weaver on the same tablet.
      await page.goto('/sign-in');
      await new FloorSignIn(page).signIn(PEOPLE.otherWeaver.worksNumber, PIN);
      await page.goto('/l/4');
      await expect(page.getByText('Not in your set')).toBeVisible();
      await expectTouchable(page, `one loom on ${what}`);
      await expectAccessible(page, `one loom on ${what}`);
      await page.goto('/loomside/find');
      await expectTouchable(page, `find a loom on ${what}`);
      await expectAccessible(page, `find a loom on ${what}`);
      await page.keyboard.press('5');
      await page.keyboard.press('Enter');
      await expect(page.getByRole('link', { name: 'Loom 5, its list' })).toBeVisible();
      await page.goto('/loomside/take-over');
      await expectTouchable(page, `take over on ${what}`);
      await page.getByRole('button', { name: 'Loom 5, taken' }).tap();
      await page.getByRole('button', { name: 'Take over 1 loom' }).tap();
      await expect(page.getByRole('heading', { name: 'Loom 5' })).toBeVisible();
      await expectTouchable(page, `a reading on ${what}`);
      await new LoomsidePage(page).read('Reading now', 1_110);
      await expect(new LoomsidePage(page).card(5)).toBeVisible();
      await screen.context.close();
    });

    test('the shift is handed over, explained and its picks confirmed; the next weaver confirms the set', async ({
      browser,
      mill,
    }) => {
      const screen = await touched(browser, mill, size);
      const { page } = screen;
      const loomside = await takeOver(page);
      await passTime(mill, 8 * HOUR - 3 * MINUTE, screen);
      await loomside.handOver(LOOMS.map(({ number }) => [number, 1_800, 12] as const));
      await expectTouchable(page, `handed over on ${what}`);
      await page.getByRole('link', { name: 'What is unaccounted, and my picks' }).tap();
      await page.getByRole('button', { name: 'Explain loom 1' }).tap();
      await expectTouchable(page, `my shift on ${what}`);
      await expectAccessible(page, `my shift on ${what}`);
      await page.getByRole('button', { name: 'All causes' }).tap();
      await page.getByRole('button', { name: 'Waiting for weft' }).tap();
      await expect(page.getByRole('button', { name: 'Explain loom 1' })).toBeHidden();
      await page.getByRole('button', { name: /^Confirm 6 looms/ }).tap();
      await expect(page.getByText('Your word is given on all 480,000 picks.')).toBeVisible();
      await new SyncBadge(page).says('In the book');

      await passTime(mill, 5 * MINUTE, screen);
      await page.goto('/sign-in');
      await new FloorSignIn(page).signIn(PEOPLE.otherWeaver.worksNumber, PIN);
      await page.goto('/loomside/take-over');
      for (const number of [2, 1])
        await page.getByRole('button', { name: new RegExp(`^Loom ${number}(,|$)`) }).tap();
      await page.getByRole('button', { name: 'Take over 2 looms' }).tap();
      await expect(page.getByRole('heading', { name: 'Confirm the readings' })).toBeVisible();
      await expectTouchable(page, `given readings on ${what}`);
      await expectAccessible(page, `given readings on ${what}`);
      await page.getByRole('button', { name: '2 looms show this' }).tap();
      await expect(loomside.card(2)).toBeVisible();
      // The walk is as it was touched.
      const order = await page
        .locator(what === 'a phone' ? '.chip .num' : 'app-loom-card .no')
        .allTextContents();
      expect(order.map((text) => text.trim())).toEqual(['2', '1']);
      await screen.context.close();
    });
  });

test(
  'a phone goes from loom to loom by a swipe, by its chips and by arrow keys; a swipe presses nothing',
  {
    tag: '@loomside',
  },
  async ({ browser, mill }) => {
    const screen = await touched(browser, mill, PHONE);
    const { page } = screen;
    const loomside = await takeOver(page);
    await expectTouchable(page, 'my looms on a phone');
    await expectAccessible(page, 'my looms on a phone');
    const session = await screen.context.newCDPSession(page);
    const box = await page.getByRole('button', { name: /^Warp break/ }).boundingBox();
    const [x, y] = [(box?.x ?? 0) + 150, (box?.y ?? 0) + 30];
    const finger = (type: 'touchStart' | 'touchMove' | 'touchEnd', at: number) =>
      session.send('Input.dispatchTouchEvent', {
        type,
        touchPoints: type === 'touchEnd' ? [] : [{ x: at, y }],
      });
    await finger('touchStart', x);
    for (const by of [20, 60, 100, 130]) await finger('touchMove', x - by);
    await finger('touchEnd', x);
    await expect(page.getByRole('tab', { selected: true })).toContainText('2');
    await expect(loomside.card(2).getByRole('button', { name: 'Warp break, 0 this shift' })).toBeVisible();
    await page.getByRole('tab', { name: /^3/ }).click();
    await expect(loomside.card(3)).toBeVisible();
    await page.getByRole('tab', { selected: true }).press('ArrowRight');
    await expect(loomside.card(4)).toBeVisible();
    await expect(page.getByRole('tab', { selected: true })).toBeFocused();
    await screen.context.close();
  },
);

test(
  'twelve looms stand on a ten-inch tablet without scrolling, lying and standing',
  {
    tag: '@loomside',
  },
  async ({ browser, mill }) => {
    await mill.change(
      `INSERT INTO "loom" SELECT 'loom-' || ("number" + 6), "shedId", "number" + 6, "row" + 2, "position", "alley", "from", "until" FROM "loom"`,
    );
    await mill.change(
      `INSERT INTO "loom_version" SELECT 'more-' || "id", 'loom-' || (substr("loomId", 6) + 6), "effectiveAt", "ppm", "reedSpaceCm", "clock", "shuttles", "battery" FROM "loom_version"`,
    );
    const screen = await touched(browser, mill, TABLET_SIZE);
    const { page } = screen;
    await new LoomsidePage(page).open();
    await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await page.getByRole('link', { name: 'Take over the set' }).click();
    for (let number = 7; number <= 12; number++)
      await page.getByRole('button', { name: `Loom ${number}`, exact: true }).tap();
    await page.getByRole('button', { name: 'Take over 12 looms' }).tap();
    await page.getByRole('link', { name: 'Stop here' }).tap();
    await expect(page.locator('app-loom-card')).toHaveCount(12);
    for (const size of [TABLET_SIZE, { width: 768, height: 1024 }]) {
      await page.setViewportSize(size);
      await expect
        .poll(() => page.evaluate(() => (document.scrollingElement?.scrollHeight ?? 0) - window.innerHeight))
        .toBeLessThanOrEqual(0);
      const lowest = await page.locator('app-loom-card').last().boundingBox();
      expect((lowest?.y ?? 0) + (lowest?.height ?? 0)).toBeLessThanOrEqual(size.height);
      await expectTouchable(page, `twelve looms, ${size.width} wide`);
      await expectAccessible(page, `twelve looms, ${size.width} wide`);
    }
    await screen.context.close();
  },
);

test(
  'a tablet left alone locks; the same PIN finds what was half typed, another’s PIN their own work',
  {
    tag: '@loomside',
  },
  async ({ browser, mill }) => {
    await mill.change(`UPDATE "mill" SET "lockAfterMinutes" = 5`);
    const screen = await touched(browser, mill, TABLET_SIZE);
    const { page } = screen;
    await takeOver(page);
    await page.getByRole('link', { name: 'Hand over' }).tap();
    for (const digit of ['1', '2']) await page.getByRole('button', { name: digit, exact: true }).tap();
    await passTime(mill, 4 * MINUTE, screen);
    const lock = page.getByRole('dialog', { name: 'This tablet is locked' });
    await expect(lock).toBeHidden();
    await passTime(mill, 2 * MINUTE, screen);
    await expect(lock).toBeVisible();
    await expectTouchable(page, 'the lock');
    await expectAccessible(page, 'the lock');
    // Loading the page again opens nothing.
    await page.reload();
    await expect(lock).toBeVisible();
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
    await expect(lock).toBeVisible();
    await new FloorSignIn(page).pin(PIN);
    await expect(lock).toBeHidden();
    const field = page.getByRole('textbox', { name: /^End reading/ });
    await expect(field).toHaveValue('12');

    await passTime(mill, 6 * MINUTE, screen);
    await expect(lock).toBeVisible();
    await goOffline(mill, screen);
    await lock.getByRole('button', { name: 'Somebody else' }).tap();
    await new FloorSignIn(page).number(PEOPLE.otherWeaver.worksNumber);
    await new FloorSignIn(page).pin(PIN);
    // Who never signed in here cannot without network; the door says so, and what was typed stays.
    await expect(lock.getByText('has not signed in on this tablet before')).toBeVisible();
    await goOnline(mill, screen);
    await new FloorSignIn(page).pin(PIN);
    await expect(lock).toBeHidden();
    await expect(page.getByText('You mind no looms in this shift yet')).toBeVisible();
    await page.goto('/sign-in');
    await new FloorSignIn(page).unlock(PEOPLE.weaver.worksNumber, PIN);
    await page.goto('/loomside/hand-over');
    await expect(field).toHaveValue('12');
    await screen.context.close();
  },
);
