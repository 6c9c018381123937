import { expectAccessible } from './fixtures/axe.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, passTime, test } from './fixtures/fixtures.js';
import { HOUR, MINUTE, PEOPLE, SHED, SHIFT_KEY, SHIFT_START } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { SyncBadge } from './pages/sync-badge.js';

const { weaver, otherWeaver } = PEOPLE;
const YESTERDAY = `${SHED.id}:2026-03-09:early`;

test.use({ startsAt: SHIFT_START + 10 * MINUTE });

test('weavers come to looms as last shift, by keyboard and by drag; a change in mid-shift makes a stretch @shift-book', async ({
  mill,
  desk,
}) => {
  const { page } = desk;
  const badge = new SyncBadge(page);
  const loom = (number: number) => page.getByRole('button', { name: new RegExp(`^Loom ${number}, `) });
  const hand = await BookHand.signIn(mill, 'foreman');
  await hand.log({
    kind: 'assign',
    shiftKey: YESTERDAY,
    weaverId: weaver.id,
    loomIds: ['loom-1', 'loom-2', 'loom-4'],
    at: SHIFT_START - 24 * HOUR,
  });
  await new DeskSignIn(page).signIn('foreman');
  await page.goto(`/shift-book/${encodeURIComponent(SHIFT_KEY)}/weavers`);

  await test.step('last shift’s sets are one button, and straddle the alley', async () => {
    await expect(page.getByText('6 looms have no weaver: 1, 2, 3, 4, 5, 6.')).toBeVisible();
    await expect(page.getByText('absent? Had 3 looms last time')).toBeVisible();
    await expectAccessible(page, 'Weavers to looms');
    await page.getByRole('button', { name: /^As last shift: Early shift of Mon 9 Mar/ }).click();
    await expect(loom(4)).toHaveAccessibleName(`Loom 4, Wanda, not saved`);
    await expect(page.getByText('3 looms have no weaver: 3, 5, 6.')).toBeVisible();
  });

  await test.step('by keyboard alone: the weaver by arrow keys, looms by Enter', async () => {
    await page.getByRole('radio', { name: new RegExp(otherWeaver.name) }).focus();
    await page.keyboard.press('Space');
    await loom(3).focus();
    await page.keyboard.press('Enter');
    await loom(5).focus();
    await page.keyboard.press('Enter');
  });

  await test.step('by drag: a weaver onto a loom', async () => {
    const from = await page.locator(`[data-weaver="${otherWeaver.id}"]`).boundingBox();
    const to = await loom(6).boundingBox();
    if (!from || !to) throw new Error('Both are on the page.');
    await page.mouse.move(from.x + from.width - 30, from.y + 20);
    await page.mouse.down();
    await page.mouse.move(to.x, to.y, { steps: 4 });
    await page.mouse.move(to.x + to.width / 2, to.y + to.height / 2, { steps: 4 });
    await page.mouse.up();
    await expect(loom(6)).toHaveAccessibleName(`Loom 6, Wilf, not saved`);
    await page.getByRole('button', { name: 'Save 6 looms' }).click();
    await expect(page.getByText('Every loom has a weaver.')).toBeVisible();
    await badge.says('In the book');
  });

  await test.step('three hours later a loom changes hands', async () => {
    await passTime(mill, 3 * HOUR, desk);
    await page.getByRole('radio', { name: new RegExp(otherWeaver.name) }).check();
    await loom(1).click();
    await page.getByRole('button', { name: 'Save 1 loom' }).click();
    await expect(page.getByText('The sets: In the book.')).toBeVisible({ timeout: 20_000 });
    const { lines } = await (await BookHand.signIn(mill, 'foreman')).sheet(SHIFT_KEY);
    const names = lines.map(({ loomNumber, weaverNames }) => [loomNumber, weaverNames.join(', ')]);
    expect(names).toEqual([
      [1, `${weaver.name}, ${otherWeaver.name}`],
      [2, weaver.name],
      [3, otherWeaver.name],
      [4, weaver.name],
      [5, otherWeaver.name],
      [6, otherWeaver.name],
    ]);
    const stretches = lines[0]?.line.stretches.map(({ weaverId }) => weaverId);
    expect(stretches).toEqual([weaver.id, otherWeaver.id]);
  });
});
