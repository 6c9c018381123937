import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, goOnline, test } from './fixtures/fixtures.js';
import { CLOCK, HOUR, MINUTE, PEOPLE, PPM, SHED, SHIFT_END, SHIFT_KEY } from './fixtures/mill-facts.js';
import type { MillServer } from './fixtures/mill-server.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { PaperPage } from './pages/paper-page.js';
import { ShiftSheetPage } from './pages/shift-sheet-page.js';
import { SyncBadge } from './pages/sync-badge.js';

/** The foreman types the early shift's cards ten minutes after its end. */
test.use({ startsAt: SHIFT_END + 10 * MINUTE });

const START = 1_000;
/** Loom n ends on 1,600 + n: (600 + n) × 100 picks of 200 × 480 = 96,000. */
const endOf = (loom: number): number => START + 600 + loom;
const picksOf = (loom: number): number => (600 + loom) * CLOCK.unit;
const share = (loom: number): string => `${((100 * picksOf(loom)) / (PPM * 480)).toFixed(1)}%`;

/** Eighteen more looms stand in the shed, so that it has 24. */
async function fillTheShed(mill: MillServer): Promise<void> {
  const since = Date.UTC(2026, 0, 1);
  for (let n = 7; n <= 24; n++) {
    await mill.change(
      `INSERT INTO "loom" ("id", "shedId", "number", "row", "position", "alley", "from", "until")
       VALUES ('loom-${n}', '${SHED.id}', ${n}, ${Math.ceil(n / 6) + 1}, ${((n - 1) % 6) + 1}, 'B', ${since}, NULL)`,
    );
    await mill.change(
      `INSERT INTO "loom_version" ("id", "loomId", "effectiveAt", "ppm", "reedSpaceCm", "clock", "shuttles", "battery")
       VALUES ('loom-${n}.1', 'loom-${n}', ${since}, ${PPM}, 120, '${JSON.stringify(CLOCK)}', 1, 0)`,
    );
  }
}

/** The shift before ended on 1,000 on every loom: cards need no start. */
async function readBefore(mill: MillServer, looms: number): Promise<void> {
  const hand = await BookHand.signIn(mill, 'foreman');
  for (let n = 1; n <= looms; n++)
    await hand.log({
      kind: 'reading',
      loomId: `loom-${n}`,
      shiftKey: SHIFT_KEY,
      boundary: 'start',
      value: START,
      at: SHIFT_END - 8 * HOUR,
      source: 'paper',
    });
}

test('24 looms are typed in by keyboard alone, in three minutes’ keys, and every figure is the card’s @paper', async ({
  mill,
  desk,
}) => {
  test.setTimeout(180_000);
  await fillTheShed(mill);
  await readBefore(mill, 24);
  const { page } = desk;
  const paper = new PaperPage(page);
  await new DeskSignIn(page).signIn('foreman');
  await paper.open(SHIFT_KEY);

  await test.step('the first cell that needs something has the focus', async () => {
    await expect(paper.cell(1, 'end reading')).toBeFocused();
    await expectAccessible(page, 'From paper');
  });

  await test.step('a row a loom: end, warp, weft, perns, and on to the next', async () => {
    for (let loom = 1; loom <= 24; loom++) {
      await paper.type(String(endOf(loom)));
      await paper.press('Enter');
      await paper.type('1');
      await paper.press('Enter');
      await paper.type('2');
      await paper.press('Enter');
      await paper.type('90');
      if (loom === 1) {
        await paper.press('Enter');
        await paper.type('gait 60');
        await paper.press('Enter');
        await paper.type(PEOPLE.weaver.worksNumber);
        await expect(page.getByText(`gaiting 60 min · ${PEOPLE.weaver.name}`)).toBeVisible();
        await expect(page.getByRole('row', { name: /^1 / }).first()).toContainText(share(1));
      }
      await paper.press('+');
    }
    await paper.press('Control+Enter');
    await expect(page.getByRole('status').filter({ hasText: '24 cards are saved' })).toBeVisible();
    // A person at a number pad strikes two keys a second at their ease: three minutes are 360.
    expect(paper.keys).toBeLessThan(360);
  });

  await test.step('the sheet and the server have the cards’ figures', async () => {
    await new SyncBadge(page).says('In the book');
    await expect(page.getByText('in the book', { exact: true })).toHaveCount(24);
    const hand = await BookHand.signIn(mill, 'foreman');
    const { lines, total } = await hand.sheet(SHIFT_KEY);
    expect(lines.map(({ figures }) => figures.picks)).toEqual(
      lines.map(({ loomNumber }) => picksOf(loomNumber)),
    );
    expect(total.figures.warp.count).toBe(24);
    expect(total.figures.weft.count).toBe(48);
    const sheet = new ShiftSheetPage(page);
    await sheet.open(SHIFT_KEY);
    await expect(sheet.cell(24, 'efficiency')).toHaveText(share(24));
    await expect(sheet.cell(1, 'what')).toContainText(PEOPLE.weaver.name);
  });
});

