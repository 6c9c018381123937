import { TestBed } from '@angular/core/testing';
import { aShift, at } from '@shared/testing/builders';
import { NotSaved } from '../../offline/not-saved';
import { HandOverPage } from './hand-over-page';
import { LoomEntriesPage } from './loom-entries-page';
import { LoomsideStore } from './loomside-store';
import { TakeOverPage } from './take-over-page';
import { loomsideBed, openScreen } from './testing/loomside-bed';

const SHIFT = aShift().key;
type Screen = Awaited<ReturnType<typeof openScreen<unknown>>>;

/** Types a reading on the pad and says that it is whole. */
async function type(screen: Screen, reading: string): Promise<void> {
  await screen.press(screen.page, ...reading.split(''), 'Next');
}

describe('TakeOverPage', () => {
  it('offers the usual set, takes it over, and reads each clock in one pass', async () => {
    const { book } = loomsideBed();
    book.set.set([]);
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Take over 2 looms');
    expect(book.logged).toMatchObject([
      { kind: 'assign', shiftKey: SHIFT, weaverId: 'weaver-1', loomIds: ['loom-1', 'loom-2'] },
    ]);
    expect(screen.text()).toContain('Loom 1');
    await type(screen, '1200');
    expect(screen.text()).toContain('Loom 2');
    await type(screen, '4300');
    expect(book.logged.slice(1)).toMatchObject([
      { kind: 'reading', loomId: 'loom-1', shiftKey: SHIFT, boundary: 'start', value: 1200 },
      { kind: 'reading', loomId: 'loom-2', shiftKey: SHIFT, boundary: 'start', value: 4300 },
    ]);
  });

  it('says which shift it is where there is only one, with nothing to choose', async () => {
    loomsideBed();
    const screen = await openScreen(TakeOverPage);
    expect(screen.page.querySelector('header')?.textContent).toContain(aShift().name);
    expect(screen.page.querySelector('input[type=radio]')).toBeNull();
  });

  it('confirms what the last shift left by one tap', async () => {
    const { book, clock } = loomsideBed();
    clock.at.set(at(-60));
    await book.log({
      kind: 'reading',
      loomId: 'loom-1',
      shiftKey: 'shed-1:2026-05-31:night',
      boundary: 'end',
      value: 52_130,
    });
    clock.at.set(at(2));
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Take over 2 looms', 'It shows 52,130, as last read');
    expect(book.logged.at(-1)).toMatchObject({ loomId: 'loom-1', boundary: 'start', value: 52_130 });
  });

  it('lets a loom be skipped, which stays to be read', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Take over 2 looms', 'Skip, read it later');
    await type(screen, '4300');
    expect(book.logged.filter((entry) => entry.kind === 'reading')).toMatchObject([{ loomId: 'loom-2' }]);
    expect(book.lineOf('loom-1')?.flags.map((flag) => flag.code)).toContain('no-start-reading');
  });

  it('stays at the loom whose reading could not be saved', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Take over 2 looms');
    book.failure = new NotSaved('storage-closed');
    await type(screen, '1200');
    expect(screen.text()).toContain('Not saved: this device’s storage did not answer');
    expect(screen.text()).toContain('Loom 1');
  });

  it('lets go of looms that are no longer chosen', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, /^Loom 2,/, 'Loom 3', 'Take over 2 looms');
    expect(book.logged).toMatchObject([
      { kind: 'assign', weaverId: 'weaver-1', loomIds: ['loom-3'] },
      { kind: 'assign', weaverId: null, loomIds: ['loom-2'] },
    ]);
    expect(book.logged[0]?.batchId).toBe(book.logged[1]?.batchId);
  });
});

