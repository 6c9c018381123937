import type { Browser, Page } from '@playwright/test';
import sharp from 'sharp';
import { v7 as uuid } from 'uuid';
import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
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
import { LOOMS, MINUTE, PEOPLE, PIN } from './fixtures/mill-facts.js';
import type { MillServer } from './fixtures/mill-server.js';
import { expectTouchable, FILLED } from './fixtures/touch-targets.js';
import { CallsPage } from './pages/calls-page.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { SyncBadge } from './pages/sync-badge.js';

const VIEWPORTS = [
  { width: 360, height: 740 },
  { width: 1024, height: 768 },
] as const;
const LOOM = LOOMS[1]!;

/** What the device was asked to do beside the screen. */
interface Told {
  vibrated: number[][];
  badges: number[];
  tones: number;
}

async function openTablet(browser: Browser, mill: MillServer, viewport: { width: number; height: number }) {
  const screen = await openScreen(browser, mill, viewport);
  await makeTablet(screen.context);
  await screen.page.addInitScript(() => {
    const told: Told = { vibrated: [], badges: [], tones: 0 };
    Object.assign(globalThis, { told });
    Object.assign(navigator, {
      vibrate: (pattern: number | number[]) => told.vibrated.push([pattern].flat()) > 0,
      setAppBadge: (count: number) => Promise.resolve(void told.badges.push(count)),
      clearAppBadge: () => Promise.resolve(void told.badges.push(0)),
    });
    const start = OscillatorNode.prototype.start;
    OscillatorNode.prototype.start = function (this: OscillatorNode, when?: number) {
      told.tones += 1;
      start.call(this, when);
    };
  });
  await screen.page.goto('/');
  await new FloorSignIn(screen.page).signIn(PEOPLE.tackler.worksNumber, PIN);
  await expect(screen.page).toHaveURL(/\/calls$/);
  return screen;
}

const toldOf = (page: Page): Promise<Told> =>
  page.evaluate(() => (globalThis as unknown as { told: Told }).told);

/** The foreman's desk says that the loom stands, and calls. */
async function call(hand: BookHand, loomId: string, words: string): Promise<{ stop: string; call: string }> {
  const [stop, callId] = [uuid(), uuid()];
  await hand.log({ kind: 'standing', id: stop, loomId, cause: 'picking' });
  await hand.log({ kind: 'call', id: callId, loomId, targetId: stop, words });
  return { stop, call: callId };
}

/** As a camera writes it, with where it was taken. */
function fromCamera(): Promise<Buffer> {
  return sharp({ create: { width: 2_400, height: 1_800, channels: 3, background: '#7a5a3a' } })
    .jpeg()
    .withExif({ IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '53/1 45/1 0/1' } })
    .toBuffer();
}

