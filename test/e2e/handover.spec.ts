import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, test } from './fixtures/fixtures.js';
import { DATE, MINUTE, PEOPLE, SHED, SHIFT_END, SHIFT_KEY } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { SyncBadge } from './pages/sync-badge.js';

const LATE = `${SHED.id}:${DATE}:late`;

test.use({ startsAt: SHIFT_END + 5 * MINUTE });

test('one foreman hands over, the next reads it on the running shift’s sheet and confirms @shift-book', async ({
  mill,
  desk,
}) => {
  const { page } = desk;
  const badge = new SyncBadge(page);
  const hand = await BookHand.signIn(mill, 'foreman');
  await hand.log({ kind: 'standing', loomId: 'loom-3', cause: 'picking', at: SHIFT_END - 30 * MINUTE });
  await hand.log({
    kind: 'note',
    schema: 2,
    about: 'handover',
    shiftKey: SHIFT_KEY,
    text: 'Loom 3 waits for a picking band. The beam for 5 stands at the door.',
    at: SHIFT_END - 2 * MINUTE,
  });
  // Maud, who is manager, stands in for the late shift's foreman.
  await new DeskSignIn(page).signIn('manager');

  await test.step('the running shift’s sheet says that nobody has read it', async () => {
    await page.goto(`/shift-book/${encodeURIComponent(LATE)}`);
    const banner = page.getByText('handed over words that nobody has read yet');
    await expect(banner).toBeVisible({ timeout: 20_000 });
    await banner.getByRole('link').click();
    await expect(page.getByText('The beam for 5 stands at the door.')).toBeVisible();
    await expect(page.getByText(/stands since 13:30, picking/)).toBeVisible();
    await expectAccessible(page, 'Handover');
  });

  await test.step('what is asked for is filled in', async () => {
    await page.getByRole('button', { name: 'There was none' }).click();
    await badge.says('In the book');
    await page.getByLabel('Relative humidity, per cent').fill('640');
    await expect(page.getByText('Relative humidity is a number from 1 to 100.')).toBeVisible();
    await page.getByLabel('Relative humidity, per cent').fill('64.5');
    await page.getByRole('button', { name: 'Note', exact: true }).click();
    await expect(page.getByText('64.5%')).toBeVisible();
    await expect(page.getByText('asked for')).toHaveCount(0);
    await badge.says('In the book');
  });

  await test.step('half-written words survive a reload', async () => {
    await page.getByLabel(/In other words/).fill('Not yet');
    await page.reload();
    await expect(page.getByLabel(/In other words/)).toHaveValue('Not yet');
    await page.getByLabel(/In other words/).fill('');
  });

  await test.step('it is confirmed, also after the shift was closed', async () => {
    await hand.log({ kind: 'close', shiftKey: SHIFT_KEY });
    await page.getByRole('button', { name: 'I have read it' }).click();
    await expect(page.getByText(`Read by ${PEOPLE.manager.name}`)).toBeVisible();
    await badge.says('In the book');
    await page.goto(`/shift-book/${encodeURIComponent(LATE)}`);
    await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
    await expect(page.getByText('handed over words')).toHaveCount(0);
    expect((await hand.sheet(SHIFT_KEY)).held).toBe(0);
  });
});
