import { createHash } from 'node:crypto';
import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, openScreen, passTime, test, type Screen } from './fixtures/fixtures.js';
import {
  DATE,
  LOOMS,
  MINUTE,
  PEOPLE,
  PIN,
  SHED,
  SHIFT_END,
  SHIFT_KEY,
  SHIFT_START,
  WEEK,
} from './fixtures/mill-facts.js';
import type { MillServer } from './fixtures/mill-server.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomLinePage } from './pages/loom-line-page.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { ShiftSheetPage } from './pages/shift-sheet-page.js';
import { SyncBadge } from './pages/sync-badge.js';
import { WeeksPage } from './pages/weeks-page.js';

const SECOND = { id: 'tablet-2', secret: 'u'.repeat(43) };
const LATE = `${SHED.id}:${DATE}:late`;

/**
 * By hand: every loom goes from 1,000 to 1,700 on a clock of hundreds: 70,000 picks of 200 × 480 = 96,000: 72.9%;
 * 70,000 / 8 h = 8,750 an hour. One break in 70,000 picks is 1.4 per 10⁵, two are 2.9.
 */
const START = 1_000;
const END = 1_700;
const PERNS = 90;
const EVERY = { picks: '70,000', efficiency: '72.9%', picksPerHour: '8,750' };
/** Loom 1: two warp breaks tapped, one of them was the weft. Loom 3: two weft breaks that came late. */
const BREAKS = {
  1: { warp: '1.4', weft: '1.4' },
  2: { warp: '0.0', weft: '0.0' },
  3: { warp: '0.0', weft: '2.9' },
};

/** Another registered tablet on the mill's network. */
async function secondTablet(mill: MillServer, screen: Screen): Promise<void> {
  const hash = createHash('sha256').update(SECOND.secret).digest('hex');
  await mill.change(
    `INSERT INTO "device" ("id", "kind", "name", "shedId", "secretHash", "registeredBy", "registeredAt")
     VALUES ('${SECOND.id}', 'tablet', 'Alley B', '${SHED.id}', '${hash}', '${PEOPLE.manager.id}', ${SHIFT_START - 86_400_000})`,
  );
  await screen.context.addCookies([
    {
      name: 'shedbeat-device',
      value: `${SECOND.id}.${SECOND.secret}`,
      domain: 'localhost',
      path: '/',
      httpOnly: true,
      sameSite: 'Strict',
    },
  ]);
}

