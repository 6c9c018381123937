import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, openScreen, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { MINUTE, SHIFT_START } from './fixtures/mill-facts.js';
import { MillServer } from './fixtures/mill-server.js';
import { DeskSignIn } from './pages/desk-sign-in.js';

const BUILT = fileURLToPath(new URL('../../dist/app/browser', import.meta.url));

test('a newer application is offered, and comes when the person says so', async ({ browser }) => {
  const appDir = mkdtempSync(join(tmpdir(), 'shedbeat-app-'));
  cpSync(BUILT, appDir, { recursive: true });
  const mill = await MillServer.start(SHIFT_START + MINUTE, { appDir });
  const { page, context } = await openScreen(browser, mill, { width: 1280, height: 800 });
  try {
    await new DeskSignIn(page).signIn('manager');
    await waitForServiceWorker(page);
    await page.reload();
    await expect(page.getByRole('button', { name: 'Signed in: Maud Ennis' })).toBeVisible();

    const file = join(appDir, 'ngsw.json');
    const manifest = JSON.parse(readFileSync(file, 'utf8')) as { timestamp: number };
    writeFileSync(file, JSON.stringify({ ...manifest, timestamp: manifest.timestamp + 1 }));
    await context.clock.fastForward(31 * MINUTE);
    await mill.setNow(mill.now() + 31 * MINUTE);
    const offer = page.getByRole('button', { name: 'New version' });
    await expect(offer).toBeVisible({ timeout: 20_000 });
    await offer.click();
    const loaded = page.waitForEvent('load');
    await page.getByRole('button', { name: 'Update now' }).click();
    await loaded;
    await expect(page.getByRole('button', { name: 'Signed in: Maud Ennis' })).toBeVisible();
    await expect(offer).toBeHidden();
  } finally {
    await context.close();
    await mill.close();
    rmSync(appDir, { recursive: true, force: true });
  }
});
