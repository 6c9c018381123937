import type { Rate } from '@shared/entries/loom-line';
import { aShift, at } from '@shared/testing/builders';
import { noFigure } from '@shared/figures/no-figure';
import { addedUp, againstUsual, usualWords } from './against-usual';
import { numberOnLabel } from './label-reader';
import { MyShiftPage } from './my-shift-page';
import { OneLoomPage } from './one-loom-page';
import { loomsideBed, openScreen } from './testing/loomside-bed';
import { spanFor } from './unaccounted';

const SHIFT = aShift().key;
const rate = (of: number, low: number, high: number): Rate => ({ count: 9, rate: of, low, high });

describe('what is usual', () => {
  it('is the rate of this loom with this cloth over so many picks', () => {
    expect(againstUsual(3, 50_000, rate(8, 6, 12))).toEqual({
      count: 3,
      usual: { expected: 4, low: 3, high: 6 },
    });
    expect(againstUsual(3, noFigure('no-speed'), rate(8, 6, 12)).usual).toBeNull();
    expect(againstUsual(3, 50_000, null).usual).toBeNull();
  });

  it('adds up over looms, its limits as squares, and is not said of a part', () => {
    const one = againstUsual(3, 1e5, rate(8, 5, 12));
    const other = againstUsual(1, 1e5, rate(10, 6, 13));
    const both = addedUp([one, other]);
    expect(both).toEqual({ count: 4, usual: { expected: 18, low: 13, high: 23 } });
    expect(usualWords(both)).toBe('usually 18.0 (13.0 to 23.0)');
    expect(addedUp([one, { count: 1, usual: null }])).toEqual({ count: 4, usual: null });
  });
});

describe('unaccounted minutes', () => {
  it('are put where no stop stands, near the part of the shift that somebody remembers', async () => {
    const { book } = loomsideBed();
    await book.log({
      kind: 'stop',
      loomId: 'loom-1',
      cause: 'picking',
      count: 1,
      at: at(440),
      until: at(480),
    });
    const line = book.lineOf('loom-1')!;
    expect(spanFor(line, 20, 'late', at(500))).toEqual({ from: at(420), until: at(440) });
    expect(spanFor(line, 20, 'early', at(500))).toEqual({ from: at(0), until: at(20) });
    expect(spanFor(line, 20, 'late', at(300))).toEqual({ from: at(280), until: at(300) });
    expect(spanFor(line, 460, 'middle', at(500))).toEqual({ from: at(0), until: at(440) });
  });
});

describe('MyShiftPage', () => {
  async function read() {
    const bed = loomsideBed();
    const { book, clock } = bed;
    book.set.set(book.allLooms.slice(0, 1));
    await book.log({ kind: 'assign', shiftKey: SHIFT, weaverId: 'weaver-1', loomIds: ['loom-1'], at: at(0) });
    await book.log({
      kind: 'reading',
      loomId: 'loom-1',
      shiftKey: SHIFT,
      boundary: 'start',
      value: 0,
      at: at(0),
    });
    clock.at.set(at(478));
    await book.log({ kind: 'stop', loomId: 'loom-1', cause: 'warp-break', count: 3, at: at(100) });
    await book.log({ kind: 'reading', loomId: 'loom-1', shiftKey: SHIFT, boundary: 'end', value: 70_000 });
    return { ...bed, screen: await openScreen(MyShiftPage) };
  }

  it('sets breaks beside what the loom usually gives', async () => {
    const { usual, screen } = await read();
    usual.rows.set({
      'loom-1': {
        loomId: 'loom-1',
        clothId: 'cloth-1',
        shifts: 40,
        warp: rate(4, 3, 6),
        weft: rate(2, 1, 3),
        stops: rate(8, 6, 10),
      },
    });
    await screen.settle();
    expect(screen.text()).toMatch(/Warp breaks\s?3\s?usually 2\.8 \(2\.1 to 4\.2\)/);
  });

  it('explains what is unaccounted by a cause: a stop with both ends, and nothing is left', async () => {
    const { book, screen } = await read();
    const before = screen.text();
    expect(before).toMatch(/stood or ran slow for \d+ min|stood or ran slow for \d+ h/);
    await screen.press(screen.page, 'Explain loom 1', 'All causes', 'Waiting for weft');
    const said = book.logged.at(-1);
    expect(said).toMatchObject({ kind: 'stop', loomId: 'loom-1', cause: 'wait-weft', count: 1 });
    expect(screen.text()).toContain('Every minute of the looms that are read is accounted for.');
  });

  it('asks for no word on a loom whose end was read before I took it over', async () => {
    const { book, clock, screen } = await read();
    clock.at.set(at(479));
    await book.log({ kind: 'assign', shiftKey: SHIFT, weaverId: 'weaver-2', loomIds: ['loom-1'], at: at(0) });
    await book.log({ kind: 'assign', shiftKey: SHIFT, weaverId: 'weaver-1', loomIds: ['loom-1'] });
    await screen.settle();
    expect(book.lineOf('loom-1')).toMatchObject({ picks: 70_000 });
    expect(screen.text()).toContain('No picks of yours yet');
    expect(screen.text()).not.toMatch(/Confirm|Query/);
  });

  it('confirms my picks by one tap, and queries them with words', async () => {
    const { book, screen } = await read();
    await screen.press(screen.page, /^Confirm 1 loom/);
    expect(book.logged.at(-1)).toMatchObject({
      kind: 'pay-word',
      word: 'confirmed',
      picks: 70_000,
      schema: 2,
    });
    expect(screen.text()).toContain('confirmed, not sent');
    await screen.press(screen.page, 'Query the picks of loom 1');
    const count = book.logged.length;
    await screen.press(screen.page, 'Query them');
    expect(book.logged).toHaveLength(count);
    expect(screen.text()).toContain('Say in a few words what is wrong');
    screen.page.querySelector<HTMLInputElement>('app-pay-words input')!.value = 'The clock stuck at noon';
    await screen.press(screen.page, 'Query them');
    expect(book.logged.at(-1)).toMatchObject({ word: 'queried', words: 'The clock stuck at noon' });
  });
});

describe('a loom by its label', () => {
  it.each([
    ['https://mill.example/l/17', 17],
    ['https://mill.example:8443/l/17/', 17],
    ['17', 17],
    ['https://mill.example/loomside', null],
    ['loom seventeen', null],
  ])('%s is loom %s', (text, number) => {
    expect(numberOnLabel(text)).toBe(number);
  });

  it('that is not in my set can be taken over for now, and logged on either way', async () => {
    const { book } = loomsideBed();
    const screen = await openScreen(OneLoomPage, { number: '3' });
    expect(screen.text()).toContain('Not in your set');
    await screen.press(screen.page, /^Warp break/);
    expect(book.logged.at(-1)).toMatchObject({ kind: 'stop', loomId: 'loom-3' });
    await screen.press(screen.page, 'Take over loom 3');
    expect(book.logged.at(-1)).toMatchObject({ kind: 'assign', weaverId: 'weaver-1', loomIds: ['loom-3'] });
    expect(screen.text()).not.toContain('Not in your set');
  });

  it('that is not there is said, with nothing logged', async () => {
    loomsideBed();
    const screen = await openScreen(OneLoomPage, { number: '99' });
    expect(screen.text()).toContain('There is no loom 99 in this shed');
  });
});