test('the foreman corrects, decides, closes; late entries are held, then accepted; every figure agrees @shift-book', async ({
  browser,
  mill,
  tablet,
  desk,
}) => {
  test.setTimeout(300_000);
  const loomside = new LoomsidePage(tablet.page);
  const badge = new SyncBadge(tablet.page);
  const other = await openScreen(browser, mill, { width: 1024, height: 768 });
  await secondTablet(mill, other);
  const otherLoomside = new LoomsidePage(other.page);
  const line = new LoomLinePage(desk.page);
  const { page } = desk;

  await test.step('a weaver minds six looms with two tablets, one of which loses the network', async () => {
    await loomside.open();
    await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await loomside.takeOver(LOOMS.map(({ number }) => [number, START] as const));
    await badge.says('In the book');
    await otherLoomside.open();
    await new FloorSignIn(other.page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await expect(otherLoomside.card(3)).toBeVisible({ timeout: 15_000 });
    await new SyncBadge(other.page).says('In the book');
    await other.context.setOffline(true);
    await passTime(mill, 30 * MINUTE, tablet, other);
    await otherLoomside.tap(3, 'Weft break');
    await otherLoomside.tap(3, 'Weft break');
    await loomside.tap(1, 'Warp break');
  });

  await test.step('the foreman opens a line from the sheet and sees the next stop come', async () => {
    await desk.context.clock.setSystemTime(mill.now());
    await new DeskSignIn(page).signIn('foreman');
    const sheet = new ShiftSheetPage(page);
    await sheet.open(SHIFT_KEY);
    await sheet.row(1).getByRole('link', { name: '1', exact: true }).click();
    await expect(page.getByRole('heading', { name: 'Loom 1', exact: true })).toBeVisible();
    await expect(line.entries('Warp break')).toHaveCount(1);
    await expect(line.entries('Start reading 1,000')).toContainText(PEOPLE.weaver.name);
    await loomside.tap(1, 'Warp break');
    await expect(line.entries('Warp break')).toHaveCount(2, { timeout: 20_000 });
    await expectAccessible(page, 'a loom line');
  });

  await test.step('corrects it with a reason, before and after shown first', async () => {
    await line
      .entries('Warp break')
      .first()
      .getByRole('button', { name: /^Correct/ })
      .click();
    await page.getByLabel('Cause').selectOption({ label: 'Weft break' });
    await expect(line.change('Cause')).toContainText('Warp break');
    await expect(line.change('Cause')).toContainText('Weft break');
    await expect(line.change('Warp breaks')).toContainText(/2\s*→\s*1/);
    await page.getByRole('button', { name: 'Save the correction' }).click();
    await expect(page.getByRole('alert')).toContainText('Say why');
    await expectAccessible(page, 'a correction');
    await page.getByLabel('Reason').fill('It was the weft, she says');
    await page.getByRole('button', { name: 'Save the correction' }).click();
    await expect(page.getByText('In the book.', { exact: true })).toBeVisible({ timeout: 15_000 });
    const corrected = line.entries('It was the weft, she says');
    await expect(corrected).toContainText(PEOPLE.foreman.name, { timeout: 15_000 });
    await expect(corrected).toContainText('as logged: Warp break');
  });

  await test.step('the weaver hands over; the next shift reads loom 1 otherwise', async () => {
    const now = await tablet.page.evaluate(() => Date.now());
    await passTime(mill, SHIFT_END - 2 * MINUTE - now, tablet, desk);
    await loomside.handOver(LOOMS.map(({ number }) => [number, END, PERNS] as const));
    await badge.says('In the book');
    await passTime(mill, 12 * MINUTE, tablet, desk);
    const next = await BookHand.signIn(mill, 'foreman');
    const { results } = await next.log({
      kind: 'reading',
      loomId: 'loom-1',
      shiftKey: LATE,
      boundary: 'start',
      value: END + 20,
    });
    expect(results[0]?.result).toBe('stored');
  });

  await test.step('the foreman decides which reading holds', async () => {
    await line.open(SHIFT_KEY, 'loom-1');
    const remedy = line.remedy('readings disagree by 2,000 picks');
    await remedy.getByRole('button', { name: 'Decide the end reading' }).click();
    await page.getByRole('radio', { name: /^1,700/ }).check();
    await page.getByLabel('Reason').fill('Read again together');
    await expectAccessible(page, 'a decision');
    await page.getByRole('button', { name: 'This reading holds' }).click();
    await expect(line.figure('Efficiency')).toContainText(EVERY.efficiency, { timeout: 20_000 });
    await expect(line.entries('Read again together')).toContainText(PEOPLE.foreman.name);
  });

  await test.step('closes by the check list, with what is left ticked deliberately', async () => {
    await page.getByRole('link', { name: 'The sheet' }).click();
    await page.getByRole('link', { name: 'Close the shift' }).click();
    await expect(page.getByRole('heading', { name: '6 loom lines are odd' })).toBeVisible();
    await expect(page.getByRole('link', { name: /Loom 4/ })).toBeVisible();
    await page.getByRole('button', { name: 'Close the shift' }).click();
    await expect(page.getByRole('alert')).toContainText('Tick that');
    await expectAccessible(page, 'the check list');
    await page.getByRole('checkbox', { name: /I close it with what is left/ }).check();
    await page.getByRole('button', { name: 'Close the shift' }).click();
    await expect(page.getByRole('heading', { name: 'The shift is closed' })).toBeVisible({ timeout: 20_000 });
    await expect(page.getByRole('heading', { name: /^Signed 14:/ })).toBeVisible();
  });

  await test.step('the second tablet’s entries come late and are held', async () => {
    await other.context.clock.setSystemTime(mill.now());
    await other.context.setOffline(false);
    await page.getByRole('link', { name: 'The sheet' }).click();
    await expect(page.getByRole('link', { name: 'Held 2' })).toBeVisible({ timeout: 60_000 });
    await page.getByRole('link', { name: 'Held 2' }).click();
    await expect(page.getByRole('heading', { name: '2 entries wait for you' })).toBeVisible();
    await expect(page.getByText('The shift was closed before this came')).toHaveCount(2);
    await expect(
      line.change('Weft breaks').filter({ hasText: /1\s*→\s*3/ }),
      'the shed with both accepted',
    ).toBeVisible();
    await expectAccessible(page, 'held entries');
  });

  await test.step('accepted with a reason: restated, both signed versions kept', async () => {
    await page.getByRole('checkbox', { name: 'All 2' }).check();
    await page.getByRole('button', { name: 'Accept 2' }).click();
    await expect(page.getByRole('alert')).toContainText('Say why');
    await page.getByLabel('Reason').fill('No signal in alley B');
    await page.getByRole('button', { name: 'Accept 2' }).click();
    await expect(page.getByRole('heading', { name: 'Nothing is held' })).toBeVisible({ timeout: 15_000 });
    await expect(page.getByText('Your decision: In the book.')).toBeVisible({ timeout: 15_000 });
    await page.getByRole('link', { name: 'What was signed' }).click();
    await expect(page.getByRole('heading', { name: /^Restated 14:.* by Freda Boon/ })).toBeVisible();
    await expect(page.getByRole('heading', { name: /^Signed 14:.* by Freda Boon/ })).toBeVisible();
    await expect(page.getByText('Version 2: “No signal in alley B”')).toBeVisible();
    await expectAccessible(page, 'signed versions');
  });

  await test.step('the manager sees the week; sheet, Weeks, tablet and a rebuild agree', async () => {
    await mill.stop();
    expect(await mill.rebuild()).toContain('every byte is as it was');
    await mill.boot();
    const manager = await BookHand.signIn(mill, 'manager');
    const rebuilt = await manager.sheet(SHIFT_KEY);
    for (const { line: one, figures, loomNumber } of rebuilt.lines) {
      expect(figures.picks, `loom ${loomNumber}`).toBe(70_000);
      expect(one.shift.state).toBe('closed');
    }
    expect((await manager.weeks(WEEK, 'loom')).total[0]?.figures).toMatchObject({
      picks: 420_000,
      warp: { count: 1 },
      weft: { count: 3 },
    });

    const office = await openScreen(browser, mill, { width: 1440, height: 900 });
    await new DeskSignIn(office.page).signIn('manager');
    const weeks = new WeeksPage(office.page);
    await weeks.open('loom');
    for (const { number } of LOOMS) await expect(weeks.thisWeek(String(number))).toContainText('72.9');
    const sheet = new ShiftSheetPage(office.page);
    await sheet.open(SHIFT_KEY);
    for (const [loom, breaks] of Object.entries(BREAKS))
      for (const [column, text] of Object.entries({ ...EVERY, ...breaks }))
        await expect(sheet.cell(Number(loom), column), `loom ${loom}, ${column}`).toContainText(text);
    await office.context.close();

    await tablet.page.goto(`/loomside/hand-over?shift=${encodeURIComponent(SHIFT_KEY)}`);
    await new FloorSignIn(tablet.page).unlockIfAsked(PEOPLE.weaver.worksNumber, PIN);
    for (const [loom, breaks] of Object.entries(BREAKS))
      for (const text of Object.values({ ...EVERY, ...breaks }))
        await expect(loomside.figuresRow(Number(loom))).toContainText(text);
  });
  await other.context.close();
});

test('a correction made without network is kept, said to be so, and comes into the book later @shift-book', async ({
  mill,
  desk,
}) => {
  test.setTimeout(120_000);
  const { page, context } = desk;
  const foreman = await BookHand.signIn(mill, 'foreman');
  await foreman.log({ kind: 'stop', loomId: 'loom-5', cause: 'warp-break', count: 1 });
  await new DeskSignIn(page).signIn('foreman');
  const line = new LoomLinePage(page);
  await line.open(SHIFT_KEY, 'loom-5');
  await expect(line.entries('Warp break')).toHaveCount(1);
  await context.setOffline(true);
  mill.proxy.cut();
  await line
    .entries('Warp break')
    .getByRole('button', { name: /^Correct/ })
    .click();
  await page.getByRole('radio', { name: 'Take it back' }).check();
  await page.getByLabel('Reason').fill('Wrong loom');
  await page.getByRole('button', { name: 'Take it back' }).click();
  await expect(page.getByText(/1 not sent: figures here are the book’s as of 06:0\d/)).toBeVisible();
  await expect(page.getByText('Saved on this device. It is sent as soon as')).toBeVisible();
  // Not shown as done: the book has not said so.
  await expect(line.entries('Warp break')).toContainText('a correction of yours is not sent');
  await expect(line.entries('Warp break')).not.toContainText('taken back');

  mill.proxy.mend();
  await context.setOffline(false);
  await expect(line.entries('Warp break')).toContainText('taken back', { timeout: 40_000 });
  await expect(line.entries('Warp break')).toContainText('“Wrong loom”');
  await expect(page.getByText(/not sent/)).toBeHidden();
});

test('a shift opened again takes a missing reading, and is signed anew @shift-book', async ({
  mill,
  desk,
}) => {
  test.setTimeout(120_000);
  const { page } = desk;
  const early = await BookHand.signIn(mill, 'foreman');
  await early.log({
    kind: 'reading',
    loomId: 'loom-2',
    shiftKey: SHIFT_KEY,
    boundary: 'start',
    value: START,
    at: SHIFT_START,
  });
  await mill.setNow(SHIFT_END + 5 * MINUTE);
  await desk.context.clock.setSystemTime(mill.now());
  await (await BookHand.signIn(mill, 'foreman')).log({ kind: 'close', shiftKey: SHIFT_KEY });
  await new DeskSignIn(page).signIn('foreman');
  const line = new LoomLinePage(page);
  await line.open(SHIFT_KEY, 'loom-2');
  await expect(page.getByRole('button', { name: /^Correct/ })).toHaveCount(0);
  await page.getByRole('link', { name: 'Open it again with a reason' }).click();
  await page.getByLabel('Reason').fill('A card was found');
  await page.getByRole('button', { name: 'Open the shift again' }).click();
  await expect(page.getByRole('heading', { name: 'Before you close the shift' })).toBeVisible({
    timeout: 15_000,
  });
  await expect(page.getByText('“A card was found”')).toBeVisible();

  await page
    .getByRole('link', { name: /Loom 2/ })
    .first()
    .click();
  await line.remedy('no end reading').getByRole('button', { name: 'Add the end reading' }).click();
  // 2,000 hundreds in eight hours at 200 ppm cannot be: asked about before it is taken.
  await page.getByLabel('What the clock showed').fill('3000');
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(page.getByRole('checkbox', { name: /More than this loom can weave/ })).toBeVisible();
  await page.getByLabel('What the clock showed').fill(String(END));
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(line.figure('Efficiency')).toContainText(EVERY.efficiency, { timeout: 20_000 });

  await page.getByRole('link', { name: 'The sheet' }).click();
  await page.getByRole('link', { name: 'Close the shift' }).click();
  await page.getByRole('checkbox', { name: /I close it with what is left/ }).check();
  await page.getByRole('button', { name: 'Close the shift' }).click();
  await expect(page.getByRole('heading', { name: /^Signed again 14:/ })).toBeVisible({ timeout: 20_000 });
});

test('the shift book holds on a phone and on a tablet @shift-book', async ({ mill, desk: { page } }) => {
  test.setTimeout(120_000);
  const foreman = await BookHand.signIn(mill, 'foreman');
  await foreman.log({ kind: 'standing', loomId: 'loom-5', cause: 'picking' });
  await foreman.log({ kind: 'close', shiftKey: SHIFT_KEY });
  await foreman.log({ kind: 'stop', loomId: 'loom-5', cause: 'weft-break', count: 2 });
  await new DeskSignIn(page).signIn('foreman');
  const shift = `/shift-book/${encodeURIComponent(SHIFT_KEY)}`;
  for (const [width, height] of [
    [360, 740],
    [1024, 768],
  ] as const) {
    await page.setViewportSize({ width, height });
    for (const [path, heading] of [
      [shift, 'The shift in progress'],
      [`${shift}/loom/loom-5`, 'Loom 5'],
      [`${shift}/held`, '1 entry waits for you'],
      [`${shift}/close`, 'The shift is closed'],
    ] as const) {
      await page.goto(path);
      await expect(page.getByRole('heading', { name: heading, exact: true })).toBeVisible();
      await expectAccessible(page, `${path} at ${width}`);
      const wide = await page.evaluate(() => document.documentElement.scrollWidth);
      expect(wide, `${path} at ${width}: nothing sticks out sideways`).toBeLessThanOrEqual(width);
    }
  }
});
