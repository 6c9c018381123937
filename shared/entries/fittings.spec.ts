import { describe, expect, it } from 'vitest';
import { at, entryBuilder } from '../testing/builders.js';
import { resolveFittings } from './fittings.js';

describe('resolveFittings', () => {
  it('makes a fitting of each warp change, by loom and moment, with corrections applied', () => {
    const { book } = entryBuilder();
    const first = book('warp-change', 90, { how: 'gaiting', warpId: 'warp-2', clothId: 'cloth-2' });
    const other = book('warp-change', 5, { how: 'as-found', warpId: null, clothId: 'c', loomId: 'loom-0' });
    const before = book('warp-change', 10, { how: 'knotting', warpId: 'warp-1', clothId: 'cloth-1' });
    const mistaken = book('warp-change', 20, { how: 'knotting', warpId: 'warp-9', clothId: 'cloth-9' });
    const fittings = resolveFittings([
      first,
      before,
      other,
      mistaken,
      book('void', 100, { targetId: mistaken.entry.id }),
      book('amend', 101, { targetId: first.entry.id, change: { warpId: 'warp-3', at: at(80) } }),
    ]);
    expect(fittings).toEqual([
      {
        id: other.entry.id,
        loomId: 'loom-0',
        effectiveAt: at(5),
        warpId: null,
        clothId: 'c',
        how: 'as-found',
      },
      {
        id: before.entry.id,
        loomId: 'loom-1',
        effectiveAt: at(10),
        warpId: 'warp-1',
        clothId: 'cloth-1',
        how: 'knotting',
      },
      {
        id: first.entry.id,
        loomId: 'loom-1',
        effectiveAt: at(80),
        warpId: 'warp-3',
        clothId: 'cloth-2',
        how: 'gaiting',
      },
    ]);
  });

  it('orders two of one moment by id', () => {
    const { book } = entryBuilder();
    const [a, b] = [1, 2].map(() =>
      book('warp-change', 10, { how: 'knotting', warpId: 'w', clothId: 'c' }),
    ) as [ReturnType<typeof book>, ReturnType<typeof book>];
    expect(resolveFittings([b, a]).map((one) => one.id)).toEqual([a.entry.id, b.entry.id]);
  });
});
