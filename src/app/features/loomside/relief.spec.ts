import { aShift, at } from '@shared/testing/builders';
import { HandOverPage } from './hand-over-page';
import { TakeOverPage } from './take-over-page';
import { loomsideBed, openScreen } from './testing/loomside-bed';

const SHIFT = aShift().key;
const BEFORE = aShift({
  key: 'shed-1:2026-05-31:night',
  startsAt: at(-480),
  endsAt: at(0),
});

describe('Relief in mid-shift', () => {
  it('takes another loom over with a reading at the change, and leaves my own as they are', async () => {
    const { book } = loomsideBed();
    await book.log({
      kind: 'reading',
      loomId: 'loom-3',
      shiftKey: SHIFT,
      boundary: 'start',
      value: 100,
      at: at(1),
    });
    for (const loomId of ['loom-1', 'loom-2'])
      await book.log({ kind: 'reading', loomId, shiftKey: SHIFT, boundary: 'start', value: 100, at: at(1) });
    const screen = await openScreen(TakeOverPage);
    expect(screen.text()).toContain('My set, and relief');
    await screen.press(screen.page, 'Loom 3', 'Take over 3 looms');
    expect(book.logged.at(-1)).toMatchObject({ kind: 'assign', weaverId: 'weaver-1', loomIds: ['loom-3'] });
    expect(screen.text()).toContain('Relief readings · 1 to go');
    await screen.press(screen.page, '6', '5', '0', 'Next');
    expect(book.logged.at(-1)).toMatchObject({
      kind: 'reading',
      loomId: 'loom-3',
      boundary: 'change',
      value: 650,
    });
  });

  it('goes without a reading where there is no time for one', async () => {
    const { book } = loomsideBed();
    for (const loomId of ['loom-1', 'loom-2', 'loom-3'])
      await book.log({ kind: 'reading', loomId, shiftKey: SHIFT, boundary: 'start', value: 100, at: at(1) });
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Loom 3', 'Take over 3 looms', 'Without a reading');
    expect(book.logged.filter(({ kind }) => kind === 'reading')).toHaveLength(3);
    expect(book.setOf('weaver-1', aShift()).map((loom) => loom.number)).toEqual([1, 2, 3]);
  });

  it('says the walk anew where its order changes', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Choose anew', 'Loom 2', 'Loom 1', 'Take over 2 looms');
    expect(book.logged).toMatchObject([{ kind: 'assign', loomIds: ['loom-2', 'loom-1'] }]);
  });
});

describe('The incoming weaver', () => {
  async function readByTheNight() {
    const bed = loomsideBed();
    bed.book.shifts.set([BEFORE, aShift()]);
    bed.clock.at.set(at(-2));
    for (const loomId of ['loom-1', 'loom-2'])
      await bed.book.log({ kind: 'reading', loomId, shiftKey: BEFORE.key, boundary: 'end', value: 900 });
    bed.clock.at.set(at(1));
    return bed;
  }

  it('confirms what the outgoing one read for the whole set, by one tap', async () => {
    const { book } = await readByTheNight();
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Take over 2 looms', '2 looms show this');
    expect(book.logged.slice(2)).toMatchObject([
      { kind: 'reading', loomId: 'loom-1', shiftKey: SHIFT, boundary: 'start', value: 900 },
      { kind: 'reading', loomId: 'loom-2', shiftKey: SHIFT, boundary: 'start', value: 900 },
    ]);
    expect(book.logged[2]?.batchId).toBe(book.logged[3]?.batchId);
  });

  it('reads the loom that shows something else, and confirms the rest', async () => {
    const { book } = await readByTheNight();
    const screen = await openScreen(TakeOverPage);
    await screen.press(screen.page, 'Take over 2 looms', 'Loom 2 shows something else', '1 loom shows this');
    expect(book.logged.slice(2)).toMatchObject([{ loomId: 'loom-1', value: 900 }]);
    expect(screen.text()).toContain('Start readings · 1 to go');
    await screen.press(screen.page, '9', '0', '1', 'Next');
    expect(book.logged.at(-1)).toMatchObject({ loomId: 'loom-2', boundary: 'start', value: 901 });
  });
});

describe('What was half typed', () => {
  it('stands in the pad again when its person is back, and is forgotten once it is read', async () => {
    const { typed } = loomsideBed();
    const first = await openScreen(HandOverPage);
    await first.press(first.page, '4', '2');
    first.fixture.destroy();
    const again = await openScreen(HandOverPage);
    expect(again.page.querySelector('input')?.value).toBe('42');
    await again.press(again.page, 'Next');
    expect(Object.values(typed.texts()).filter(Boolean)).toEqual([]);
  });
});

describe('Perns of the set', () => {
  it('are one count, shared out by picks', async () => {
    const { book, ways } = loomsideBed();
    ways.countPerns('whole-set');
    for (const loomId of ['loom-1', 'loom-2'])
      await book.log({ kind: 'reading', loomId, shiftKey: SHIFT, boundary: 'start', value: 0, at: at(0) });
    for (const [loomId, value] of [
      ['loom-1', 300],
      ['loom-2', 100],
    ] as const)
      await book.log({ kind: 'reading', loomId, shiftKey: SHIFT, boundary: 'end', value });
    const screen = await openScreen(HandOverPage);
    expect(screen.text()).toContain('Looms 1, 2');
    await screen.press(screen.page, 'One basket more', 'Save: 144 perns');
    expect(book.logged.slice(-2)).toMatchObject([
      { kind: 'count', loomId: 'loom-1', cause: 'pern-change', total: 108 },
      { kind: 'count', loomId: 'loom-2', cause: 'pern-change', total: 36 },
    ]);
    expect(screen.text()).toContain('Handed over');
  });

  it('are not asked of who taps each', async () => {
    const { book, ways } = loomsideBed();
    ways.countPerns('taps');
    for (const loomId of ['loom-1', 'loom-2'])
      await book.log({ kind: 'reading', loomId, shiftKey: SHIFT, boundary: 'end', value: 300 });
    const screen = await openScreen(HandOverPage);
    expect(screen.text()).toContain('Handed over');
    expect(screen.page.querySelector('app-pern-counter')).toBeNull();
  });
});
