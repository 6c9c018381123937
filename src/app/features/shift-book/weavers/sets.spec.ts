import type { Loom, PersonCard } from '@shared/contract/reference';
import { aShift } from '@shared/testing/builders';
import { assignments, lastSets, weaverSets, type Minded } from './sets';

const HOUR = 3_600_000;
const shift = aShift({ key: 's:3', startsAt: 48 * HOUR, endsAt: 56 * HOUR });
const yesterday = aShift({ key: 's:1', startsAt: 24 * HOUR, endsAt: 32 * HOUR });
const before = aShift({ key: 's:2', patternId: 'night', startsAt: 40 * HOUR, endsAt: 48 * HOUR });
const loom = (number: number): Loom => ({
  id: `loom-${number}`,
  shedId: shift.shedId,
  number,
  row: 1,
  position: number,
  alley: 'A',
  from: 0,
  until: null,
});
const LOOMS = Array.from({ length: 10 }, (_, i) => loom(i + 1));
const weaver = (id: string, usual: number): PersonCard => ({
  id,
  name: id,
  shortName: id,
  worksNumber: null,
  roles: ['weaver'],
  usualSet: LOOMS.slice(0, usual).map((one) => one.id),
});
const sets = (of: Readonly<Record<string, readonly number[]>>): Minded =>
  new Map(
    Object.entries(of).flatMap(([who, numbers]) =>
      numbers.map((number) => [`loom-${number}`, who === 'nobody' ? null : who] as const),
    ),
  );

describe('last shift’s sets', () => {
  it('are those of the last shift of the same pattern that had any', () => {
    const known = new Map([
      ['s:1', sets({ nuala: [1, 2] })],
      ['s:2', sets({ kit: [1, 2] })],
    ]);
    const found = lastSets([yesterday, before, shift], shift, (one) => known.get(one.key) ?? new Map());
    expect(found?.shift.key).toBe('s:1');
  });

  it('are another pattern’s where the own never had any, and none where nobody had', () => {
    const found = lastSets([yesterday, before, shift], shift, (one) =>
      one.key === 's:2' ? sets({ kit: [1] }) : sets({ nobody: [1] }),
    );
    expect(found?.shift.key).toBe('s:2');
    expect(lastSets([yesterday, before, shift], shift, () => new Map())).toBeNull();
  });
});

describe('weavers with their sets', () => {
  it('says who has too many, and who had looms last time and has none', () => {
    const minded = sets({ nuala: [1, 2, 3, 4, 5], kit: [7] });
    const found = weaverSets(
      [weaver('nuala', 2), weaver('kit', 1), weaver('amos', 2)],
      LOOMS,
      minded,
      sets({ amos: [8, 9] }),
    );
    expect(found.map(({ person, word, tooMany }) => [person.id, word, tooMany])).toEqual([
      ['amos', 'absent? Had 2 looms last time', false],
      ['kit', '', false],
      ['nuala', 'many: usually 2', true],
    ]);
  });

  it('takes eight as the most where nobody said what is usual', () => {
    const minded = (n: number) => sets({ kit: LOOMS.slice(0, n).map(({ number }) => number) });
    const of = (n: number) => weaverSets([weaver('kit', 0)], LOOMS, minded(n), new Map())[0];
    expect(of(8)?.tooMany).toBe(false);
    expect(of(9)?.tooMany).toBe(true);
  });
});

describe('assignments', () => {
  const was = sets({ nuala: [1, 2] });
  const becomes = sets({ nuala: [1, 3], kit: [2, 4] });
  const said = (now: number, fromStart = true) =>
    assignments(was, becomes, { shift, now, fromStart }).map((draft) => ('weaverId' in draft ? draft : null));

  it('gives a loom without a weaver from the start, and lets one change hands now', () => {
    const now = shift.startsAt + 3 * HOUR;
    expect(said(now)).toMatchObject([
      { weaverId: 'nuala', loomIds: ['loom-3'], at: shift.startsAt },
      { weaverId: 'kit', loomIds: ['loom-2'], at: now },
      { weaverId: 'kit', loomIds: ['loom-4'], at: shift.startsAt },
    ]);
    expect(said(now, false).map((draft) => draft?.at)).toEqual([now, now]);
  });

  it('is said now for a shift that has not begun', () => {
    const now = shift.startsAt - HOUR;
    expect(said(now).map((draft) => draft?.at)).toEqual([now, now]);
  });

  it('says nothing of what stays', () => {
    expect(assignments(was, was, { shift, now: shift.startsAt, fromStart: true })).toEqual([]);
    expect(
      assignments(was, sets({ nuala: [1, 2], nobody: [5] }), { shift, now: 0, fromStart: true }),
    ).toEqual([]);
  });
});
