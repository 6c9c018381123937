import { expect, goOffline, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { LOOMS, PEOPLE, PIN } from './fixtures/mill-facts.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test('a closed tablet starts again without network: the application, the book, the PIN', async ({
  mill,
  tablet,
}) => {
  const first = new LoomsidePage(tablet.page);
  await first.open();
  await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await first.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  await new SyncBadge(tablet.page).says('In the book');
  await waitForServiceWorker(tablet.page);

  await goOffline(mill, tablet);
  await tablet.page.close();
  const page = await tablet.context.newPage();
  await page.goto('/loomside');

  const door = new FloorSignIn(page);
  const known = page.getByRole('group', { name: 'Who has signed in here before' });
  await known.getByRole('button', { name: new RegExp(PEOPLE.weaver.worksNumber) }).click();
  await door.pin('999999');
  await expect(page.locator('app-error-state')).toBeVisible();
  await expect(page.getByRole('status', { name: '0 of 6 digits' })).toBeVisible();
  await door.pin(PIN);

  const again = new LoomsidePage(page);
  await again.tap(4, 'Weft break');
  await new SyncBadge(page).says('1 waiting');
});

test('somebody who never signed in on this tablet cannot unlock it without network', async ({
  mill,
  tablet,
}) => {
  const { page } = tablet;
  await page.goto('/loomside');
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await waitForServiceWorker(page);
  await goOffline(mill, tablet);
  await page.reload();
  const door = new FloorSignIn(page);
  await door.number(PEOPLE.otherWeaver.worksNumber);
  await door.pin(PIN);
  await expect(page.locator('app-error-state')).toBeVisible();
  await expect(page.locator('app-floor-sign-in-panel')).toBeVisible();
});