for (const viewport of VIEWPORTS)
  test(`a call rings, is taken, attended, written down with a photo: ${viewport.width} px @calls`, async ({
    browser,
    mill,
  }) => {
    test.setTimeout(180_000);
    await mill.change(`INSERT INTO "part" ("id", "name", "retired") VALUES ('band', 'Picking band', 0)`);
    const { page, context } = await openTablet(browser, mill, viewport);
    const calls = new CallsPage(page);
    const hand = await BookHand.signIn(mill, 'foreman');
    await calls.nobodyWaits();
    await expectTouchable(page, 'calls, nobody waits', FILLED);

    await test.step('it comes while the list is open: over the whole screen, felt, heard, on the icon', async () => {
      await call(hand, LOOM.id, 'Bangs off');
      await expect(calls.flash).toContainText('Loom 2', { timeout: 20_000 });
      await expect(calls.flash).toContainText('Bangs off');
      await expect(calls.flash).toContainText('Stop and isolate the loom');
      await expectTouchable(page, 'a call flashes', FILLED);
      await expectAccessible(page, 'a call flashes');
      const { vibrated, badges, tones } = await toldOf(page);
      expect(vibrated.at(-1)?.length).toBeGreaterThan(3);
      expect(badges.at(-1)).toBe(1);
      expect(tones).toBeGreaterThan(0);
    });
    await test.step('again and again until somebody takes it', async () => {
      const before = (await toldOf(page)).vibrated.length;
      await calls.flash.getByRole('button', { name: 'See the list' }).click();
      await expect(calls.part('Waiting').getByRole('article')).toHaveCount(1);
      await context.clock.fastForward(21_000);
      await expect.poll(async () => (await toldOf(page)).vibrated.length).toBeGreaterThan(before);
      await expect(calls.flash).toBeHidden();
    });
    await test.step('taken by one’s own hand, with the keyboard', async () => {
      await expectTouchable(page, 'calls, one waits', FILLED);
      await expectAccessible(page, 'calls, one waits');
      await expect(calls.card(2)).toContainText('Alley A');
      await expect(calls.card(2)).toContainText('Stands for picking since 06:0');
      await calls.card(2).getByRole('button', { name: 'Take it' }).focus();
      await page.keyboard.press('Enter');
      await expect(calls.part('Yours').getByRole('article')).toHaveCount(1);
      expect((await toldOf(page)).badges.at(-1)).toBe(0);
    });
    await test.step('undone within ten seconds it waits again', async () => {
      await page.getByRole('status').getByRole('button', { name: 'Undo' }).click();
      await expect(calls.part('Waiting').getByRole('article')).toHaveCount(1);
      await calls.flash
        .getByRole('button', { name: 'Take it' })
        .or(calls.card(2).getByRole('button', { name: 'Take it' }))
        .first()
        .click();
      await calls.say(2, 'I am there');
      await expect(calls.card(2).getByRole('button', { name: 'Done', exact: true })).toBeVisible();
      await expectTouchable(page, 'calls, one is mine', FILLED);
    });
    await test.step('done, and written down', async () => {
      await calls.say(2, 'Done');
      await expect(page.getByRole('heading', { name: 'Loom 2: repair' })).toBeVisible();
      await expect(page.getByLabel('Kind of fault')).toHaveValue('picking');
      await page.getByRole('button', { name: 'Save the repair' }).click();
      await expect(page.getByRole('alert')).toContainText('Say in a few words');
      await calls.write({
        ...{ fault: 'Picking', found: 'Picking weak', done: 'Band taken up', part: 'Picking band' },
        ran: 'It runs well',
      });
      await calls.photograph(await fromCamera());
      await expectTouchable(page, 'repair', FILLED);
      await expectAccessible(page, 'repair');
      await calls.save();
      await expect(page.getByRole('status').filter({ hasText: 'repair saved, with 1 photo' })).toBeVisible();
      await calls.nobodyWaits();
    });
    await test.step('it stands in the loom’s history, with the photo', async () => {
      await new SyncBadge(page).says('In the book');
      await page.goto(`/calls/loom/${LOOM.id}`);
      const repair = page.getByRole('article').filter({ hasText: 'Picking weak' });
      await expect(repair).toContainText('Picking band', { timeout: 20_000 });
      await expect(repair).toContainText('ran well');
      await expect(repair).not.toContainText(PEOPLE.tackler.name);
      const picture = repair.getByRole('img');
      await expect(picture).toBeVisible({ timeout: 20_000 });
      expect(await picture.evaluate((img: HTMLImageElement) => img.naturalWidth)).toBe(1_600);
      await expect(page.getByText('Stands:')).toBeHidden();
      await expectTouchable(page, 'loom', FILLED);
      await expectAccessible(page, 'loom');
    });
    await context.close();
  });

test('taken by another it leaves the list, without a name on a floor tablet; left undone it waits again @calls', async ({
  browser,
  mill,
}) => {
  const { page, context } = await openTablet(browser, mill, VIEWPORTS[1]);
  const calls = new CallsPage(page);
  const hand = await BookHand.signIn(mill, 'foreman');
  await calls.nobodyWaits();
  const called = await call(hand, LOOM.id, 'Shuttle trapped');
  await calls.flash.getByRole('button', { name: 'See the list' }).click();
  const step = (name: string) =>
    hand.log({ kind: 'attend', loomId: LOOM.id, targetId: called.call, step: name });
  await step('take');
  await expect(calls.part('Taken by others').getByRole('article')).toContainText(/Taken \d\d:\d\d/, {
    timeout: 20_000,
  });
  await expect(calls.card(2)).not.toContainText(PEOPLE.foreman.name.split(' ')[0]!);
  await expect(calls.card(2).getByRole('button')).toHaveCount(0);
  await calls.nobodyWaits();
  await step('leave');
  await expect(calls.part('Waiting').getByRole('article')).toHaveCount(1, { timeout: 20_000 });
  await hand.log({ kind: 'resume', loomId: LOOM.id, targetId: called.stop });
  await calls.nobodyWaits();
  await context.close();
});

