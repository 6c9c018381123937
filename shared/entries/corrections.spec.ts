import { describe, expect, it } from 'vitest';
import { aShift, at, bookOf, entryBuilder, uuidV7 } from '../testing/builders.js';
import { isKind, resolveCorrections } from './corrections.js';
import type { BookEntry } from './entry.js';

/** The one root among the entries. */
function rootOf(entries: readonly BookEntry[]) {
  const [root, ...more] = resolveCorrections(entries);
  expect(more).toEqual([]);
  return root!;
}

function aStop() {
  const { book, entry } = entryBuilder();
  const stop = book('stop', 10, { cause: 'weft-break', count: 1 });
  const targetId = stop.entry.id;
  return { book, entry, stop, targetId };
}

describe('resolveCorrections', () => {
  it('leaves an entry without corrections as it was logged', () => {
    const { stop } = aStop();
    expect(rootOf([stop])).toEqual({
      root: stop,
      entry: stop.entry,
      at: at(10),
      until: null,
      shiftKey: aShift().key,
      voided: false,
      history: [],
      correctedTwice: false,
      latestCorrectionId: null,
    });
  });

  it('sorts roots by id and counts an entry that comes twice once', () => {
    const { book } = entryBuilder();
    const [a, b] = [book('note', 1, { text: 'a' }), book('note', 2, { text: 'b' })];
    expect(resolveCorrections([b, a, b]).map((one) => one.root)).toEqual([a, b]);
  });

  it('amends only what the amendment names', () => {
    const { book, stop, targetId } = aStop();
    const amend = book('amend', 20, { targetId, change: { count: 3 } });
    const root = rootOf([amend, stop]);
    expect(root.entry).toEqual({ ...stop.entry, count: 3 });
    expect(root.root).toBe(stop);
    expect(root.history).toEqual([amend]);
    expect(root.latestCorrectionId).toBe(amend.entry.id);
    expect(root.correctedTwice).toBe(false);
  });

  it('adds up amendments that were made one upon the other', () => {
    const { book, stop, targetId } = aStop();
    const first = book('amend', 20, { targetId, change: { cause: 'warp-break', count: 2 } });
    const second = book('amend', 15, { targetId, basedOn: first.entry.id, change: { count: 4 } });
    const root = rootOf([second, first, stop]);
    expect(root.entry).toMatchObject({ cause: 'warp-break', count: 4 });
    expect(root.correctedTwice).toBe(false);
    expect(root.latestCorrectionId).toBe(second.entry.id);
  });

  it('voids', () => {
    const { book, stop, targetId } = aStop();
    expect(rootOf([stop, book('void', 20, { targetId })]).voided).toBe(true);
  });

  it('lets a descendant win, whatever its clock says', () => {
    const { book, stop, targetId } = aStop();
    const amend = book('amend', 30, { targetId, change: { count: 2 } });
    const voids = book('void', 20, { targetId, basedOn: amend.entry.id });
    expect(rootOf([stop, amend, voids])).toMatchObject({ voided: true, correctedTwice: false });
  });

  it('brings an entry back by an amendment whose author had seen the void', () => {
    const { book, stop, targetId } = aStop();
    const voids = book('void', 20, { targetId });
    const amend = book('amend', 30, { targetId, basedOn: voids.entry.id, change: { count: 2 } });
    const root = rootOf([stop, voids, amend]);
    expect(root.voided).toBe(false);
    expect(root.entry).toMatchObject({ count: 2 });
  });

  it('falls back to the later moment where corrections fork, and says so', () => {
    const { book, stop, targetId } = aStop();
    const later = book('amend', 30, { targetId, change: { count: 7 } });
    const earlier = book('amend', 20, { targetId, change: { cause: 'smash' } });
    const root = rootOf([later, stop, earlier]);
    expect(root.entry).toMatchObject({ cause: 'weft-break', count: 7 });
    expect(root.correctedTwice).toBe(true);
    expect(root.history).toEqual([earlier, later]);
  });

  it.each([
    ['the device', { deviceId: 'tablet-2', deviceSeq: 1 }, { deviceId: 'tablet-1', deviceSeq: 9 }],
    ['its sequence', { deviceId: 'tablet-1', deviceSeq: 8 }, { deviceId: 'tablet-1', deviceSeq: 7 }],
  ])('falls back to %s where the moments are equal', (_, winner, loser) => {
    const { book, stop, targetId } = aStop();
    const wins = book('amend', 20, { targetId, change: { count: 5 }, ...winner });
    const loses = book('amend', 20, { targetId, change: { count: 6 }, ...loser });
    expect(rootOf([loses, stop, wins]).entry).toMatchObject({ count: 5 });
    expect(rootOf([wins, stop, loses]).entry).toMatchObject({ count: 5 });
  });

  it('flags a void and an amendment made without sight of each other, but not two voids that agree', () => {
    const { book, stop, targetId } = aStop();
    const voids = book('void', 20, { targetId });
    const amend = book('amend', 19, { targetId, change: { count: 2 } });
    expect(rootOf([stop, voids, amend])).toMatchObject({ voided: true, correctedTwice: true });
    expect(rootOf([stop, voids, book('void', 21, { targetId })])).toMatchObject({
      voided: true,
      correctedTwice: false,
    });
  });

  it('voids a whole batch with one entry, and nothing else', () => {
    const { book } = entryBuilder();
    const batchId = uuidV7(900);
    const together = [1, 2].map((minute) => book('stop', minute, { cause: 'smash', count: 1, batchId }));
    const apart = book('stop', 3, { cause: 'smash', count: 1, batchId: uuidV7(901) });
    const alone = book('stop', 4, { cause: 'smash', count: 1 });
    const voids = book('void', 5, { targetBatchId: batchId });
    const voided = resolveCorrections([voids, ...together, apart, alone]).map((one) => one.voided);
    expect(voided).toEqual([true, true, false, false]);
  });

  it('lets the target live again when its void is voided', () => {
    const { book, stop, targetId } = aStop();
    const amend = book('amend', 15, { targetId, change: { count: 2 } });
    const voids = book('void', 20, { targetId, basedOn: amend.entry.id });
    const undo = book('void', 25, { targetId: voids.entry.id });
    const root = rootOf([undo, voids, amend, stop]);
    expect(root).toMatchObject({ voided: false, latestCorrectionId: amend.entry.id });
    expect(root.entry).toMatchObject({ count: 2 });
    expect(root.history).toEqual([amend, voids]);
    const redo = book('void', 30, { targetId: undo.entry.id });
    expect(rootOf([redo, undo, voids, amend, stop]).voided).toBe(true);
  });

  it('takes a voided amendment back', () => {
    const { book, stop, targetId } = aStop();
    const first = book('amend', 15, { targetId, change: { count: 2 } });
    const second = book('amend', 16, { targetId, basedOn: first.entry.id, change: { cause: 'smash' } });
    const undo = book('void', 20, { targetId: first.entry.id });
    // What was based on it stands, without it.
    expect(rootOf([stop, first, second, undo]).entry).toMatchObject({ cause: 'smash', count: 1 });
  });

  it('lets corrections wait for a target that has not come', () => {
    const { book, stop, targetId } = aStop();
    const voids = book('void', 20, { targetId });
    const amend = book('amend', 21, { targetId, basedOn: uuidV7(800), change: { count: 2 } });
    expect(resolveCorrections([voids, amend])).toEqual([]);
    expect(rootOf([stop, amend]).entry).toMatchObject({ count: 2 });
  });

  it('ends on a ring of voids, and of basedOn, the same way whatever comes first', () => {
    const { book, stop, targetId } = aStop();
    const a = book('void', 20, { targetId, id: uuidV7(501) });
    const b = book('void', 21, { targetId: uuidV7(501), id: uuidV7(502) });
    const c = book('void', 22, { targetId: uuidV7(502), id: uuidV7(503) });
    const ring = [
      book('void', 1, { targetId: uuidV7(602), id: uuidV7(601) }),
      book('void', 2, { targetId: uuidV7(601), id: uuidV7(602) }),
    ];
    expect(rootOf([stop, a, b, c, ...ring]).voided).toBe(true);
    const x = book('amend', 30, { targetId, id: uuidV7(701), basedOn: uuidV7(702), change: { count: 8 } });
    const y = book('amend', 31, { targetId, id: uuidV7(702), basedOn: uuidV7(701), change: { count: 9 } });
    const [one, other] = [rootOf([stop, x, y]), rootOf([y, x, stop])];
    expect(one).toEqual(other);
    expect(one.entry).toMatchObject({ count: 9 });
    expect(one.correctedTwice).toBe(true);
  });

  it('does not let a void in a batch void itself or what it does not name', () => {
    const { book } = entryBuilder();
    const batchId = uuidV7(900);
    const stop = book('stop', 1, { cause: 'smash', count: 1, batchId });
    const voids = book('void', 2, { targetBatchId: batchId, batchId });
    expect(rootOf([stop, voids]).voided).toBe(true);
  });
});

