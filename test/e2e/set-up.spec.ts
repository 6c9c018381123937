import { expect, openScreen, passTime, test } from './fixtures/fixtures.js';
import { HOUR, MINUTE, SHIFT_END, SHIFT_START } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SetUpPages } from './pages/set-up-pages.js';
import { ShiftSheetPage } from './pages/shift-sheet-page.js';
import { SyncBadge } from './pages/sync-badge.js';

const MANAGER = {
  mill: 'Low Beck Mill',
  name: 'Ida Marsh',
  email: 'ida@mill.example',
  password: 'a long enough one',
};
const WEAVER = {
  name: 'Nell Hoyle',
  worksNumber: '11',
  pin: '246810',
  role: 'Weaver',
  set: [1, 2, 3],
} as const;
const FOREMAN = { name: 'Bram Tolley', worksNumber: '31', pin: '975310', role: 'Foreman' } as const;
const OTHERS = [
  { name: 'Una Fell', worksNumber: '12', pin: '112233', role: 'Weaver' },
  { name: 'Cass Orme', worksNumber: '21', pin: '332211', role: 'Tackler' },
] as const;
/** 200 ppm × 480 min = 96,000 possible picks; clocks count hundreds on five digits. */
const READ = [
  { loom: 1, start: 10_000, end: 10_768, picks: '76,800', efficiency: '80.0%' },
  { loom: 2, start: 0, end: 720, picks: '72,000', efficiency: '75.0%' },
  { loom: 3, start: 99_900, end: 572, picks: '67,200', efficiency: '70.0%' },
] as const;

test.use({ emptyBook: true, startsAt: SHIFT_START - HOUR });

test('an empty mill is set up on screens alone and closes its first shift @set-up', async ({
  browser,
  mill,
  desk,
}) => {
  test.setTimeout(300_000);
  const setUp = new SetUpPages(desk.page);

  await test.step('the first manager, by the one-time code', async () => {
    await setUp.firstRun(mill.firstRunCode ?? '', MANAGER);
  });

  await test.step('a shed, and twelve looms on its plan', async () => {
    await setUp.goOn('Add a shed');
    await setUp.addShed('Long shed');
    await setUp.goOn('Add looms');
    await setUp.addLooms({ rows: 2, perRow: 6, ppm: 200, reedSpaceCm: '190,5', digits: 5 });
    await expect(desk.page.getByText('Alley A').first()).toBeVisible();
  });

  await test.step('three shift patterns', async () => {
    await setUp.goOn('Add a shift pattern');
    await setUp.addPattern('Early', '06:00', '14:00');
    await setUp.addPattern('Late', '14:00', '22:00');
    await setUp.addPattern('Night', '22:00', '06:00');
  });

  await test.step('two cloths, and what is on the looms', async () => {
    await setUp.goOn('Add a cloth');
    await setUp.addCloth('Larch twill');
    await setUp.addCloth('Glebe 42');
    await setUp.goOn('Say what is on the looms');
    await setUp.putOnRow(1, 'Larch twill');
    await setUp.putOnRow(2, 'Glebe 42');
    await new SyncBadge(desk.page).says('In the book');
  });

  await test.step('four people', async () => {
    for (const person of [WEAVER, FOREMAN, ...OTHERS]) await setUp.addPerson(person);
  });

  const tablet = await openScreen(browser, mill, { width: 1024, height: 768 });
  await test.step('a tablet', async () => {
    await setUp.goOn('Register a tablet');
    const code = await setUp.makeTabletCode('Alley A, north end');
    await tablet.page.goto('/tablet/code');
    await tablet.page.getByRole('textbox', { name: 'Code' }).fill(code);
    await tablet.page.getByRole('button', { name: 'Make it a tablet' }).click();
    await expect(tablet.page.getByRole('status', { name: 'Works number' })).toBeVisible({ timeout: 20_000 });

    await setUp.open();
    await expect(desk.page.getByRole('region', { name: 'The next step' })).toContainText('The first shift');
  });

  const loomside = new LoomsidePage(tablet.page);
  const badge = new SyncBadge(tablet.page);
  const door = new FloorSignIn(tablet.page);
  await test.step('the first shift is logged on it', async () => {
    await passTime(mill, HOUR + MINUTE, desk, tablet);
    await loomside.open();
    await door.signIn(WEAVER.worksNumber, WEAVER.pin);
    await loomside.takeOver(READ.map(({ loom, start }) => [loom, start] as const));
    await loomside.tap(1, 'Warp break');
    await loomside.tap(2, 'Weft break');
    await passTime(mill, SHIFT_END - 2 * MINUTE - mill.now(), desk, tablet);
    // Left alone all day it has locked, as the mill's setting says.
    const lock = tablet.page.getByRole('dialog', { name: 'This tablet is locked' });
    await expect(lock).toBeVisible();
    await door.pin(WEAVER.pin);
    await expect(lock).toBeHidden();
    await loomside.handOver(READ.map(({ loom, end }) => [loom, end, 90] as const));
    await badge.says('In the book');
  });

  await test.step('and closed at a desk', async () => {
    await passTime(mill, 12 * MINUTE, desk, tablet);
    const office = await openScreen(browser, mill, { width: 1440, height: 900 });
    await office.page.goto('/sign-in?next=/shift-book');
    await new DeskSignIn(office.page).fill(MANAGER.email, MANAGER.password);
    const { page } = office;
    await page.getByRole('link', { name: /Early/ }).first().click();
    await expect(page.locator('app-sheet-table')).toBeVisible({ timeout: 20_000 });
    const sheet = new ShiftSheetPage(page);
    for (const { loom, picks, efficiency } of READ) {
      await expect(sheet.cell(loom, 'picks')).toContainText(picks);
      await expect(sheet.cell(loom, 'efficiency')).toContainText(efficiency);
    }
    await page.getByRole('link', { name: 'Close the shift' }).click();
    await page.getByRole('checkbox', { name: /I close it with what is left/ }).check();
    await page.getByRole('button', { name: 'Close the shift' }).click();
    await expect(page.getByRole('heading', { name: 'The shift is closed' })).toBeVisible({ timeout: 20_000 });
    await office.context.close();
  });

  await test.step('everything stands in the change record with its author', async () => {
    await setUp.open('changes');
    for (const name of ['Loom 12: added', 'Cloth Larch twill: added', 'Shift pattern Night: added'])
      await expect(desk.page.getByRole('heading', { name })).toBeVisible();
    await desk.page.getByRole('searchbox', { name: 'Search' }).fill('Glebe');
    await expect(desk.page.getByRole('heading', { name: 'Loom 12: added' })).toBeHidden();
    await expect(desk.page.getByRole('heading', { name: 'Cloth Glebe 42: added' })).toBeVisible();
  });
  await tablet.context.close();
});
