import type { SyncState } from '../offline/sync-state';
import { syncWords } from './sync-words';

const at = (hours: number, minutes: number, day = 12) => new Date(2026, 4, day, hours, minutes).getTime();
const NOW = at(10, 30);

function saidOf(over: Partial<SyncState>) {
  const state: SyncState = {
    kind: 'in-book',
    waiting: 0,
    needsLook: 0,
    photos: 0,
    lastReachedAt: at(10, 12),
    nextTryAt: null,
    online: true,
    code: null,
    sentence: null,
    ...over,
  };
  return syncWords(state, NOW);
}

function words(over: Partial<SyncState>): string {
  const { first, rest, tone } = saidOf(over);
  return `${tone}: ${first}${rest ? ` · ${rest}` : ''}`;
}

describe('syncWords', () => {
  it('says when the book was last reached, with the day where it was another', () => {
    expect(words({})).toBe('calm: In the book · 10:12');
    expect(words({ lastReachedAt: at(23, 5, 11) })).toBe('calm: In the book · Mon 11 May, 23:05');
  });

  it('never says a moment that is still to come', () => {
    expect(words({ lastReachedAt: at(14, 2) })).toBe('calm: In the book · 10:30');
    expect(words({ kind: 'offline', online: false, lastReachedAt: at(9, 0, 13) })).toBe(
      'look: Book out of reach · since 10:30',
    );
  });

  it('counts photos beside entries: what waits is not in the book', () => {
    const since = { lastReachedAt: at(9, 41) };
    expect(words({ kind: 'waiting', photos: 1, ...since })).toBe(
      'look: 1 photo waiting · book last reached 09:41',
    );
    expect(words({ kind: 'offline', waiting: 7, photos: 2, online: false, ...since })).toBe(
      'look: 7 and 2 photos waiting · book last reached 09:41',
    );
    expect(words({ kind: 'sending', photos: 2 })).toBe('calm: Sending 2 photos');
    expect(words({ kind: 'needs-look', needsLook: 1, photos: 2 })).toBe(
      'now: 1 needs a look · 2 photos waiting',
    );
  });

  it('counts what waits, and never calls it sent', () => {
    expect(words({ kind: 'waiting', waiting: 7, lastReachedAt: at(9, 41) })).toBe(
      'look: 7 waiting · book last reached 09:41',
    );
    expect(words({ kind: 'offline', waiting: 7, online: false, lastReachedAt: at(9, 41) })).toBe(
      'look: 7 waiting · book last reached 09:41',
    );
    expect(words({ kind: 'sending', waiting: 7 })).toBe('calm: Sending 7');
    expect(words({ kind: 'sending', waiting: 20_000 })).toBe('calm: Sending 20,000');
    expect(words({ kind: 'needs-look', needsLook: 1_200, waiting: 20_000 })).toBe(
      'now: 1,200 need a look · 20,000 waiting',
    );
    for (const kind of ['waiting', 'sending', 'offline', 'needs-look'] as const)
      expect(words({ kind, waiting: 3, needsLook: 1 })).not.toMatch(/in the book|sent\b/i);
  });

  it('still says when the book was last reached where there is little room', () => {
    expect(saidOf({ kind: 'offline', waiting: 1, online: false, lastReachedAt: at(9, 41) }).short).toBe(
      '09:41',
    );
    expect(saidOf({ kind: 'offline', waiting: 1, lastReachedAt: at(23, 5, 11) }).short).toBe('11 May');
    expect(saidOf({ kind: 'needs-look', needsLook: 1, online: false, lastReachedAt: at(9, 41) }).short).toBe(
      '09:41',
    );
    expect(saidOf({ kind: 'offline', waiting: 1, lastReachedAt: null }).short).toBe('');
  });

  it('counts entries and photos together where there is little room', () => {
    expect(saidOf({ kind: 'offline', waiting: 2, photos: 1, online: false }).brief).toBe('3 waiting');
    expect(saidOf({ kind: 'waiting', photos: 1 }).brief).toBe('');
    expect(saidOf({ kind: 'needs-look', needsLook: 1, waiting: 2, photos: 1 }).brief).toBe('');
  });

  it('says since when the book is out of reach', () => {
    expect(words({ kind: 'offline', online: false, lastReachedAt: at(9, 41) })).toBe(
      'look: Book out of reach · since 09:41',
    );
    expect(words({ kind: 'offline', online: false, lastReachedAt: null })).toBe(
      'look: Book out of reach · not reached yet',
    );
    expect(words({ kind: 'waiting', lastReachedAt: null })).toBe('calm: Book not reached yet');
  });

  it('puts what needs a look before what mends itself', () => {
    expect(words({ kind: 'needs-look', needsLook: 1 })).toBe('now: 1 needs a look');
    expect(words({ kind: 'needs-look', needsLook: 2, waiting: 5 })).toBe('now: 2 need a look · 5 waiting');
  });
});
