import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { EARLY, entry, HOUR, LATE, MINUTE, MONDAY } from '../../testing/test-entries.js';
import { testBook, type TestBook } from '../../testing/test-book.js';

describe('ingest', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  const reading = (boundary: 'start' | 'end', value: number, at: number, shiftKey = EARLY) =>
    entry('reading', { loomId: 'n1', shiftKey, boundary, value, at });

  it('stores a shift of one loom and projects its line', async () => {
    const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + HOUR });
    const results = await book.push([
      reading('start', 100, MONDAY),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 2, at: MONDAY + 2 * HOUR }),
      stands,
      entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + HOUR + 30 * MINUTE }),
      reading('end', 960, MONDAY + 8 * HOUR),
    ]);
    expect(results.map((one) => one.result)).toEqual(['stored', 'stored', 'stored', 'stored', 'stored']);
    const row = await book.lineRow(EARLY, 'n1');
    expect(row).toMatchObject({ picks: 86_000, possiblePicks: 96_000, warpBreaks: 2, measuredMinutes: 30 });
    // Looms without entries are on the sheet too.
    expect((await book.line(EARLY, 'n2')).flags.map((flag) => flag.code)).toContain('no-start-reading');
    await expect(book.lineRow(LATE, 'n1')).rejects.toThrow('No line');
  });
});
