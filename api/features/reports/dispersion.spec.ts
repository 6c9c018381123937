import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, LATE, MONDAY, NIGHT, TUESDAY } from '../../testing/test-entries.js';
import { dispersionOf } from './dispersion.js';

const SHIFTS = [EARLY, LATE, NIGHT, TUESDAY];
const MARCH = { from: '2026-03-02', to: '2026-03-30' };

describe('dispersion between shifts', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  /** One loom over four shifts of 90,000 picks each, with so many warp breaks in each; then the shifts are closed. */
  const weave = async (breaks: readonly number[], close = true) => {
    const reading = (at: number, value: number) => {
      const moment = MONDAY + at * 8 * HOUR;
      return at < SHIFTS.length
        ? entry('reading', { loomId: 'n1', shiftKey: SHIFTS[at]!, boundary: 'start', value, at: moment })
        : entry('reading', { loomId: 'n1', shiftKey: TUESDAY, boundary: 'end', value, at: moment });
    };
    const counted = breaks.flatMap((count, at) =>
      count === 0
        ? []
        : [entry('stop', { loomId: 'n1', cause: 'warp-break', count, at: MONDAY + at * 8 * HOUR + HOUR })],
    );
    const closed = SHIFTS.map((shiftKey) =>
      entry('close', { who: 'foreman', shiftKey, at: MONDAY + 32 * HOUR }),
    );
    await book.push(
      [...[0, 1, 2, 3, 4].map((at) => reading(at, at * 900)), ...counted, ...(close ? closed : [])],
      { serverNow: MONDAY + 33 * HOUR },
    );
  };

  it('is Pearson’s X² over its degrees of freedom: 4 × (12 − 6)²/6 ÷ 3 = 8', async () => {
    await weave([0, 12, 0, 12]);
    expect(await dispersionOf(book.data.manager, 'north', MARCH)).toBeCloseTo(8, 9);
  });

  it('is never below one, and one where there is nothing to tell it by', async () => {
    expect(await dispersionOf(book.data.manager, 'north', MARCH)).toBe(1);
    await weave([6, 6, 6, 6]);
    expect(await dispersionOf(book.data.manager, 'north', MARCH)).toBe(1);
  });

  it('leaves open shifts out', async () => {
    await weave([0, 12, 0, 12], false);
    expect(await dispersionOf(book.data.manager, 'north', MARCH)).toBe(1);
  });
});
