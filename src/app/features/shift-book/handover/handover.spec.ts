import { resolveCorrections, isKind, type ResolvedOf } from '@shared/entries/corrections';
import type { BookEntry, Entry } from '@shared/entries/entry';
import { projectLine } from '@shared/entries/projection';
import { aLineInput, aShift, at, entryBuilder, LOOM_ID } from '@shared/testing/builders';
import { aReference } from '../testing/a-record';
import { sayBy } from '../say';
import { handoverOf, shiftBefore } from './handover';

const { entry } = entryBuilder();
const book = (of: Entry): BookEntry => ({ entry: of, at: of.at, until: null, shiftKey: aShift().key });
const reference = aReference();

function told(...entries: Entry[]) {
  const books = entries.map(book);
  const resolved = resolveCorrections(books).sort((a, b) => a.at - b.at);
  const events = {
    notes: resolved.filter((one): one is ResolvedOf<'note'> => isKind(one, 'note')),
    repairs: resolved.filter((one): one is ResolvedOf<'repair'> => isKind(one, 'repair')),
  };
  const lines = [projectLine(aLineInput({ entries: books }))];
  return handoverOf(events, lines, reference.looms, sayBy(reference, []));
}

describe('the handover of a shift', () => {
  it('watches what stands, what was repaired to be watched, and what the foreman says', () => {
    const { watch } = told(
      entry('standing', 400, { cause: 'picking' }),
      entry('repair', 100, { cause: 'checking', ran: 'watch' }),
      entry('repair', 110, { cause: 'checking', ran: 'well' }),
      entry('note', 120, { about: 'watch', text: 'the let-off slips', loomId: LOOM_ID }),
    );
    const words = watch.map((one) => one.words);
    expect(words).toHaveLength(3);
    expect(words).toContain('the let-off slips');
    expect(words.some((one) => one.startsWith('stands since'))).toBe(true);
    expect(words.some((one) => one.includes('runs, to be watched'))).toBe(true);
  });

  it('takes near misses from repairs and notes, and the last humidity', () => {
    const found = told(
      entry('repair', 100, { cause: 'shuttle-flew', nearMiss: 'past the weaver’s head' }),
      entry('note', 110, { about: 'near-miss', text: 'oil on the floor of alley B' }),
      entry('note', 120, { about: 'humidity', text: '61' }),
      entry('note', 130, { about: 'humidity', text: '64.5' }),
    );
    expect(found.nearMisses.map(({ words }) => words)).toEqual([
      expect.stringContaining('past the weaver’s head'),
      'oil on the floor of alley B',
    ]);
    expect(found.humidity?.text).toBe('64.5');
    expect(told().nearMisses).toEqual([]);
  });

  it('knows who read the last words, not the first', () => {
    const first = entry('note', 400, { about: 'handover', text: 'First words' });
    const second = entry('note', 410, { about: 'handover', text: 'Better words' });
    const read = entry('note', 405, { about: 'read', text: 'Read', noteId: first.id });
    expect(told(first, read).note?.readBy).toHaveLength(1);
    expect(told(first, read, second).note).toMatchObject({ words: 'Better words', readBy: [] });
  });

  it('is read from the shift that ended last before', () => {
    const early = aShift({ key: 'a', startsAt: at(-960), endsAt: at(-480) });
    const night = aShift({ key: 'b', startsAt: at(-480), endsAt: at(0) });
    const now = aShift({ key: 'c' });
    expect(shiftBefore([now, early, night], now)?.key).toBe('b');
    expect(shiftBefore([now], now)).toBeNull();
  });
});
