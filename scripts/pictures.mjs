/**
 * npm run pictures: the README's pictures, taken from a demo mill made for them, or from one that runs already
 * (DEMO_AT=http://localhost:4280).
 */
import { spawn } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { setTimeout } from 'node:timers';
import { chromium } from '@playwright/test';
import { ensureChromium } from './lib/chromium.mjs';
import { ensureBuilt } from './lib/ready.mjs';
import { ROOT, run } from './lib/run.mjs';
import { CannotGoOn, main } from './lib/say.mjs';

const PICTURES = path.join(ROOT, 'assets/pictures');
const DATA = path.join(ROOT, 'data-pictures');
const PORT = process.env.PORT ?? '4289';
const AT = process.env.DEMO_AT ?? `http://localhost:${PORT}`;

await main(async () => {
  const executablePath = await ensureChromium();
  await ensureBuilt();
  mkdirSync(PICTURES, { recursive: true });
  const server = process.env.DEMO_AT ? null : await demoServer();
  const browser = await chromium.launch({
    executablePath,
    args: process.getuid?.() === 0 ? ['--no-sandbox'] : [],
  });
  try {
    await answers();
    await takePictures(browser);
  } finally {
    await browser.close();
    if (server) {
      server.kill('SIGTERM');
      await new Promise((resolve) => server.once('exit', resolve));
      rmSync(DATA, { recursive: true, force: true });
    }
  }
});

async function demoServer() {
  const env = { DATA_DIR: DATA, PORT, LOG_LEVEL: 'warn' };
  const seeded = await run(process.execPath, ['dist/server/api/demo/seed.js', '--fresh'], { env });
  if (seeded.code !== 0) throw new CannotGoOn('The demo mill could not be made; the reason stands above.');
  return spawn(process.execPath, ['dist/server/api/main.js'], {
    cwd: ROOT,
    env: { ...process.env, ...env },
    stdio: 'inherit',
  });
}

async function answers() {
  for (let tries = 0; tries < 100; tries++) {
    if (
      await globalThis.fetch(`${AT}/api/health`).then(
        ({ ok }) => ok,
        () => false,
      )
    )
      return;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  throw new CannotGoOn('The demo server does not answer.');
}

async function takePictures(browser) {
  const { demoAccounts, DEMO_PASSWORD, DEMO_PIN } = await import('../dist/server/api/demo/accounts.js');
  const { foreman, weaver, manager } = demoAccounts(Date.now());
  const open = (width, height, more = {}) =>
    browser.newContext({
      baseURL: AT,
      viewport: { width, height },
      locale: 'en-GB',
      timezoneId: 'Europe/London',
      reducedMotion: 'reduce',
      ...more,
    });

  const desk = await open(1440, 900);
  const page = await desk.newPage();
  await signIn(page, manager.email, DEMO_PASSWORD);
  await page.goto('/weeks?metric=weft-breaks&weeks=12&mark=loom-11,loom-5,loom-17');
  await page.locator('app-weeks-table-view').waitFor();
  await page.locator('canvas').first().waitFor();
  await picture(page, 'weeks');
  await page.goto('/floor');
  await page.locator('app-cloth-strip').first().waitFor();
  await picture(page, 'floor');
  await page.goto('/shift-book');
  await page.locator('a[href*="shift-book/"]').first().waitFor();
  await page.locator('a[href*="shift-book/"]', { hasText: 'closed' }).first().click();
  await page.locator('app-sheet-table').waitFor();
  await picture(page, 'shift-sheet');
  await desk.close();

  const tablet = await open(1024, 768);
  const floor = await tablet.newPage();
  await signIn(floor, foreman.email, DEMO_PASSWORD);
  await floor.goto('/tablet');
  await floor.getByLabel('Name of the tablet').fill('Alley A, north end');
  await floor.getByRole('button', { name: 'Make it a tablet' }).click();
  await floor.getByRole('heading', { name: /This is tablet/ }).waitFor();
  await floor.getByRole('button', { name: /^Signed in/ }).click();
  await floor.getByRole('button', { name: 'Change person' }).click();
  const press = async (digits) => {
    for (const digit of digits) await floor.getByRole('button', { name: digit, exact: true }).click();
  };
  await floor.getByRole('status', { name: 'Works number' }).waitFor();
  await press(weaver.worksNumber);
  await floor.getByRole('button', { name: 'On to the PIN' }).click();
  await press(DEMO_PIN);
  await floor.locator('app-loom-card').first().waitFor();
  await picture(floor, 'loomside');
  await floor.emulateMedia({ colorScheme: 'dark' });
  await floor.setViewportSize({ width: 390, height: 844 });
  await picture(floor, 'loomside-phone-night');
  await tablet.close();
}

async function signIn(page, email, password) {
  await page.goto('/sign-in');
  await page.getByRole('textbox', { name: 'E-mail' }).fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.getByRole('button', { name: /^Signed in/ }).waitFor();
}

async function picture(page, name) {
  await page.evaluate(() => document.fonts.ready);
  await page.waitForLoadState('networkidle').catch(() => undefined);
  await page.screenshot({ path: path.join(PICTURES, `${name}.png`) });
  console.log(`assets/pictures/${name}.png`);
}
