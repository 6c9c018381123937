import { resolveCorrections } from '@shared/entries/corrections';
import type { BookEntry } from '@shared/entries/entry';
import { entryBuilder } from '@shared/testing/builders';
import { openCallsOf, unwrittenCallsOf } from './tackler-calls';

const { book } = entryBuilder();
const TOM = 'tom';
const standing = book('standing', 10, { cause: 'picking' });
const call = book('call', 12, { targetId: standing.entry.id, words: 'Bangs off' });
const attend = (minutes: number, step: 'take' | 'arrive' | 'done' | 'leave', by = TOM) =>
  book('attend', minutes, { targetId: call.entry.id, step, by });
const resolved = (...entries: BookEntry[]) =>
  resolveCorrections([standing, call, ...entries]).sort((a, b) => a.at - b.at);
const open = new Set([standing.entry.id]);

describe('calls as the tackler sees them', () => {
  it('wait, are taken by somebody, and are waited on', () => {
    expect(openCallsOf(resolved(), open)).toMatchObject([
      { id: call.entry.id, words: 'Bangs off', step: null, takenBy: null },
    ]);
    const [taken] = openCallsOf(resolved(attend(14, 'take')), open);
    expect(taken).toMatchObject({ step: 'take', takenBy: TOM });
    const [there] = openCallsOf(resolved(attend(14, 'take'), attend(16, 'arrive', '-')), open);
    expect(there).toMatchObject({ step: 'arrive', takenBy: '-' });
  });

  it('that were left undone wait again', () => {
    const [waits] = openCallsOf(resolved(attend(14, 'take'), attend(15, 'leave')), open);
    expect(waits).toMatchObject({ step: null, takenBy: null, stepAt: null });
  });

  it('are over when done, taken back, or the loom runs', () => {
    expect(openCallsOf(resolved(attend(20, 'done')), open)).toEqual([]);
    expect(openCallsOf(resolved(), new Set())).toEqual([]);
    const back = book('void', 13, { targetId: call.entry.id, reason: 'Runs' });
    expect(openCallsOf(resolved(back), open)).toEqual([]);
  });

  it('a step taken back is none', () => {
    const take = attend(14, 'take');
    const back = book('void', 15, { targetId: take.entry.id, reason: 'Wrong loom' });
    expect(openCallsOf(resolved(take, back), open)).toMatchObject([{ step: null }]);
  });

  it('stay to be written down by whoever was there, until a repair names them', () => {
    const unwritten = (entries: BookEntry[], stops = open, since = 0) =>
      unwrittenCallsOf(resolved(...entries), stops, TOM, since).map(({ id }) => id);
    const done = [attend(14, 'take'), attend(16, 'arrive'), attend(20, 'done')];
    expect(unwritten(done)).toEqual([call.entry.id]);
    // The weaver had it running before he said that he was done.
    expect(unwritten(done.slice(0, 2), new Set())).toEqual([call.entry.id]);
    expect(unwritten(done.slice(0, 2))).toEqual([]);
    expect(unwritten(done.slice(0, 1), new Set())).toEqual([]);
    expect(unwritten([attend(20, 'done', 'another')])).toEqual([]);
    expect(unwritten([...done, book('repair', 22, { targetId: call.entry.id, cause: 'picking' })])).toEqual(
      [],
    );
    expect(unwritten(done, open, Number.MAX_SAFE_INTEGER)).toEqual([]);
  });
});
