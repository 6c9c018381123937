import type { Weeks } from '../../shared/contract/reports.js';
import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, passTime, test } from './fixtures/fixtures.js';
import { HOUR, SHIFT_END, SHIFT_KEY, WEEK } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { SetUpPages } from './pages/set-up-pages.js';
import { ShiftSheetPage } from './pages/shift-sheet-page.js';

const DAY = 24 * HOUR;

test('a new speed in mid-week leaves last week’s figures; recalculating states them anew beside the old @set-up', async ({
  mill,
  desk,
}) => {
  test.setTimeout(240_000);
  const { page } = desk;
  const setUp = new SetUpPages(page);
  const sheet = new ShiftSheetPage(page);
  /** Anew each time: a token lasts a quarter of an hour. */
  const foreman = () => BookHand.signIn(mill, 'foreman');
  const lastWeek = async () => (await BookHand.signIn(mill, 'manager')).weeks(WEEK, 'loom');

  await test.step('a shift of last week is closed: 76,800 of 200 × 480 picks, 80.0%', async () => {
    await (
      await foreman()
    ).log({
      kind: 'reading',
      loomId: 'loom-1',
      shiftKey: SHIFT_KEY,
      boundary: 'start',
      value: 10_000,
    });
    await passTime(mill, SHIFT_END - mill.now(), desk);
    await (
      await foreman()
    ).log({
      kind: 'reading',
      loomId: 'loom-1',
      shiftKey: SHIFT_KEY,
      boundary: 'end',
      value: 10_768,
    });
    await (await foreman()).log({ kind: 'close', shiftKey: SHIFT_KEY });
  });

  let weeksBefore: Weeks;
  await test.step('on Wednesday of the next week the loom is made faster', async () => {
    await passTime(mill, 7 * DAY + 20 * HOUR, desk);
    weeksBefore = await lastWeek();
    await new DeskSignIn(page).signIn('manager');
    await setUp.changeSpeed(1, 220);
    await expect(page.getByText(/^220 picks\/min/)).toBeVisible();
    await expect(page.getByText(/^200 picks\/min/)).toBeVisible();
    await sheet.open(SHIFT_KEY);
    await expect(sheet.cell(1, 'efficiency')).toContainText('80.0%');
    expect(await lastWeek()).toEqual(weeksBefore);
  });

  await test.step('dated back it still changes nothing that was signed', async () => {
    await setUp.changeSpeed(1, 210, { date: '2026-03-09', time: '06:00' });
    await sheet.open(SHIFT_KEY);
    await expect(sheet.cell(1, 'efficiency')).toContainText('80.0%');
    expect(await lastWeek()).toEqual(weeksBefore);
  });

  await test.step('recalculated it is 76,800 of 210 × 480 picks, 76.2%, in a new signed version', async () => {
    await setUp.open('figures');
    await page.getByLabel('From the date').fill('2026-03-09');
    await page.getByRole('textbox', { name: 'Reason' }).fill('The book had the old pulley');
    await page.getByRole('button', { name: 'Recalculate …' }).click();
    await page.getByRole('button', { name: 'Yes, recalculate' }).click();
    await expect(page.getByText(/These have other totals now/)).toBeVisible();
    await sheet.open(SHIFT_KEY);
    await expect(sheet.cell(1, 'efficiency')).toContainText('76.2%');
    expect(await lastWeek()).not.toEqual(weeksBefore);
    await setUp.open('changes');
    await expect(page.getByText('“The book had the old pulley”')).toBeVisible();
  });
});

test('what is typed is not lost by a slip of the hand, nor by a reload @set-up', async ({
  desk: { page },
}) => {
  const setUp = new SetUpPages(page);
  await new DeskSignIn(page).signIn('manager');
  await setUp.open('figures');
  await page.getByRole('textbox', { name: 'Name of the mill' }).fill('Another name');
  await page.getByRole('link', { name: /^Sheds and looms/ }).click();
  const question = page.getByRole('dialog', { name: 'Leave without saving?' });
  await question.getByRole('button', { name: 'Stay here' }).click();
  await expect(page.getByRole('textbox', { name: 'Name of the mill' })).toHaveValue('Another name');
  const asked = page.waitForEvent('dialog');
  void page.reload().catch(() => undefined);
  const dialog = await asked;
  expect(dialog.type()).toBe('beforeunload');
  await dialog.dismiss();
  await page.getByRole('link', { name: /^Sheds and looms/ }).click();
  await question.getByRole('button', { name: 'Leave without saving' }).click();
  await expect(page.getByRole('heading', { name: 'Sheds and looms' })).toBeVisible();
});

