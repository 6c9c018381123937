import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, goOnline, passTime, test } from './fixtures/fixtures.js';
import { CLOTH, LOOMS, MINUTE, PEOPLE, PIN, SHIFT_KEY, SHIFT_START } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorPage } from './pages/floor-page.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test('the foreman sees a stop as it is logged, and since when he sees nothing new @floor', async ({
  mill,
  tablet,
  desk,
}) => {
  test.setTimeout(180_000);
  const loomside = new LoomsidePage(tablet.page);
  const floor = new FloorPage(desk.page);
  // The tablet has measured its clock against the server's since both were moved on.
  const badge = new SyncBadge(tablet.page);

  await test.step('a weaver minds six looms, the foreman sees them run', async () => {
    await loomside.open();
    await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
    await new DeskSignIn(desk.page).signIn('foreman');
    await expect(desk.page).toHaveURL(/\/floor$/);
    await floor.running('6 of 6');
    await expect(floor.news).toContainText('Live');
    await expect(floor.tile(2)).toHaveAccessibleName(/runs, efficiency at most 100\.0%.*minded by Wanda/);
  });

  await test.step('a loom stands: its tile says for what and since when, without a reload', async () => {
    // 06:48 in London, give or take the seconds of this test.
    await passTime(mill, 47 * MINUTE, tablet, desk);
    await badge.says(/In the book.*06:4\d/);
    await expect(floor.news).toContainText('Live', { timeout: 30_000 });
    await loomside.stands(2, 'Weft fork');
    await expect(floor.tile(2)).toHaveAccessibleName(/stands for 0 min since 06:4\d: Weft fork/, {
      timeout: 15_000,
    });
    await floor.running('5 of 6');
  });

  await test.step('the minutes count on, the tackler is called', async () => {
    await passTime(mill, 12 * MINUTE, tablet, desk);
    await badge.says(/In the book.*07:0\d/);
    await expect(floor.tile(2)).toHaveAccessibleName(/stands for 12 min/, { timeout: 30_000 });
    await loomside.card(2).getByRole('button', { name: 'Call' }).click();
    await expect(floor.tile(2)).toHaveAccessibleName(
      /Weft fork, waiting for tackler\. Tackler called 07:0\d/,
      {
        timeout: 15_000,
      },
    );
    await expect(floor.calls).toContainText('1');
  });

  await test.step('what stands is found by the filter', async () => {
    await floor.filter('Standing now').click();
    await expect(floor.tile(1)).toBeHidden();
    await expect(floor.tile(2)).toBeVisible();
    await floor.filter('No stop for two hours').click();
    await expect(desk.page.getByText('The shift is not two hours old yet.')).toBeVisible();
    await floor.filter('All').click();
    await expect(floor.tile(1)).toBeVisible();
  });

  await test.step('the wire is cut: the floor says since when, and its minutes stand still', async () => {
    await goOffline(mill, desk);
    await expect(floor.news).toContainText(/As of 07:0\d/, { timeout: 30_000 });
    const stood = async () =>
      /stands for (\d+ min)/.exec((await floor.tile(2).getAttribute('aria-label')) ?? '')?.[1];
    const before = await stood();
    expect(before).toMatch(/^1[2-4] min$/);
    await desk.context.clock.fastForward(30 * MINUTE);
    await expect(desk.page.locator('header').first()).toContainText('1 h 3');
    expect(await stood()).toBe(before);
    await expect(floor.news).toContainText(/As of 07:0\d/);
    await expectAccessible(desk.page, 'Floor without news');
  });

  await test.step('with the wire mended it goes on', async () => {
    await mill.setNow(await desk.page.evaluate(() => Date.now()));
    await tablet.context.clock.fastForward(30 * MINUTE);
    await goOnline(mill, desk);
    await desk.context.clock.fastForward(MINUTE);
    await expect(floor.news).toContainText('Live', { timeout: 30_000 });
    await expect(floor.tile(2)).toHaveAccessibleName(/stands for 4\d min/, { timeout: 30_000 });
    await badge.says(/In the book.*07:3\d/);
    await loomside.running(2);
    await tablet.context.clock.fastForward(MINUTE);
    await expect(floor.tile(2)).toHaveAccessibleName(/^Loom 2 runs/, { timeout: 30_000 });
    await floor.running('6 of 6');
  });

  await test.step('the most that it can have woven is what the logged stops leave', async () => {
    // It stood from 06:48 to about 07:32 of the time since 06:00.
    const now = await desk.page.evaluate(() => Date.now());
    const elapsed = (now - SHIFT_START) / MINUTE;
    expect(await floor.efficiency(1)).toBe(100);
    const stood = elapsed * (1 - (await floor.efficiency(2)) / 100);
    // The clocks were set ahead by 12 and 30 minutes, one after another: they are some seconds apart, either way.
    expect(stood).toBeGreaterThan(41);
    expect(stood).toBeLessThan(46);
  });

  await test.step('the loom opens its line', async () => {
    await floor.tile(2).click();
    const line = floor.line(2);
    await expect(line).toContainText('Weft fork');
    await expect(line).toContainText(/min waiting for the tackler/);
    await expect(line).toContainText('At the start');
    await expect(line).toContainText('1,000');
    await expectAccessible(desk.page, 'a loom’s line');
    await desk.page.keyboard.press('Escape');
    await expect(line).toBeHidden();
    await expect(floor.tile(2)).toBeFocused();
    await expect(desk.page).toHaveURL(/\/floor$/);
  });
});

