import 'fake-indexeddb/auto';
import type { Entry } from '@shared/entries/entry';
import { aShift } from '@shared/testing/builders';
import { anUnnumbered, aPull, MORNING, pulled } from '../testing/entry-builders';
import { quotaExceeded, WatchedFactory } from '../testing/watched-factory';
import { BookStore } from './book-store';
import { LocalDatabase } from './local-database';
import { numberEntry } from './entry-draft';

function entries(count: number): Entry[] {
  return Array.from({ length: count }, (_, i) => numberEntry(anUnnumbered(), i + 1));
}

function setUp() {
  const watched = new WatchedFactory();
  return { watched, book: new BookStore(new LocalDatabase(watched.factory)) };
}

describe('BookStore.apply', () => {
  it('stores a pull and its cursor in one transaction', async () => {
    const { watched, book } = setUp();
    await book.apply(aPull({ cursor: 'e.s.3.z', entries: entries(3).map((entry) => pulled(entry)) }));
    expect(watched.happened.filter((what) => what === 'complete')).toHaveLength(1);
    expect(await book.cursor()).toBe('e.s.3.z');
    expect((await book.load()).entries).toHaveLength(3);
  });

  it('never has a cursor ahead of its data: a pull that breaks off leaves the one before', async () => {
    const { watched, book } = setUp();
    const [kept, ...more] = entries(4);
    await book.apply(aPull({ cursor: 'first', entries: [pulled(kept!)] }));
    for (const failing of ['entries', 'facts']) {
      let puts = 0;
      watched.beforePut = (store) => {
        if (store === failing && ++puts === (failing === 'entries' ? 2 : 1)) throw quotaExceeded();
      };
      await expect(
        book.apply(aPull({ cursor: 'second', snapshot: true, entries: more.map((entry) => pulled(entry)) })),
      ).rejects.toMatchObject({ name: 'QuotaExceededError' });
      watched.beforePut = () => undefined;
      expect(await book.cursor()).toBe('first');
      expect((await book.load()).entries.map(({ entry }) => entry['id'])).toEqual([kept!.id]);
    }
  });

  it('forgets the old book at a snapshot', async () => {
    const { book } = setUp();
    const [old, fresh] = entries(2);
    await book.apply(aPull({ entries: [pulled(old!)], people: [] }));
    await book.apply(aPull({ snapshot: true, entries: [pulled(fresh!)] }));
    expect((await book.load()).entries.map(({ entry }) => entry['id'])).toEqual([fresh!.id]);
  });

  it('replaces a loom’s fittings by those that are pulled', async () => {
    const { book } = setUp();
    const fitting = (id: string, loomId: string) => ({
      id,
      loomId,
      effectiveAt: MORNING,
      warpId: null,
      clothId: 'cloth-1',
      how: 'gaiting' as const,
    });
    await book.apply(aPull({ fittings: [fitting('a', 'loom-1'), fitting('b', 'loom-2')] }));
    await book.apply(aPull({ fittings: [fitting('c', 'loom-1')] }));
    expect((await book.load()).fittings.map(({ id }) => id).sort()).toEqual(['b', 'c']);
    // The last of a loom was taken back: nothing is left to name it by.
    await book.apply(aPull({ fittingsOf: ['loom-1'] }));
    expect((await book.load()).fittings.map(({ id }) => id)).toEqual(['b']);
  });

  it('forgets shifts that are no more', async () => {
    const { book } = setUp();
    const [early, late] = [aShift({ key: 'early' }), aShift({ key: 'late' })];
    await book.apply(aPull({ shifts: [early, late] }));
    await book.apply(aPull({ goneShifts: ['early', 'never-known'] }));
    expect((await book.load()).shifts).toEqual([late]);
  });

  it('drops what is older than a device needs', async () => {
    const { book } = setUp();
    const [old, fresh] = entries(2);
    await book.apply(aPull({ entries: [pulled(old!, { at: MORNING - 1 }), pulled(fresh!)] }));
    await book.prune(MORNING);
    expect((await book.load()).entries.map(({ entry }) => entry['id'])).toEqual([fresh!.id]);
  });
});