describe('HandOverPage', () => {
  /** Taken over at the start of the shift; it is five minutes before its end. */
  async function handOver() {
    const { book, clock } = loomsideBed();
    book.set.set(book.allLooms.slice(0, 1));
    clock.at.set(at(0));
    await book.log({ kind: 'reading', loomId: 'loom-1', shiftKey: SHIFT, boundary: 'start', value: 10_000 });
    clock.at.set(at(100));
    await book.log({ kind: 'stop', loomId: 'loom-1', cause: 'pern-change', count: 3 });
    clock.at.set(at(477));
    return { book, clock, screen: await openScreen(HandOverPage) };
  }

  it('takes the end reading and perns by baskets, then shows the figures of the shift', async () => {
    const { book, screen } = await handOver();
    await type(screen, '78000');
    expect(screen.text()).toContain('3 logged by taps');
    await screen.press(screen.page, 'One basket more', 'One pern more', 'One pern more', 'Save: 146 perns');
    expect(book.logged.slice(-2)).toMatchObject([
      { kind: 'reading', boundary: 'end', value: 78_000 },
      { kind: 'count', cause: 'pern-change', total: 146, shiftKey: SHIFT },
    ]);
    // 68,000 of 480 × 180 = 86,400 possible picks.
    const row = screen.page.querySelector('tr[data-loom="1"]')?.textContent?.replace(/\s+/g, ' ');
    expect(row).toContain('68,000');
    expect(row).toContain('78.7%');
    expect(row).toContain('146');
  });

  it('is done at a loom whose own end reading disagrees with the neighbour’s: a foreman decides', async () => {
    const { book, clock } = loomsideBed();
    book.set.set(book.allLooms.slice(0, 1));
    const late = aShift({ key: 'late', startsAt: at(480), endsAt: at(960) });
    book.shifts.set([aShift(), late]);
    clock.at.set(at(479));
    await book.log({ kind: 'reading', loomId: 'loom-1', shiftKey: SHIFT, boundary: 'end', value: 78_000 });
    await book.log({ kind: 'count', loomId: 'loom-1', shiftKey: SHIFT, cause: 'pern-change', total: 0 });
    clock.at.set(at(482));
    await book.log({ kind: 'reading', loomId: 'loom-1', shiftKey: 'late', boundary: 'start', value: 70_000 });
    expect(book.lineOf('loom-1', aShift())).toMatchObject({
      endReadingId: null,
      flags: expect.arrayContaining([expect.objectContaining({ code: 'readings-disagree' })]),
    });
    const screen = await openScreen(HandOverPage, { shift: SHIFT });
    expect(screen.text()).toContain('Handed over');
    expect(TestBed.inject(LoomsideStore).leftToHandOver()).toBeNull();
  });

  /** Types into the field that a label names. */
  async function fill(screen: Screen, label: string, text: string): Promise<void> {
    const field = [...screen.page.querySelectorAll('label')]
      .find((one) => one.textContent?.trim() === label)!
      .querySelector('input')!;
    field.value = text;
    field.dispatchEvent(new Event('input'));
    await screen.settle();
  }

  it('counts perns as they are typed', async () => {
    const { book, screen } = await handOver();
    await type(screen, '78000');
    await fill(screen, 'Whole baskets of 144', '2');
    await fill(screen, 'Odd ones', '7');
    await screen.press(screen.page, 'Save: 295 perns');
    expect(book.logged.at(-1)).toMatchObject({ kind: 'count', total: 295 });
  });

  it.each([
    ['Odd ones', '-5', 'There are no fewer perns than none'],
    ['Odd ones', 'abc', '“abc” is not a number of perns'],
    ['Odd ones', '2.5', 'Whole perns alone'],
    ['Whole baskets of 144', '2.5', 'what is in a part-full basket belongs to the odd ones'],
    ['Whole baskets of 144', '70', 'One count takes 10,000 perns at most'],
  ])('answers %s %s with a sentence and logs nothing', async (label, text, sentence) => {
    const { screen } = await handOver();
    await type(screen, '78000');
    await fill(screen, label, text);
    expect(screen.text()).toContain(sentence);
    expect(screen.button(screen.page, 'No count yet')).toHaveProperty('disabled', true);
  });

  it('holds the sum to its limit, whichever field was typed first', async () => {
    const { book, screen } = await handOver();
    await type(screen, '78000');
    await fill(screen, 'Odd ones', '9000');
    await fill(screen, 'Whole baskets of 144', '7');
    expect(screen.text()).toContain('One count takes 10,000 perns at most');
    await fill(screen, 'Whole baskets of 144', '6');
    await screen.press(screen.page, 'Save: 9,864 perns');
    expect(screen.text()).toContain('more than 20 baskets, on one loom in one shift');
    expect(book.logged.at(-1)).toMatchObject({ kind: 'reading' });
    await screen.press(screen.page, 'Count again');
    await fill(screen, 'Odd ones', '3');
    await screen.press(screen.page, 'Save: 867 perns');
    expect(book.logged.at(-1)).toMatchObject({ kind: 'count', total: 867 });
  });

  it('keeps an unlikely count when somebody says so', async () => {
    const { book, screen } = await handOver();
    await type(screen, '78000');
    await fill(screen, 'Whole baskets of 144', '21');
    await screen.press(screen.page, 'Save: 3,024 perns', 'Keep it');
    expect(book.logged.at(-1)).toMatchObject({ kind: 'count', total: 3024 });
  });

  it('says one reading in the singular, and names a shift that does not exist', async () => {
    const { screen } = await handOver();
    expect(screen.text()).toContain('1 reading to go');
    const nowhere = await openScreen(HandOverPage, { shift: 'shed-1:2026-06-01:nope' });
    expect(nowhere.text()).toContain('There is no such shift');
    expect(nowhere.text()).not.toContain('to go');
  });

  it('asks about more than the loom can weave, and keeps the answer with the reading', async () => {
    const { book, screen } = await handOver();
    await type(screen, '200000');
    expect(screen.text()).toContain('More than this loom can weave: 86,400 picks are possible');
    await screen.press(screen.page, 'Keep it');
    expect(book.logged.at(-1)).toMatchObject({ boundary: 'end', value: 200_000, kept: true });
  });

  it('leaves it at the taps, and says why a skipped loom has no figure', async () => {
    const { book, screen } = await handOver();
    await screen.press(screen.page, 'Skip, read it later');
    expect(screen.text()).toContain('no figure, because');
    await screen.press(screen.page, 'Read the skipped ones now');
    await type(screen, '78000');
    await screen.press(screen.page, 'The taps are all');
    expect(book.logged.some((entry) => entry.kind === 'count')).toBe(false);
    expect(screen.page.querySelector('tr[data-loom="1"]')?.textContent).toContain('78.7%');
  });
});

describe('LoomEntriesPage', () => {
  it('takes an entry back with a reason, and keeps it on the list as taken back', async () => {
    const { book } = loomsideBed();
    await book.log({ kind: 'stop', loomId: 'loom-1', cause: 'warp-break', count: 1 });
    const screen = await openScreen(LoomEntriesPage, { loomId: 'loom-1' });
    expect(screen.text()).toContain('saved here, not sent');
    await screen.press(screen.page, 'Undo …', 'Wrong loom');
    expect(book.logged[1]).toMatchObject({
      kind: 'void',
      targetId: book.logged[0]?.id,
      reason: 'Wrong loom',
    });
    expect(screen.text()).toContain('taken back');
    expect(screen.text()).not.toContain('Undo');
  });

  it('asks for a reason where none is given', async () => {
    const { book } = loomsideBed();
    await book.log({ kind: 'stop', loomId: 'loom-1', cause: 'warp-break', count: 1 });
    const screen = await openScreen(LoomEntriesPage, { loomId: 'loom-1' });
    await screen.press(screen.page, 'Undo …', 'Take back');
    expect(screen.text()).toContain('Say why in a word or two');
    expect(book.logged).toHaveLength(1);
  });
});
