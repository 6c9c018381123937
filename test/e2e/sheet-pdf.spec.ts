import { readFileSync } from 'node:fs';
import { pdfWords } from '../../api/testing/pdf-text.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, test } from './fixtures/fixtures.js';
import { HOUR, MINUTE, SHIFT_END, SHIFT_KEY, SHIFT_START } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { ShiftSheetPage } from './pages/shift-sheet-page.js';

test.use({ startsAt: SHIFT_END + 5 * MINUTE });

test('the sheet’s PDF has the figures that the screen shows @shift-book', async ({ mill, desk }) => {
  const { page } = desk;
  const hand = await BookHand.signIn(mill, 'foreman');
  for (const [loom, end] of [
    [1, 1_700],
    [2, 1_640],
  ] as const) {
    const reading = { kind: 'reading', loomId: `loom-${loom}`, shiftKey: SHIFT_KEY };
    await hand.log({ ...reading, boundary: 'start', value: 1_000, at: SHIFT_START });
    await hand.log({ ...reading, boundary: 'end', value: end, at: SHIFT_END });
  }
  await hand.log({ kind: 'stop', loomId: 'loom-1', cause: 'warp-break', count: 2, at: SHIFT_START + HOUR });
  await new DeskSignIn(page).signIn('foreman');
  const sheet = new ShiftSheetPage(page);
  await sheet.open(SHIFT_KEY);
  const downloading = page.waitForEvent('download');
  await page.getByRole('button', { name: 'PDF', exact: true }).click();
  const download = await downloading;
  expect(download.suggestedFilename()).toBe('shift-shed-1-2026-03-10-early.pdf');
  const words = (await pdfWords(readFileSync(await download.path()))).map(({ text }) => text);
  for (const loom of [1, 2])
    for (const column of ['picks', 'efficiency', 'picksPerHour'])
      expect(words).toContain((await sheet.cell(loom, column).innerText()).trim());
  await expect(sheet.cell(1, 'warp')).toContainText('2.9');
  expect(words).toContain('2.9');
});
