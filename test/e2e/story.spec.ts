import type { Figures } from '../../shared/entries/loom-line.js';
import { BookHand } from './fixtures/book-hand.js';
import { expect, goOffline, goOnline, passTime, test, waitForServiceWorker } from './fixtures/fixtures.js';
import { MINUTE, PEOPLE, PIN, SHIFT_END, SHIFT_KEY, SHIFT_START, WEEK } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';
import { LoomsidePage } from './pages/loomside-page.js';
import { ShiftSheetPage } from './pages/shift-sheet-page.js';
import { SyncBadge } from './pages/sync-badge.js';
import { WeeksPage } from './pages/weeks-page.js';

/**
 * Worked out by hand. The shift is 06:00–14:00: T = 480 min. Every loom runs at 200 ppm, so it could weave
 * 200 × 480 = 96,000 picks. Its clock counts hundreds on five digits.
 *
 * efficiency = picks / 96,000; picks an hour = picks / 8; breaks per 10⁵ picks = 100,000 × breaks / picks.
 * Estimated minutes: a warp break's allowance is 60 s, a weft break's 30 s, a pern change's 15 s.
 */
const BY_HAND = [
  {
    loom: 1,
    start: 10_000,
    end: 10_768, // 768 × 100 = 76,800 picks; 76,800 / 96,000 = 80.0%; 76,800 / 8 = 9,600 an hour
    warpTaps: 3, // 300,000 / 76,800 = 3.906 → 3.9
    weftTaps: 2, // 200,000 / 76,800 = 2.604 → 2.6
    perns: 96, // 96 × 15 s = 24 min
    estimated: 28, // 3 × 60 s + 2 × 30 s = 4 min, and 24
    shown: { picks: '76,800', efficiency: '80.0%', picksPerHour: '9,600', warp: '3.9', weft: '2.6' },
  },
  {
    loom: 2,
    start: 0,
    end: 720, // 72,000 picks; 75.0%; 9,000 an hour
    warpTaps: 2, // 200,000 / 72,000 = 2.778 → 2.8
    weftTaps: 3, // 300,000 / 72,000 = 4.167 → 4.2
    perns: 90, // 22.5 min
    estimated: 26, // 2 + 1.5 = 3.5 min, and 22.5
    shown: { picks: '72,000', efficiency: '75.0%', picksPerHour: '9,000', warp: '2.8', weft: '4.2' },
  },
  {
    loom: 3,
    start: 45_321,
    end: 46_137, // 816: 81,600 picks; 85.0%; 10,200 an hour
    warpTaps: 1, // 100,000 / 81,600 = 1.225 → 1.2
    weftTaps: 4, // 400,000 / 81,600 = 4.902 → 4.9
    perns: 100, // 25 min
    estimated: 28, // 1 + 2 = 3 min, and 25
    shown: { picks: '81,600', efficiency: '85.0%', picksPerHour: '10,200', warp: '1.2', weft: '4.9' },
  },
  {
    loom: 4,
    start: 5,
    end: 869, // 864: 86,400 picks; 90.0%; 10,800 an hour
    warpTaps: 0, // no warp break: 0.0
    weftTaps: 5, // 500,000 / 86,400 = 5.787 → 5.8
    perns: 104, // 26 min
    estimated: 28.5, // 2.5 min, and 26
    shown: { picks: '86,400', efficiency: '90.0%', picksPerHour: '10,800', warp: '0.0', weft: '5.8' },
  },
  {
    loom: 5,
    start: 70_000,
    end: 70_792, // 79,200 picks; 82.5%; 9,900 an hour
    warpTaps: 4, // 400,000 / 79,200 = 5.051 → 5.1
    weftTaps: 1, // 100,000 / 79,200 = 1.263 → 1.3
    perns: 98, // 24.5 min
    estimated: 29, // 4 + 0.5 = 4.5 min, and 24.5
    shown: { picks: '79,200', efficiency: '82.5%', picksPerHour: '9,900', warp: '5.1', weft: '1.3' },
  },
  {
    loom: 6,
    start: 99_900,
    end: 572, // rolls over: (572 − 99,900) mod 100,000 = 672: 67,200 picks; 70.0%; 8,400 an hour
    warpTaps: 2, // 200,000 / 67,200 = 2.976 → 3.0
    weftTaps: 2, // and a cleaning of 12 min, timed: 5 stops; 200,000 / 67,200 = 2.976 → 3.0
    perns: 80, // 20 min
    estimated: 23, // 2 + 1 = 3 min, and 20
    shown: { picks: '67,200', efficiency: '70.0%', picksPerHour: '8,400', warp: '3.0', weft: '3.0' },
  },
] as const;
/** 5 stops a loom. */
const STOPS = 30;
/** Loom 6 was cleaned for 12 min. */
const CLEANED = 12;
/** 76,800 + 72,000 + 81,600 + 86,400 + 79,200 + 67,200 = 463,200 of 6 × 96,000 = 576,000: 80.417%. */
const ALL = { picks: 463_200, efficiency: '80.4%', efficiencyValue: 463_200 / 576_000 };
/** By row: 230,400 / 288,000 = 80.0%, and 232,800 / 288,000 = 80.833%. */
const ROWS = { '1': '80.0%', '2': '80.8%' };

