import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, LATE, MINUTE, MONDAY } from '../../testing/test-entries.js';
import { rebuildBook } from './rebuild.js';

const CHANGE = MONDAY + 8 * HOUR;

describe('a reset of the pick clock that names the shift before', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  const reading = (boundary: 'start' | 'end' | 'reset', shiftKey: string, at: number, value: number) =>
    entry('reading', {
      loomId: 'n1',
      shiftKey,
      boundary,
      at,
      value,
      ...(boundary === 'reset' && { newValue: 0 }),
    });

  it('counts in the shift in which it was read, whenever it comes, and after a rebuild', async () => {
    await book.push([
      reading('start', EARLY, MONDAY, 98_000),
      reading('end', EARLY, CHANGE - 2 * MINUTE, 98_800),
      reading('end', LATE, CHANGE + 8 * HOUR, 700),
    ]);
    const unknowing = await book.lineRow(LATE, 'n1');
    expect(unknowing.picks).toBe(190_000);
    await book.push([reading('reset', EARLY, CHANGE - MINUTE, 98_800)]);
    expect((await book.lineRow(EARLY, 'n1')).picks).toBe(80_000);
    expect((await book.lineRow(LATE, 'n1')).picks).toBe(70_000);
    expect(await book.writer.write(rebuildBook)).toMatchObject({ different: [] });
  });
});
