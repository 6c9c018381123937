import { at, entryBuilder } from '@shared/testing/builders';
import { isFilter, passes } from './floor-filters';
import { aFloorLoom } from './testing/a-floor-loom';

describe('filters of the Floor', () => {
  const { book } = entryBuilder();
  const standing = book('standing', 10, { cause: 'smash' });

  it('let every loom through unless told otherwise', () => {
    expect(passes('all', aFloorLoom([], 5))).toBe(true);
    expect(passes('all', aFloorLoom([standing], 20))).toBe(true);
  });

  it('find the looms that stand', () => {
    expect(passes('standing', aFloorLoom([standing], 20))).toBe(true);
    expect(passes('standing', aFloorLoom([standing], 9))).toBe(false);
  });

  it('find looms of which nothing was heard for two hours, to the minute', () => {
    const tap = book('stop', 30, { cause: 'weft-break', count: 1 });
    expect(passes('quiet', aFloorLoom([tap], 149))).toBe(false);
    expect(passes('quiet', aFloorLoom([tap], 150))).toBe(true);
    expect(passes('quiet', aFloorLoom([], 119))).toBe(false);
    expect(passes('quiet', aFloorLoom([], 120))).toBe(true);
  });

  it('do not call a loom quiet that stands, or that ran again a while ago', () => {
    expect(passes('quiet', aFloorLoom([standing], 400))).toBe(false);
    const cleaned = book('stop', 20, { cause: 'cleaning', count: 1, until: at(100) });
    expect(passes('quiet', aFloorLoom([cleaned], 200))).toBe(false);
  });

  it('find looms below their cloth’s target, by the most that they can be', () => {
    // 120 minutes in, 60 of them cleaned: at most half of what is possible.
    const cleaned = book('stop', 20, { cause: 'cleaning', count: 1, until: at(80) });
    expect(passes('below-target', aFloorLoom([cleaned], 120, { target: 0.51 }))).toBe(true);
    expect(passes('below-target', aFloorLoom([cleaned], 120, { target: 0.5 }))).toBe(false);
    expect(passes('below-target', aFloorLoom([cleaned], 120))).toBe(false);
  });

  it('know their names', () => {
    expect(isFilter('quiet')).toBe(true);
    expect(isFilter('above-target')).toBe(false);
  });
});
