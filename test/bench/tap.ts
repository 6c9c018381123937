/**
 * npm run bench:tap: from a tap on a loom to its entry being durable, and to its count being on the screen, against a
 * bare strict put (and a frame after it) in an empty page of the same browser in the same run, all under a CPU four
 * times slower. Prints one line of JSON, ms. Ends with 1 where a tap is durable later than three puts, or on the screen
 * later than two puts with their frames, at the 95th percentile.
 */
import { chromium, type Page } from '@playwright/test';
import { makeTablet } from '../e2e/fixtures/fixtures.js';
import { LOOMS, MINUTE, PEOPLE, PIN, SHIFT_START } from '../e2e/fixtures/mill-facts.js';
import { MillServer } from '../e2e/fixtures/mill-server.js';
import { FloorSignIn } from '../e2e/pages/floor-sign-in.js';
import { LoomsidePage } from '../e2e/pages/loomside-page.js';
import { barePuts, taps, watch, type PutTimes, type TapTimes } from './tap-page.js';

/** Taps and bare puts by turns, so many at a time: a machine that grows busier is busier for both. */
const BLOCKS = 12;
const BLOCK = 10;
const THROTTLE = 4;
const DURABLE_MOST = 3;
const PAINTED_MOST = 2;

const percentile = (times: readonly number[], share: number): number =>
  Number([...times].sort((a, b) => a - b)[Math.ceil(times.length * share) - 1]?.toFixed(1));
const summary = (times: readonly number[]) => ({
  median: percentile(times, 0.5),
  p95: percentile(times, 0.95),
});

async function slow(page: Page): Promise<void> {
  const session = await page.context().newCDPSession(page);
  await session.send('Emulation.setCPUThrottlingRate', { rate: THROTTLE });
}

const now = SHIFT_START + MINUTE;
const mill = await MillServer.start(now);
const browser = await chromium.launch({
  executablePath: process.env['CHROMIUM_PATH'] ?? '/usr/bin/chromium',
  args: process.getuid?.() === 0 ? ['--no-sandbox'] : [],
});
try {
  const context = await browser.newContext({
    baseURL: mill.url,
    viewport: { width: 1024, height: 768 },
    serviceWorkers: 'block',
  });
  // tsx names inner functions by a helper that a page does not have.
  await context.addInitScript('globalThis.__name = (of) => of');
  await makeTablet(context);
  const page = await context.newPage();
  await page.addInitScript(watch, mill.now() - Date.now());
  const loomside = new LoomsidePage(page);
  await loomside.open();
  await new FloorSignIn(page).signIn(PEOPLE.weaver.worksNumber, PIN);
  await loomside.takeOver(LOOMS.map(({ number }) => [number, 1_000] as const));
  const empty = await context.newPage();
  await empty.goto('/api/health');
  await slow(empty);
  await slow(page);
  await page.bringToFront();
  await page.evaluate(taps, { rounds: 12, from: 0 });
  const bare: PutTimes = { durable: [], painted: [] };
  const tapped: TapTimes = { seen: [], durable: [], painted: [] };
  for (let block = 0; block < BLOCKS; block++) {
    await empty.bringToFront();
    const puts = await empty.evaluate(barePuts, BLOCK);
    bare.durable.push(...puts.durable);
    bare.painted.push(...puts.painted);
    await page.bringToFront();
    const some = await page.evaluate(taps, { rounds: BLOCK, from: block * BLOCK });
    tapped.seen.push(...some.seen);
    tapped.durable.push(...some.durable);
    tapped.painted.push(...some.painted);
  }
  const put = summary(bare.durable);
  const putAndFrame = summary(bare.painted);
  const tap = {
    seen: summary(tapped.seen),
    durable: summary(tapped.durable),
    painted: summary(tapped.painted),
  };
  const ratios = {
    durable: Number((tap.durable.p95 / put.p95).toFixed(2)),
    painted: Number((tap.painted.p95 / putAndFrame.p95).toFixed(2)),
  };
  console.log(
    JSON.stringify({ unit: 'ms', throttle: THROTTLE, rounds: BLOCKS * BLOCK, put, putAndFrame, tap, ratios }),
  );
  if (ratios.durable > DURABLE_MOST || ratios.painted > PAINTED_MOST) {
    console.error(
      `A tap takes longer than it may: durable within ${DURABLE_MOST} puts, painted within ${PAINTED_MOST} puts and frames.`,
    );
    process.exitCode = 1;
  }
} finally {
  await browser.close();
  await mill.close();
}
