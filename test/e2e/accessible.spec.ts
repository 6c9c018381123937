import { BookHand } from './fixtures/book-hand.js';
import { expectAccessible } from './fixtures/axe.js';
import { expect, passTime, test } from './fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, SHIFT_END, SHIFT_KEY, SHIFT_START } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test('the weaver’s screens, by day and by night', async ({ mill, tablet }) => {
  test.setTimeout(180_000);
  const { page } = tablet;
  const loomside = new LoomsidePage(page);
  await loomside.open();
  await expect(page.getByRole('status', { name: 'Works number' })).toBeVisible();
  await expectAccessible(page, 'floor sign-in');
  const door = new FloorSignIn(page);
  await door.number(PEOPLE.weaver.worksNumber);
  await expectAccessible(page, 'PIN');
  await door.pin(PIN);
  await page.getByRole('link', { name: 'Take over the set' }).click();
  await expect(page.getByRole('button', { name: 'Take over 6 looms' })).toBeVisible();
  await expectAccessible(page, 'take over');
  await page.getByRole('button', { name: 'Take over 6 looms' }).click();
  await expect(page.getByRole('heading', { name: 'Loom 1', exact: true })).toBeVisible();
  await expectAccessible(page, 'a start reading');
  for (const { number } of LOOMS) {
    await expect(page.getByRole('heading', { name: `Loom ${number}`, exact: true })).toBeVisible();
    await loomside.read('Start reading', 1_000);
  }
  await expect(loomside.card(1)).toBeVisible();
  await loomside.tap(1, 'Warp break');
  await loomside.stands(2, 'Weft fork');
  await passTime(mill, 12 * MINUTE, tablet);
  await expectAccessible(page, 'Loomside');
  await loomside.card(3).getByRole('button', { name: 'Other stop' }).click();
  await expect(page.getByRole('dialog')).toBeVisible();
  await expectAccessible(page, 'other stops');
  await page.keyboard.press('Escape');
  await new SyncBadge(page).open();
  await expectAccessible(page, 'what waits');
  await page.keyboard.press('Escape');
  await page.getByRole('button', { name: /^Signed in/ }).click();
  await expect(page.getByRole('heading', { name: 'Signed in' })).toBeVisible();
  await expectAccessible(page, 'who is signed in');
  await page.keyboard.press('Escape');
  await loomside.card(1).getByRole('link', { name: 'Loom 1, its list' }).click();
  await expect(page.getByRole('link', { name: 'Back to my looms' })).toBeVisible();
  await expectAccessible(page, 'a loom’s list');
  await page.getByRole('link', { name: 'Back to my looms' }).click();
  await page.getByRole('link', { name: 'Hand over' }).first().click();
  await expect(page.getByRole('textbox', { name: /^End reading/ })).toBeVisible();
  await expectAccessible(page, 'hand over');
});

test('the weaver’s looms on a phone', async ({ tablet: { page } }) => {
  await page.setViewportSize({ width: 360, height: 740 });
  await page.goto('/loomside');
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await page.getByRole('link', { name: 'Take over the set' }).click();
  await expect(page.getByRole('button', { name: 'Take over 6 looms' })).toBeVisible();
  await expectAccessible(page, 'take over on a phone');
  // Nothing sticks out sideways.
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(360);
});

test('the office’s screens, by day and by night', async ({ mill, desk }) => {
  test.setTimeout(180_000);
  const { page } = desk;
  const foreman = await BookHand.signIn(mill, 'foreman');
  for (const { id } of LOOMS)
    for (const [boundary, value] of [
      ['start', 1_000],
      ['end', 1_700],
    ] as const)
      await foreman.log({
        kind: 'reading',
        loomId: id,
        shiftKey: SHIFT_KEY,
        boundary,
        value,
        at: boundary === 'start' ? SHIFT_START : SHIFT_START + MINUTE,
      });
  await mill.setNow(SHIFT_END + MINUTE);
  // Hours later the first sign-in has run out.
  await (await BookHand.signIn(mill, 'foreman')).log({ kind: 'close', shiftKey: SHIFT_KEY });
  await page.goto('/sign-in');
  await expect(page.getByRole('textbox', { name: 'E-mail' })).toBeVisible();
  await expectAccessible(page, 'office sign-in');
  await new DeskSignIn(page).signIn('manager');
  for (const [path, what] of [
    ['/weeks', 'table'],
    ['/weeks?by=row&metric=warp-breaks', 'table'],
    ['/shift-book', 'a[href*="shift-book/"]'],
    [`/shift-book/${encodeURIComponent(SHIFT_KEY)}`, 'app-sheet-table'],
    ['/floor', 'app-floor-tile'],
    ['/tablet', 'h1'],
    ['/not-permitted', 'h1'],
  ] as const) {
    await page.goto(path);
    await expect(page.locator(what).first()).toBeVisible();
    await expectAccessible(page, path);
  }
  await page.goto('/no-such-page');
  await expectAccessible(page, 'no such page');
});

test('a printer gets the cloth strips in black and white', async ({ mill, desk: { page } }) => {
  const foreman = await BookHand.signIn(mill, 'foreman');
  await foreman.log({
    kind: 'reading',
    loomId: LOOMS[0]?.id ?? '',
    shiftKey: SHIFT_KEY,
    boundary: 'start',
    value: 1_000,
    at: SHIFT_START,
  });
  await mill.setNow(SHIFT_START + 4 * 60 * MINUTE);
  await page.clock.setSystemTime(mill.now());
  await new DeskSignIn(page).signIn('foreman');
  await page.goto(`/shift-book/${encodeURIComponent(SHIFT_KEY)}`);
  await expect(page.locator('app-cloth-strip canvas').first()).toBeVisible();
  /** How much of the first strip is painted, and how much of that has a colour. */
  const look = (event: 'beforeprint' | 'afterprint' | null) =>
    page.evaluate((name) => {
      if (name) window.dispatchEvent(new Event(name));
      const canvas = document.querySelector<HTMLCanvasElement>('app-cloth-strip canvas');
      const pixels = canvas?.getContext('2d')?.getImageData(0, 0, canvas.width, canvas.height).data ?? [];
      let painted = 0;
      let coloured = 0;
      for (let i = 0; i < pixels.length; i += 4) {
        const [red, green, blue, alpha] = pixels.slice(i, i + 4);
        if (alpha) painted++;
        if (alpha && (red !== green || green !== blue)) coloured++;
      }
      return { painted, coloured };
    }, event);
  await expect.poll(async () => (await look(null)).coloured).toBeGreaterThan(1_000);
  // The page goes to paper as it stands when the event has been handled.
  const paper = await look('beforeprint');
  expect(paper.painted).toBeGreaterThan(1_000);
  expect(paper.coloured).toBe(0);
  await look('afterprint');
  await expect.poll(async () => (await look(null)).coloured).toBeGreaterThan(1_000);
});