test('a tackler sees the floor without names, on a tablet and on a phone @floor', async ({
  mill,
  tablet,
}) => {
  const foreman = await BookHand.signIn(mill, 'foreman');
  const loomIds = LOOMS.map(({ id }) => id);
  await foreman.log({ kind: 'assign', shiftKey: SHIFT_KEY, weaverId: PEOPLE.weaver.id, loomIds });
  await foreman.log({ kind: 'standing', loomId: LOOMS[3].id, cause: 'smash' });
  await foreman.log({ kind: 'standing', loomId: LOOMS[4].id, cause: 'no-order' });

  const floor = new FloorPage(tablet.page);
  await floor.open();
  await new FloorSignIn(tablet.page).signIn(PEOPLE.tackler.worksNumber, PIN);
  await expect(floor.tile(4)).toHaveAccessibleName(/: Smash/);
  await expect(floor.tile(5)).toHaveAccessibleName(/: No order/);
  await expect(tablet.page.getByText('Wanda')).toHaveCount(0);
  await expectAccessible(tablet.page, 'Floor on a tablet');

  await tablet.page.setViewportSize({ width: 360, height: 740 });
  await expect(tablet.page.getByRole('heading', { name: 'Row 2' })).toBeVisible();
  await expectAccessible(tablet.page, 'Floor on a phone');
  // Nothing sticks out sideways.
  expect(await tablet.page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(360);
});

test('the floor is not a weaver’s screen @floor', async ({ tablet }) => {
  await new FloorPage(tablet.page).open();
  await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await expect(tablet.page.getByRole('heading', { name: 'Not for your role' })).toBeVisible();
  await expect(tablet.page.getByRole('link', { name: 'Floor' })).toHaveCount(0);
});

test('a shed stop by one tap, looms ticked off as they restart, and what is below target @floor', async ({
  mill,
  desk,
}) => {
  const { page } = desk;
  const floor = new FloorPage(page);
  const badge = new SyncBadge(page);
  await mill.change(
    `INSERT INTO "target" ("id", "clothId", "effectiveAt", "efficiency", "warpBreaks", "weftBreaks")
     VALUES ('t-1', '${CLOTH.id}', ${Date.UTC(2026, 0, 1)}, 0.7, NULL, NULL)`,
  );
  await new DeskSignIn(page).signIn('foreman');
  await floor.open();
  await floor.running('6 of 6');

  await test.step('the power fails: one tap for the shed', async () => {
    await page.getByText('Shed stop', { exact: true }).click();
    await expectAccessible(page, 'Floor, shed stop');
    await page.getByRole('button', { name: 'Power', exact: true }).click();
    await expect(page.getByText('6 looms stand still')).toBeVisible();
    await floor.running('0 of 6');
  });

  await test.step('looms are ticked off as they restart', async () => {
    await passTime(mill, 30 * MINUTE, desk);
    await page.getByRole('button', { name: 'Tick off loom 4: it runs again' }).click();
    await expect(page.getByText('5 looms stand still')).toBeVisible();
    await floor.running('1 of 6');
    await expectAccessible(page, 'Floor in a shed stop');
    await page.getByRole('button', { name: 'All run again' }).click();
    await floor.running('6 of 6');
    await badge.says('In the book');
    const { lines } = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
    for (const { line } of lines)
      expect(line.stops.filter((stop) => stop.shedWide && stop.until)).toHaveLength(1);
  });

  await test.step('a shed stop lays no loom below its target; a loom’s own stop does', async () => {
    await expect(floor.filter('Below target')).toContainText('0');
    await passTime(mill, 60 * MINUTE, desk);
    const stop = { kind: 'stop', loomId: 'loom-5', cause: 'gaiting', count: 1 };
    const hand = await BookHand.signIn(mill, 'foreman');
    await hand.log({ ...stop, at: mill.now() - 40 * MINUTE, until: mill.now() });
    await expect(floor.filter('Below target')).toContainText('1', { timeout: 30_000 });
    await floor.filter('Below target').click();
    await expect(floor.tile(5)).toBeVisible();
    await expect(floor.tile(4)).toBeHidden();
  });
});