test('looms are moved by keyboard and by drag, and taken out of use with their history @set-up', async ({
  desk: { page },
}) => {
  const setUp = new SetUpPages(page);
  await new DeskSignIn(page).signIn('manager');
  await setUp.open('looms');
  await page.getByRole('button', { name: 'Move looms' }).click();
  await setUp.loom(1).focus();
  await page.keyboard.press('Enter');
  for (const key of ['ArrowDown', 'ArrowDown', 'Enter']) await page.keyboard.press(key);
  await expect(page.getByText('1 loom is moved.')).toBeVisible();

  const from = await setUp.loom(2).boundingBox();
  const to = await page.getByRole('button', { name: 'Row 1, place 4, free' }).boundingBox();
  if (!from || !to) throw new Error('The plan does not show loom 2 or the free place.');
  await page.mouse.move(from.x + 20, from.y + 20);
  await page.mouse.down();
  await page.mouse.move(from.x + 60, from.y + 40, { steps: 5 });
  await page.mouse.move(to.x + to.width / 2, to.y + to.height / 2, { steps: 8 });
  await page.mouse.up();
  await expect(page.getByText('2 looms are moved.')).toBeVisible();
  await page.getByRole('button', { name: 'Save the places' }).click();
  await expect(page.getByRole('button', { name: 'Move looms' })).toBeVisible();
  await expect(
    page.getByRole('group', { name: /^Row 3/ }).getByRole('button', { name: 'Loom 1', exact: true }),
  ).toBeVisible();

  await setUp.loom(3).click();
  await page.getByRole('button', { name: 'Out of use', exact: true }).click();
  await page.getByRole('button', { name: 'Take out of use' }).click();
  await expect(setUp.loom(3)).toBeHidden({ timeout: 20_000 });
  await page.getByRole('button', { name: 'List' }).click();
  await page.getByRole('checkbox', { name: 'Show 1 out of use' }).check();
  await page.getByRole('button', { name: '3', exact: true }).click();
  await expect(page.getByText(/^200 picks\/min/)).toBeVisible();
});

const ROOMS = [
  '',
  'looms',
  'labels',
  'cloths',
  'cloths/new',
  'beams',
  'beams/new',
  'targets',
  'shifts',
  'shifts/new?shed=shed-1',
  'calendar',
  'causes',
  'parts-and-jobs',
  'people',
  'people/new',
  'tablets',
  'mail',
  'figures',
  'changes',
];
const SIZES = [
  { width: 360, height: 740 },
  { width: 1024, height: 768 },
  { width: 1440, height: 900 },
];

for (const size of SIZES)
  test(`set-up has nothing that axe finds at ${size.width} px, and nothing wider than the screen @set-up`, async ({
    desk: { page },
  }) => {
    test.setTimeout(300_000);
    const setUp = new SetUpPages(page);
    await new DeskSignIn(page).signIn('manager');
    await page.setViewportSize(size);
    for (const room of ROOMS) {
      await setUp.open(room);
      await expectAccessible(page, `/set-up/${room}`);
      expect(await page.evaluate(() => document.documentElement.scrollWidth), room).toBeLessThanOrEqual(
        size.width,
      );
    }
    await setUp.open('looms');
    await setUp.loom(1).click();
    await page.getByRole('button', { name: 'Speed, clock and the rest' }).click();
    await expectAccessible(page, 'a loom’s facts');
    await page.getByRole('button', { name: 'Add looms' }).click();
    await expect(page.getByRole('heading', { name: /as they will stand/ })).toBeVisible();
    await expectAccessible(page, 'adding looms');
  });
