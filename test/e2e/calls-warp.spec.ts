import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, makeTablet, openScreen, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { CLOTH, LOOMS, MINUTE, PEOPLE, PIN, SHIFT_KEY, SHIFT_START } from './fixtures/mill-facts.js';
import { expectTouchable, FILLED } from './fixtures/touch-targets.js';
import { CallsPage } from './pages/calls-page.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { SyncBadge } from './pages/sync-badge.js';

const LOOM = LOOMS[3]!;

/** Half an hour in: the loom can have woven what is read. */
test.use({ startsAt: SHIFT_START + 30 * MINUTE });

for (const viewport of [
  { width: 360, height: 740 },
  { width: 1024, height: 768 },
])
  test(`a warp is gaited with its reading and tickets, a job is done: ${viewport.width} px @calls`, async ({
    browser,
    mill,
  }) => {
    test.setTimeout(150_000);
    await mill.change(
      `INSERT INTO "warp" ("id", "name", "clothId", "lengthM", "thrumM") VALUES ('beam-7', 'Beam 7', '${CLOTH.id}', 480, 3)`,
    );
    await mill.change(
      `INSERT INTO "job" ("id", "name", "everyPicks", "retired") VALUES ('oil', 'Oil', 1, 0)`,
    );
    const { page, context } = await openScreen(browser, mill, viewport);
    await makeTablet(context);
    const hand = await BookHand.signIn(mill, 'foreman');
    const reading = { kind: 'reading', loomId: LOOM.id, shiftKey: SHIFT_KEY };
    await hand.log({ ...reading, boundary: 'start', value: 1_000, at: SHIFT_START });
    await page.goto('/');
    await new FloorSignIn(page).signIn(PEOPLE.tackler.worksNumber, PIN);
    await new CallsPage(page).nobodyWaits();
    await page.goto(`/calls/loom/${LOOM.id}/warp`);
    await expect(page.getByRole('heading', { name: 'Loom 4: change of warp' })).toBeVisible();

    await test.step('what is wanting is said, one thing after the other', async () => {
      const save = page.getByRole('button', { name: 'Save the change of warp' });
      await save.click();
      await expect(page.getByRole('alert')).toContainText('gaited or knotted');
      await page.getByRole('radio', { name: 'Gaited' }).check();
      await page.getByLabel('Beam').selectOption('beam-7');
      await expect(page.getByLabel('Length of the warp')).toHaveValue('480');
      await expect(page.getByLabel('Cloth')).toHaveValue(CLOTH.id);
      await page.getByLabel('Thrum left of it').fill('much');
      await expect(page.getByRole('alert')).toContainText('“much” is no length of a thrum');
      await page.getByLabel('Thrum left of it').fill('1,5');
      await expect(page.getByRole('alert')).toContainText('Read the pick clock');
    });
    await test.step('the reading between the two warps', async () => {
      await expectTouchable(page, 'change of warp', FILLED);
      await expectAccessible(page, 'change of warp');
      await page.getByRole('button', { name: 'Read the clock' }).click();
      const field = page.getByRole('textbox', { name: /^Reading/ });
      await field.fill('1002');
      await field.press('Enter');
      await expect(page.getByRole('button', { name: '1,002, read again' })).toBeVisible();
    });
    await test.step('saved: the loom has the new warp, with its tickets', async () => {
      await page.getByLabel('Size set').fill('S 118');
      await page.getByLabel('Weft lot').fill('L 7');
      await page.getByRole('button', { name: 'Save the change of warp' }).click();
      await expect(page).toHaveURL(new RegExp(`/calls/loom/${LOOM.id}$`));
      await new SyncBadge(page).says('In the book');
      await page.reload();
      await new CallsPage(page).backIn(PEOPLE.tackler.worksNumber, PIN);
      const warp = page.getByRole('region', { name: 'In the loom' });
      await expect(warp).toContainText('Beam 7', { timeout: 20_000 });
      await expect(warp).toContainText('size set S 118 · weft lot L 7');
      const line = (await hand.sheet(SHIFT_KEY)).lines.find((one) => one.line.loomId === LOOM.id)?.line;
      expect(line?.stretches.map(({ warpId }) => warpId)).toEqual([null, 'beam-7']);
    });
    await test.step('a job by picks is due with the loom, and done', async () => {
      await hand.log({ ...reading, boundary: 'end', value: 1_003 });
      await page.goto('/calls/ahead');
      const job = page.getByRole('listitem').filter({ hasText: 'Oil' });
      await expect(job).toContainText('300 picks, due every 1', { timeout: 20_000 });
      await expectTouchable(page, 'coming up', FILLED);
      await expectAccessible(page, 'coming up');
      await expect(page.getByRole('listitem').filter({ hasText: 'Beam 7' })).toBeVisible();
      await job.getByRole('button', { name: 'Loom 4, Oil, done' }).click();
      await expect(job).toBeHidden();
      await new SyncBadge(page).says('In the book');
    });
    await context.close();
  });

test('a browser asks to be told when the page is closed; muted it stays muted @calls', async ({
  browser,
  mill,
}) => {
  const { page, context } = await openScreen(browser, mill, { width: 1024, height: 768 });
  await makeTablet(context);
  await context.grantPermissions(['notifications'], { origin: mill.url });
  // The browser's push service lies in the wide world: its end of the subscription is made here.
  await page.addInitScript(() => {
    const subscription = {
      endpoint: 'https://push.example.com/send/1',
      toJSON: () => ({
        endpoint: 'https://push.example.com/send/1',
        keys: { p256dh: 'B'.repeat(87), auth: 'A'.repeat(22) },
      }),
      unsubscribe: () => Promise.resolve(true),
    };
    PushManager.prototype.subscribe = () => Promise.resolve(subscription as unknown as PushSubscription);
  });
  await page.goto('/');
  await new FloorSignIn(page).signIn(PEOPLE.tackler.worksNumber, PIN);
  await new CallsPage(page).nobodyWaits();
  await waitForServiceWorker(page);
  const asked = page.waitForResponse((response) => response.url().endsWith('/api/push/subscriptions'));
  await page.getByRole('button', { name: 'Tell me when the page is closed' }).click();
  expect((await asked).status()).toBe(200);
  await expect(page.getByText('This device is told of calls when the page is closed, too.')).toBeVisible();
  await page.getByRole('button', { name: 'Tell me no more when it is closed' }).click();
  await expect(page.getByText('Calls show here while this page is open.')).toBeVisible();

  await page.getByRole('button', { name: 'Sound is on: mute it' }).click();
  await page.reload();
  await new CallsPage(page).backIn(PEOPLE.tackler.worksNumber, PIN);
  await expect(page.getByRole('button', { name: 'Sound is off: let it ring' })).toBeVisible({
    timeout: 20_000,
  });
  await context.close();
});
