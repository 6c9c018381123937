import { describe, expect, it } from 'vitest';
import { at, entryBuilder } from '../testing/builders.js';
import { resolveStands } from './stands.js';

const LOOMS = [
  { id: 'loom-1', shedId: 'shed-1', row: 1 },
  { id: 'loom-2', shedId: 'shed-1', row: 1 },
  { id: 'loom-3', shedId: 'shed-1', row: 2 },
  { id: 'loom-4', shedId: 'shed-2', row: 1 },
];
const stands = (entries: Parameters<typeof resolveStands>[0]) => resolveStands(entries, LOOMS);

describe('resolveStands', () => {
  it('takes standing stops and stops with both ends, not taps', () => {
    const { book } = entryBuilder();
    const standing = book('standing', 10, { cause: 'smash' });
    const known = book('stop', 5, { cause: 'boxes', count: 1, until: at(9) });
    const tap = book('stop', 7, { cause: 'weft-break', count: 1 });
    expect(stands([standing, tap, known])).toEqual([
      { stopId: known.entry.id, loomId: 'loom-1', from: at(5), until: at(9), cause: 'boxes' },
      { stopId: standing.entry.id, loomId: 'loom-1', from: at(10), until: null, cause: 'smash' },
    ]);
  });

  it('ends a standing stop by the earliest resume in force', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash' });
    const targetId = stop.entry.id;
    const late = book('resume', 40, { targetId });
    const early = book('resume', 20, { targetId });
    const void_ = book('void', 50, { targetId: early.entry.id });
    const stranger = book('resume', 11, { targetId: tapId(book) });
    expect(stands([late, early, stop, stranger])[0]?.until).toBe(at(20));
    expect(stands([late, early, stop, void_])[0]?.until).toBe(at(40));
  });

  it('waits for a resume that comes before its stop', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash' });
    const resume = book('resume', 20, { targetId: stop.entry.id });
    expect(stands([resume])).toEqual([]);
    expect(stands([resume, stop])[0]?.until).toBe(at(20));
  });

  it('lets an amended end overrule the resumes, and a moved loom keep its end', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash' });
    const targetId = stop.entry.id;
    const resume = book('resume', 20, { targetId });
    const ended = book('amend', 60, { targetId, change: { until: at(15) } });
    expect(stands([stop, resume, ended])[0]?.until).toBe(at(15));
    const moved = book('amend', 61, { targetId, basedOn: ended.entry.id, change: { loomId: 'loom-2' } });
    expect(stands([stop, resume, ended, moved])).toMatchObject([{ loomId: 'loom-2', until: at(15) }]);
    const onlyMoved = book('amend', 62, { targetId, change: { loomId: 'loom-2' } });
    expect(stands([stop, resume, onlyMoved])).toMatchObject([{ loomId: 'loom-2', until: at(20) }]);
  });

  it('never ends a stop before it begins', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash' });
    const early = book('resume', 8, { targetId: stop.entry.id });
    expect(stands([stop, early])[0]?.until).toBe(at(10));
    const [later, last] = [30, 40].map((minute) => book('resume', minute, { targetId: stop.entry.id }));
    expect(stands([stop, early, last!, later!])[0]?.until).toBe(at(30));
    const sameMoment = book('resume', 10, { targetId: stop.entry.id });
    expect(stands([stop, early, later!, sameMoment])[0]?.until).toBe(at(10));
  });

  it('leaves voided stops out', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash' });
    expect(stands([stop, book('void', 11, { targetId: stop.entry.id })])).toEqual([]);
  });

  it.each([
    [{ of: 'shed' } as const, ['loom-1', 'loom-2', 'loom-3']],
    [{ of: 'row', row: 1 } as const, ['loom-1', 'loom-2']],
    [{ of: 'looms', loomIds: ['loom-3', 'loom-1', 'loom-3'] } as const, ['loom-1', 'loom-3']],
  ])('stops the looms of a shed stop, each once: %o', (scope, expected) => {
    const { book } = entryBuilder();
    const found = stands([
      book('shed-stop', 10, { cause: 'power', scope: scope as { of: 'shed' }, until: at(30) }),
    ]);
    expect(found.map((one) => one.loomId)).toEqual(expected);
    expect(found.every((one) => one.until === at(30))).toBe(true);
  });

  it('ticks looms off a shed stop one by one; its own end holds for the rest', () => {
    const { book } = entryBuilder();
    const power = book('shed-stop', 10, { cause: 'power', scope: { of: 'row', row: 1 } });
    const targetId = power.entry.id;
    const first = book('resume', 40, { targetId, loomId: 'loom-2' });
    expect(stands([power, first]).map((one) => one.until)).toEqual([null, at(40)]);
    const back = book('amend', 60, { targetId, change: { until: at(30) } });
    expect(stands([power, first, back]).map((one) => one.until)).toEqual([at(30), at(40)]);
  });
});

function tapId(book: ReturnType<typeof entryBuilder>['book']): string {
  return book('stop', 1, { cause: 'smash', count: 1 }).entry.id;
}
