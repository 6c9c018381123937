import { describe, expect, it } from 'vitest';
import { REPEAT_SHIFTS, repeatsAmong } from './repeats.js';

const repair = (id: string, shift: number, cause = 'picking') => ({ id, cause, shift });

describe('repeats among repairs', () => {
  it('are counted from the first, both shifts among them', () => {
    const repeats = repeatsAmong([repair('a', 4), repair('b', 4, 'temple'), repair('c', 9), repair('d', 12)]);
    expect([...repeats]).toEqual([
      ['c', { nth: 2, shifts: 6 }],
      ['d', { nth: 3, shifts: 9 }],
    ]);
  });

  it('twice in one shift is a repeat in one shift', () => {
    expect(repeatsAmong([repair('a', 3), repair('b', 3)]).get('b')).toEqual({ nth: 2, shifts: 1 });
  });

  it('begin anew where the last lies too long ago', () => {
    const at = (shift: number) => repeatsAmong([repair('a', 0), repair('b', shift)]).get('b');
    expect(at(REPEAT_SHIFTS - 1)).toEqual({ nth: 2, shifts: REPEAT_SHIFTS });
    expect(at(REPEAT_SHIFTS)).toBeUndefined();
  });
});
