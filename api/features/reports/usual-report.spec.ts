import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { poissonInterval } from '../../../shared/chance/poisson-interval.js';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, LATE, MONDAY } from '../../testing/test-entries.js';
import { runReport } from './run-report.js';

const WEEK = 7 * 24 * HOUR;

describe('what is usual', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
    const shift = (shiftKey: string, from: number, start: number, end: number) => [
      entry('reading', { loomId: 'n1', shiftKey, boundary: 'start', value: start, at: from }),
      entry('reading', { loomId: 'n1', shiftKey, boundary: 'end', value: end, at: from + 8 * HOUR }),
    ];
    await book.push([
      ...shift(EARLY, MONDAY, 0, 900),
      ...shift(LATE, MONDAY + 8 * HOUR, 900, 1_800),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 4, at: MONDAY + HOUR }),
      entry('stop', { loomId: 'n1', cause: 'picking', count: 1, at: MONDAY + HOUR }),
      entry('stop', { loomId: 'n1', cause: 'pern-change', count: 30, at: MONDAY + HOUR }),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 50, at: MONDAY + 9 * HOUR }),
      entry('close', { who: 'foreman', shiftKey: EARLY, at: MONDAY + 9 * HOUR }),
    ]);
  });
  afterEach(() => book.close());
  const usual = (asOf: number) =>
    book.data.transaction((from) => runReport(from, 'usual', { shedId: 'north', asOf }));

  it('is a ratio of sums over closed shifts with picks, loom by loom and cloth by cloth, with its interval', async () => {
    const { rows, from, to } = await usual(MONDAY + WEEK);
    expect([from, to]).toEqual(['2026-01-19', '2026-03-09']);
    // 900 × 100 picks of the closed shift; the open one with its fifty breaks says nothing yet.
    expect(rows).toMatchObject([{ loomId: 'n1', shifts: 1, warp: { count: 4 }, stops: { count: 5 } }]);
    const [row] = rows;
    expect(row?.warp.rate).toBeCloseTo(4 / 0.9, 9);
    const limits = poissonInterval(4) as { low: number; high: number };
    expect(row?.warp.low).toBeCloseTo(limits.low / 0.9, 9);
    expect(row?.warp.high).toBeCloseTo(limits.high / 0.9, 9);
  });

  it('does not hold the running week against itself, nor what is long past', async () => {
    expect((await usual(MONDAY + 9 * HOUR)).rows).toEqual([]);
    expect((await usual(MONDAY + 9 * WEEK)).rows).toEqual([]);
  });
});
