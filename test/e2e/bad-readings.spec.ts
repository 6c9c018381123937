import { expect, passTime, test } from './fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, SHIFT_KEY } from './fixtures/mill-facts.js';
import { BookHand } from './fixtures/book-hand.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test('bad readings are answered on the spot and lose nothing', async ({ mill, tablet }) => {
  const { page } = tablet;
  const loomside = new LoomsidePage(page);
  await loomside.open();
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  await passTime(mill, 100 * MINUTE, tablet);
  await page.getByRole('link', { name: 'Hand over' }).first().click();
  const field = page.getByRole('textbox', { name: /^End reading/ });
  const words = page.locator('#pick-pad-words');

  await field.fill('12a4');
  await expect(words).toContainText('is not a reading: a pick clock shows digits alone');
  await field.fill('-5');
  await expect(words).toContainText('A pick clock shows no reading below nought');
  await field.fill('123456');
  await expect(words).toContainText('This clock has 5 digits');

  // 100 min at 200 ppm are 20,000 picks; 1,900 hundreds more would be 190,000.
  await loomside.read('End reading', 2_900);
  await expect(page.getByText(/More than this loom can weave: 20,[0-9]{3} picks are possible/)).toBeVisible();
  await page.getByRole('button', { name: 'Read again' }).click();
  await loomside.read('End reading', 2_900);
  await page.getByRole('button', { name: 'Keep it' }).click();
  await expect(page.getByRole('heading', { name: 'Perns used' })).toBeVisible();
  await new SyncBadge(page).says('In the book');

  // Kept is flagged, not hidden.
  const sheet = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
  const line = sheet.lines.find((one) => one.loomNumber === 1)?.line;
  expect(line?.readings.find((reading) => reading.boundary === 'end')?.kept).toBe(true);
  expect(line?.flags.map((flag) => flag.code)).toContain('more-than-possible');
});
