import { createHash } from 'node:crypto';
import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { BookHand } from './fixtures/book-hand.js';
import { expect, makeTablet, openScreen, passTime, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, SHIFT_KEY, SHIFT_START } from './fixtures/mill-facts.js';
import { MillServer } from './fixtures/mill-server.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { SyncBadge } from './pages/sync-badge.js';

const BUILT = fileURLToPath(new URL('../../dist/app/browser', import.meta.url));
const SIGN = '<meta name="test-build" content="newer">';

test('@sync the application changes in mid-shift while taps wait: not in mid-tap, and each tap is there once', async ({
  browser,
}) => {
  const appDir = mkdtempSync(join(tmpdir(), 'shedbeat-app-'));
  cpSync(BUILT, appDir, { recursive: true });
  const mill = await MillServer.start(SHIFT_START + MINUTE, { appDir });
  const tablet = await openScreen(browser, mill, { width: 1024, height: 768 });
  const { page, context } = tablet;
  try {
    await makeTablet(context);
    const loomside = new LoomsidePage(page);
    const badge = new SyncBadge(page);
    const door = new FloorSignIn(page);
    await loomside.open();
    await door.signIn(PEOPLE.weaver.worksNumber, PIN);
    await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
    await badge.says('In the book');
    await waitForServiceWorker(page);
    await page.reload();
    await door.unlockIfAsked(PEOPLE.weaver.worksNumber, PIN);

    await context.route('**/api/sync/entries*', (route) => route.abort());
    await loomside.tap(1, 'Warp break');
    await badge.says('1 waiting');
    anotherBuild(appDir);
    await passTime(mill, 31 * MINUTE, tablet);
    const offer = page.getByRole('button', { name: 'New version' });
    // A finger now and then, before the newer one is fetched and after.
    let taps = 1;
    await expect(async () => {
      await loomside.tap(1, 'Warp break');
      taps++;
      await expect(offer).toBeHidden();
      expect(await page.evaluate(isFetched, 'test-build')).toBe(true);
    }).toPass({ intervals: [1_000], timeout: 30_000 });
    for (let n = 0; n < 2; n++) {
      await passTime(mill, 3_000, tablet);
      await loomside.tap(2, 'Weft break');
      await expect(offer).toBeHidden();
    }
    await passTime(mill, 6_000, tablet);
    await expect(offer).toBeVisible();

    await badge.says(`${taps + 2} waiting`);
    await offer.click();
    const loaded = page.waitForEvent('load');
    await page.getByRole('button', { name: 'Update now' }).click();
    await loaded;
    await expect(page.locator('meta[name=test-build]')).toBeAttached();
    await door.unlockIfAsked(PEOPLE.weaver.worksNumber, PIN);
    await badge.says(`${taps + 2} waiting`);
    for (const [loom, label] of [
      [1, `Warp break, ${taps} this shift`],
      [2, 'Weft break, 2 this shift'],
    ] as const)
      await expect(loomside.card(loom).getByRole('button', { name: label })).toBeVisible();

    await context.unroute('**/api/sync/entries*');
    await passTime(mill, 5 * MINUTE, tablet);
    await badge.says('In the book');
    const { lines } = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
    const counts = [1, 2].map((number) => {
      const figures = lines.find((one) => one.loomNumber === number)?.figures;
      return [figures?.warp.count, figures?.weft.count];
    });
    expect(counts).toEqual([
      [taps, 0],
      [0, 2],
    ]);
  } finally {
    await context.close();
    await mill.close();
    rmSync(appDir, { recursive: true, force: true });
  }
});

/** As a build after a change would leave it: index.html differs, and the worker's table says so. */
function anotherBuild(appDir: string): void {
  const index = join(appDir, 'index.html');
  const page = readFileSync(index, 'utf8').replace('</head>', `${SIGN}</head>`);
  writeFileSync(index, page);
  const file = join(appDir, 'ngsw.json');
  const manifest = JSON.parse(readFileSync(file, 'utf8')) as {
    timestamp: number;
    hashTable: Record<string, string>;
  };
  const hash = createHash('sha1').update(page).digest('hex');
  const hashTable = { ...manifest.hashTable, '/index.html': hash };
  writeFileSync(file, JSON.stringify({ ...manifest, timestamp: manifest.timestamp + 1, hashTable }));
}

/** Runs in the page: whether the worker has the newer index.html. */
async function isFetched(sign: string): Promise<boolean> {
  for (const name of await caches.keys()) {
    const cached = await (await caches.open(name)).match('/index.html');
    if (cached && (await cached.text()).includes(sign)) return true;
  }
  return false;
}
