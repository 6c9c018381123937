import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, goOnline, passTime, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { HOUR, LOOMS, MINUTE, PEOPLE, PIN, TABLET } from './fixtures/mill-facts.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

test('@sync twelve hours without network after a renewal whose answer was lost: one PIN, every tap, its author', async ({
  mill,
  tablet,
}) => {
  const { weaver, otherWeaver } = PEOPLE;
  const first = new LoomsidePage(tablet.page);
  await first.open();
  // Two who know this tablet; the second stays.
  await new FloorSignIn(tablet.page).signIn(otherWeaver.worksNumber, PIN);
  await tablet.page.getByRole('button', { name: `Signed in: ${otherWeaver.name}` }).click();
  await tablet.page.getByRole('button', { name: 'Change person' }).click();
  await new FloorSignIn(tablet.page).signIn(weaver.worksNumber, PIN);
  await first.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  await new SyncBadge(tablet.page).says('In the book');
  await waitForServiceWorker(tablet.page);

  // The server renews, and the tablet never hears of it.
  mill.proxy.loseAnswers();
  await tablet.page.reload();
  await new FloorSignIn(tablet.page).unlock(weaver.worksNumber, PIN);
  await goOffline(mill, tablet);
  await first.tap(1, 'Warp break');
  await first.tap(2, 'Weft break');
  await new SyncBadge(tablet.page).says('2 waiting');

  await tablet.page.close();
  await passTime(mill, 12 * HOUR, tablet);
  const page = await tablet.context.newPage();
  await page.goto('/loomside');
  await goOnline(mill, tablet);
  const door = new FloorSignIn(page);
  await door.unlock(otherWeaver.worksNumber, PIN);
  await passTime(mill, MINUTE, tablet);
  await new SyncBadge(page).says('In the book');
  await page.reload();
  await expect(page.getByRole('button', { name: `Signed in: ${otherWeaver.name}` })).toBeVisible();

  const stops = (await (await BookHand.signIn(mill, 'foreman')).entries()).filter(
    ({ kind }) => kind === 'stop',
  );
  expect(stops.map(({ loomId, cause, by, deviceId }) => [loomId, cause, by, deviceId])).toEqual([
    ['loom-1', 'warp-break', weaver.id, TABLET.id],
    ['loom-2', 'weft-break', weaver.id, TABLET.id],
  ]);
});