test('a weaver logs a shift without network, and its figures come out the same everywhere @story', async ({
  mill,
  tablet,
  desk,
}) => {
  test.setTimeout(240_000);
  const loomside = new LoomsidePage(tablet.page);
  const badge = new SyncBadge(tablet.page);

  await test.step('takes over six looms with their readings', async () => {
    await loomside.open();
    await new FloorSignIn(tablet.page).signIn(PEOPLE.weaver.worksNumber, PIN);
    await loomside.takeOver(BY_HAND.map(({ loom, start }) => [loom, start] as const));
    await badge.says('In the book');
    await waitForServiceWorker(tablet.page);
  });

  await test.step('goes offline: the wire is cut, the server stopped', async () => {
    await goOffline(mill, tablet);
  });

  await test.step('logs 30 stops on six looms, reloading in the middle', async () => {
    let logged = 0;
    const pass = () => tablet.context.clock.fastForward(8 * MINUTE);
    for (const { loom, warpTaps } of BY_HAND)
      for (let i = 0; i < warpTaps; i++, logged++) {
        await loomside.tap(loom, 'Warp break');
        await pass();
      }
    await badge.says(`${logged} waiting`);

    await tablet.page.reload();
    await new FloorSignIn(tablet.page).unlock(PEOPLE.weaver.worksNumber, PIN);
    await badge.says(`${logged} waiting`);

    for (const { loom, weftTaps } of BY_HAND)
      for (let i = 0; i < weftTaps; i++, logged++) {
        await loomside.tap(loom, 'Weft break');
        await pass();
      }
    await loomside.stands(6, 'Cleaning and oiling');
    await tablet.context.clock.fastForward(CLEANED * MINUTE);
    await loomside.running(6);
    expect(logged + 1).toBe(STOPS);
  });

  await test.step('hands over with readings and perns at the end of the shift', async () => {
    const now = await tablet.page.evaluate(() => Date.now());
    await tablet.context.clock.fastForward(SHIFT_END - 2 * MINUTE - now);
    await loomside.handOver(BY_HAND.map(({ loom, end, perns }) => [loom, end, perns] as const));
    await expectTabletFigures(loomside);
  });

  await test.step('goes online: everything reaches the book', async () => {
    const now = await tablet.page.evaluate(() => Date.now());
    await mill.setNow(now);
    await goOnline(mill, tablet);
    await badge.says('In the book');
    await passTime(mill, 10 * MINUTE, tablet);
  });

  const foreman = await BookHand.signIn(mill, 'foreman');
  await test.step('the server’s figures are those worked out by hand', async () => {
    const sheet = await foreman.sheet(SHIFT_KEY);
    for (const row of BY_HAND) {
      const line = sheet.lines.find((l) => l.loomNumber === row.loom);
      const figures = line?.figures as Figures;
      const picks = ((row.end - row.start + 100_000) % 100_000) * 100;
      expect(figures.picks, `picks of loom ${row.loom}`).toBe(picks);
      expect(figures.efficiency).toBeCloseTo(picks / 96_000, 10);
      expect(figures.picksPerHour).toBeCloseTo(picks / 8, 6);
      expect(figures.warp.count).toBe(row.warpTaps);
      expect(figures.weft.count).toBe(row.weftTaps);
      expect(figures.estimatedMinutes).toBeCloseTo(row.estimated, 6);
      // Cleaned between two taps of a person: 12 min and what the taps took.
      if (row.loom === 6) expect(Math.round(figures.measuredMinutes)).toBe(CLEANED);
      else expect(figures.measuredMinutes).toBe(0);
      expect(line?.weaverNames).toEqual([PEOPLE.weaver.name]);
    }
    expect(sheet.total.figures.picks).toBe(ALL.picks);
    expect(sheet.total.figures.efficiency).toBeCloseTo(ALL.efficiencyValue, 10);
    expect(sheet.held).toBe(0);
  });

  await test.step('the foreman closes the shift; sheet, Weeks and tablet say the same', async () => {
    const { results } = await foreman.log({ kind: 'close', shiftKey: SHIFT_KEY });
    expect(results[0]?.result).toBe('stored');

    const sheet = new ShiftSheetPage(desk.page);
    await new DeskSignIn(desk.page).signIn('foreman');
    await sheet.open(SHIFT_KEY);
    for (const { loom, shown } of BY_HAND)
      for (const [column, text] of Object.entries(shown))
        await expect(sheet.cell(loom, column), `loom ${loom}, ${column}`).toContainText(text);
    await expect(desk.page.getByText(`Shed efficiency ${ALL.efficiency}`)).toBeVisible();

    const weeks = new WeeksPage(desk.page);
    await weeks.open('loom');
    for (const { loom, shown } of BY_HAND)
      await expect(weeks.thisWeek(String(loom)), `loom ${loom} in Weeks`).toContainText(
        shown.efficiency.replace('%', ''),
      );
    await weeks.open('row');
    for (const [row, efficiency] of Object.entries(ROWS))
      await expect(weeks.thisWeek(row)).toContainText(efficiency.replace('%', ''));

    const answered = await foreman.weeks(WEEK, 'loom');
    expect(answered.total[0]?.figures.efficiency).toBeCloseTo(ALL.efficiencyValue, 10);

    await tablet.page.goto(`/loomside/hand-over?shift=${encodeURIComponent(SHIFT_KEY)}`);
    await new FloorSignIn(tablet.page).unlockIfAsked(PEOPLE.weaver.worksNumber, PIN);
    await expectTabletFigures(loomside);
  });
  expect(mill.now()).toBeGreaterThan(SHIFT_START);
});

async function expectTabletFigures(loomside: LoomsidePage): Promise<void> {
  for (const { loom, shown, perns } of BY_HAND) {
    const row = loomside.figuresRow(loom);
    for (const text of [...Object.values(shown), String(perns)]) await expect(row).toContainText(text);
  }
}