test('half a grid survives a reload and no network; a wrong card is taken back and put in again @paper', async ({
  mill,
  desk,
}) => {
  await readBefore(mill, 6);
  const { page } = desk;
  const paper = new PaperPage(page);
  const badge = new SyncBadge(page);
  await new DeskSignIn(page).signIn('foreman');
  await paper.open(SHIFT_KEY);

  await test.step('impossible values are answered as they are typed', async () => {
    await paper.cell(1, 'end reading').fill('123456');
    await expect(page.getByText('This clock has 5 digits')).toBeVisible();
    await paper.cell(1, 'end reading').fill('2600');
    await expect(page.getByText('More than this loom can weave: 96,000 picks')).toBeVisible();
    await paper.press('Control+Enter');
    await expect(page.getByRole('checkbox', { name: 'Loom 1: keep it as typed' })).toBeFocused();
    await paper.cell(1, 'end reading').fill('1660');
    await paper.cell(2, 'end reading').fill('16');
  });

  await test.step('what is half typed is there after a reload', async () => {
    await page.reload();
    await expect(paper.cell(1, 'end reading')).toHaveValue('1660');
    await expect(paper.cell(2, 'end reading')).toHaveValue('16');
  });

  await test.step('cards are put in without network and sent when it is back', async () => {
    await goOffline(mill, desk);
    await paper.cell(2, 'end reading').fill('1650');
    await paper.press('Control+Enter');
    await expect(page.getByText('2 cards are saved')).toBeVisible();
    await expect(page.getByText('not sent', { exact: true })).toHaveCount(2);
    await goOnline(mill, desk);
    await badge.says('In the book');
  });

  await test.step('the batch is taken back by one void, mended, and put in again', async () => {
    await page.getByRole('button', { name: 'Take the last ones back' }).click();
    await expect(page.getByText('Taken back.')).toBeVisible();
    await paper.cell(1, 'end reading').fill('1670');
    await paper.press('Control+Enter');
    await expect(page.getByText('2 cards are saved')).toBeVisible();
    await badge.says('In the book');
    // A single one is corrected by typing it again.
    await paper.cell(2, 'end reading').fill('1640');
    await paper.press('Control+Enter');
    await expect(page.getByText('1 card is saved')).toBeVisible();
    await badge.says('In the book');
    const { lines } = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
    const line = (loom: number) => lines.find(({ loomNumber }) => loomNumber === loom);
    expect(line(1)?.figures.picks).toBe(67_000);
    expect(line(2)?.figures.picks).toBe(64_000);
    // Voided, never typed in twice.
    expect(line(2)?.line.flags.map(({ code }) => code)).not.toContain('corrected-twice');
  });
  await mill.stop();
  expect(await mill.rebuild()).toContain('every byte is as it was');
  await mill.boot();
});

test('blank cards print two to a page, each with its loom’s address @paper', async ({ desk }) => {
  const { page } = desk;
  await new DeskSignIn(page).signIn('foreman');
  await page.goto(`/shift-book/${encodeURIComponent(SHIFT_KEY)}/cards`);
  await expect(page.getByRole('article')).toHaveCount(6);
  await expect(page.getByRole('img', { name: 'QR code: opens loom 6' })).toBeVisible();
  await expectAccessible(page, 'Blank log cards');
  const pdf = await page.pdf({ preferCSSPageSize: true });
  expect(pdf.toString('latin1').match(/\/Type\s*\/Page\b/g)).toHaveLength(3);
  await page.getByLabel('Which looms').selectOption('Row 2');
  await expect(page.getByRole('article')).toHaveCount(3);
});
