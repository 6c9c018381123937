import { afterEach, describe, expect, it } from 'vitest';
import type { Entry } from '../../../shared/entries/entry.js';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { Dice, randomHistory } from '../../testing/random-history.js';
import { rebuildBook } from './rebuild.js';

const READ_MODELS = [
  `SELECT * FROM "stand" ORDER BY "stopId", "loomId"`,
  `SELECT * FROM "fitting" ORDER BY "id"`,
  `SELECT * FROM "loom_line" ORDER BY "shiftKey", "loomId"`,
];

describe('the book as a function of its entries', () => {
  const books: TestBook[] = [];
  afterEach(async () => {
    for (const book of books.splice(0)) await book.close();
  });
  const newBook = async () => {
    const book = await testBook();
    books.push(book);
    return book;
  };
  const pushAll = async (book: TestBook, entries: readonly Entry[], dice: Dice) => {
    const waiting = [...entries];
    while (waiting.length > 0) {
      const results = await book.push(waiting.splice(0, dice.upTo(40) + 1), { deviceId: null });
      const refused = results.filter((one) => one.result === 'refused');
      expect(refused.filter((one) => one.code !== 'held-undecided')).toEqual([]);
    }
  };
  const dump = async (book: TestBook) => {
    const tables: unknown[] = [];
    for (const sql of READ_MODELS) tables.push(await book.data.query(sql));
    return tables;
  };

  it.each([1, 2, 3, 4])('does not depend on the order of arrival (history %i)', async (seed) => {
    const dice = new Dice(seed);
    const history = randomHistory(dice, 250, { decisions: false });
    const [asLogged, shuffled] = [await newBook(), await newBook()];
    await pushAll(asLogged, history, dice);
    await pushAll(shuffled, dice.shuffled(history), dice);
    expect(await dump(shuffled)).toEqual(await dump(asLogged));
  });

  it.each([11, 12, 13, 253])('is the same to the byte after a rebuild (history %i)', async (seed) => {
    const dice = new Dice(seed);
    const book = await newBook();
    // Nearly in order, as tablets that are offline now and then would send it: closed shifts, holds, decisions in it.
    await pushAll(book, dice.stirred(randomHistory(dice, 300, { decisions: true }), 12), dice);
    const before = await dump(book);
    const rebuilt = await book.writer.write(rebuildBook);
    expect(rebuilt).toMatchObject({ different: [], unlikeSigned: [] });
    expect(rebuilt.lines).toBeGreaterThan(0);
    expect(rebuilt.signedShifts).toBeGreaterThan(0);
    expect(await dump(book)).toEqual(before);
  });

  it('finds a line that was tampered with, mends it, and finds totals that are not what was signed', async () => {
    const dice = new Dice(11);
    const book = await newBook();
    await pushAll(book, randomHistory(dice, 300, { decisions: true }), dice);
    const before = await dump(book);
    await book.data.query(`UPDATE "loom_line" SET "warpBreaks" = "warpBreaks" + 1 WHERE "loomId" = 'n1'`);
    await book.data.query(
      `UPDATE "signed_totals" SET "totals" = replace("totals", '"warpBreaks":', '"warpBreaks":9')`,
    );
    const rebuilt = await book.writer.write(rebuildBook);
    expect(rebuilt.different.length).toBeGreaterThan(0);
    expect(rebuilt.different.every((name) => /^loom_line .* n1$/.test(name))).toBe(true);
    expect(rebuilt.unlikeSigned.length).toBeGreaterThan(0);
    expect(await dump(book)).toEqual(before);
  });
});