for (const viewport of VIEWPORTS)
  test(`without network: taken, written down, photographed, over a reload, then sent: ${viewport.width} px @calls`, async ({
    browser,
    mill,
  }) => {
    test.setTimeout(240_000);
    const screen: Screen = await openTablet(browser, mill, viewport);
    const { page, context } = screen;
    const calls = new CallsPage(page);
    const badge = new SyncBadge(page);
    const hand = await BookHand.signIn(mill, 'foreman');
    await calls.nobodyWaits();
    await call(hand, LOOM.id, 'Fork does not feel the weft');
    await calls.flash.getByRole('button', { name: 'See the list' }).click();
    await page.goto(`/calls/loom/${LOOM.id}`);
    await expect(page.getByText('The book knows of no repair')).toBeVisible({ timeout: 20_000 });
    await waitForServiceWorker(page);
    await page.goto('/calls/ahead');
    await expect(page.getByRole('heading', { name: 'Jobs that are due' })).toBeVisible({ timeout: 20_000 });
    await page.goto('/calls');
    await expect(calls.card(2)).toBeVisible({ timeout: 20_000 });

    await test.step('what was logged stands here, and says that it is not sent', async () => {
      await goOffline(mill, screen);
      await calls.say(2, 'Take it');
      await expect(calls.card(2)).toContainText('Not sent: the others still see it waiting');
      await calls.say(2, 'I am there');
      await expect(calls.card(2).getByRole('button', { name: 'Done', exact: true })).toBeVisible();
    });
    await test.step('what is half written outlives a reload, its photo too', async () => {
      await calls.say(2, 'Done');
      await calls.write({
        fault: 'Weft fork',
        found: 'Fork bent',
        done: 'Fork set',
        ran: 'It runs, watch it',
      });
      await calls.photograph(await fromCamera());
      await context.clock.runFor(400);
      await page.reload();
      await new FloorSignIn(page).unlock(PEOPLE.tackler.worksNumber, PIN);
      await expect(page.getByLabel('What was wrong')).toHaveValue('Fork bent');
      await expect(page.locator('app-photo-taker img')).toHaveCount(1);
      await calls.save();
      await badge.says(/and 1 photo waiting/);
      await badge.open();
      await expect(badge.panel).toContainText('1 photo saved on this device, not sent yet');
      await page.keyboard.press('Escape');
    });
    await test.step('what comes up is shown as it was last seen', async () => {
      await page.getByRole('link', { name: 'Coming up' }).click();
      await expect(page.getByText(/As last seen here .*The book cannot be reached/)).toBeVisible({
        timeout: 20_000,
      });
      await expect(page.getByRole('heading', { name: 'Jobs that are due' })).toBeVisible();
      await page.goBack();
    });
    await test.step('the network comes back: repair and photo are in the book, once', async () => {
      await goOnline(mill, screen);
      await passTime(mill, 2 * MINUTE, screen);
      await badge.says('In the book');
      // Unlocked without network he may log; to read what the server holds his PIN is checked.
      await page.goto('/sign-in');
      await calls.backIn(PEOPLE.tackler.worksNumber, PIN);
      await expect(page).toHaveURL(/\/calls$/);
      await page.goto(`/calls/loom/${LOOM.id}`);
      const repair = page.getByRole('article').filter({ hasText: 'Fork bent' });
      await expect(repair.getByRole('img')).toBeVisible({ timeout: 30_000 });
      await expect(repair).toContainText('ran, to be watched');
    });
    await context.close();
  });