describe('an amendment', () => {
  const { entry } = entryBuilder(100);

  function amended(root: BookEntry, change: Parameters<typeof entry<'amend'>>[2]['change'], clockOff = 0) {
    const amend = bookOf(entry('amend', 300, { targetId: root.entry.id, change }));
    const moved = {
      ...amend,
      changedAt: change.at === undefined ? null : change.at + clockOff,
      until: typeof change.until === 'number' ? change.until + clockOff : null,
    };
    return rootOf([root, moved]);
  }

  it('moves a stop by the corrected moment, and to the shift that the book found for it', () => {
    const { stop } = aStop();
    const moved = amended(stop, { at: at(-30) }, 5000);
    expect(moved.at).toBe(at(-30) + 5000);
    expect(moved.entry.at).toBe(at(-30));
    expect(moved.shiftKey).toBeNull();
  });

  it('leaves a reading with the shift that it names', () => {
    const { book } = entryBuilder();
    const reading = book('reading', 0, { boundary: 'start', value: 5 });
    const moved = amended(reading, { at: at(-30), value: 6, newValue: 1, kept: true, cause: 'smash' });
    expect(moved.shiftKey).toBe(aShift().key);
    expect(moved.entry).toEqual({ ...reading.entry, at: at(-30), value: 6, newValue: 1, kept: true });
  });

  it('gives a stop an end, moves it, and takes it away', () => {
    const { stop, book } = aStop();
    expect(amended(stop, { until: at(25) }, 700).until).toBe(at(25) + 700);
    const withEnd = book('stop', 40, { cause: 'smash', count: 1, until: at(50) });
    const open = amended(withEnd, { until: null });
    expect(open.until).toBeNull();
    expect(isKind(open, 'stop') && open.entry.until).toBeUndefined();
  });

  it('gives a standing stop an end, and a reading none', () => {
    const { book } = entryBuilder();
    expect(amended(book('standing', 10, { cause: 'smash' }), { until: at(20) }).until).toBe(at(20));
    expect(amended(book('reading', 0, { boundary: 'end', value: 1 }), { until: at(20) }).until).toBeNull();
  });

  it('changes of each kind what that kind has', () => {
    const { book } = entryBuilder();
    const change = {
      loomId: 'loom-9',
      cause: 'picking',
      count: 2,
      total: 7,
      clothId: 'cloth-9',
      warpId: null,
      note: 'said so',
      arisesFrom: 'yarn' as const,
    };
    const after = (root: BookEntry) => {
      const before = root.entry as Record<string, unknown>;
      const now = amended(root, change).entry as Record<string, unknown>;
      return Object.fromEntries(Object.entries(now).filter(([key, value]) => before[key] !== value));
    };
    const targetId = uuidV7(1);
    expect(after(book('stop', 1, { cause: 'smash', count: 1 }))).toEqual({
      loomId: 'loom-9',
      cause: 'picking',
      count: 2,
      arisesFrom: 'yarn',
      note: 'said so',
    });
    expect(after(book('standing', 1, { cause: 'smash' }))).toEqual({
      loomId: 'loom-9',
      cause: 'picking',
      arisesFrom: 'yarn',
      note: 'said so',
    });
    expect(after(book('shed-stop', 1, { cause: 'power', scope: { of: 'shed' } }))).toEqual({
      cause: 'picking',
    });
    expect(after(book('count', 1, { cause: 'pern-change', total: 1 }))).toEqual({
      loomId: 'loom-9',
      cause: 'picking',
      total: 7,
    });
    expect(after(book('repair', 1, { cause: 'boxes' }))).toEqual({ loomId: 'loom-9', cause: 'picking' });
    expect(after(book('warp-change', 1, { how: 'gaiting', warpId: 'w', clothId: 'c' }))).toEqual({
      loomId: 'loom-9',
      clothId: 'cloth-9',
      warpId: null,
    });
    expect(after(book('resume', 1, { targetId }))).toEqual({ loomId: 'loom-9' });
    expect(after(book('call', 1, {}))).toEqual({ loomId: 'loom-9' });
    expect(after(book('attend', 1, { targetId, step: 'take' }))).toEqual({ loomId: 'loom-9' });
    expect(after(book('sheet', 1, { counts: {}, minutes: {} }))).toEqual({ loomId: 'loom-9' });
    expect(after(book('note', 1, { text: 'x' }))).toEqual({ text: 'said so' });
    expect(after(book('assign', 1, { weaverId: null, loomIds: [] }))).toEqual({});
  });
});
