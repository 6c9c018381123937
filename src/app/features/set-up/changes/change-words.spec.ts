import type { RecordedChange } from '@shared/contract/set-up';
import { differences, headlineOf, wholeWords } from './change-words';

const namer = {
  nameOf: (id: string) => ({ 'shed-1': 'Long shed' })[id] ?? null,
  moment: (at: number) => `at ${at}`,
};
const change: RecordedChange = {
  seq: 7,
  at: 1_800_000_000_000,
  by: 'maud',
  byName: 'Maud Manager',
  what: 'loom',
  name: 'Loom 14',
  action: 'changed',
  effectiveAt: 1_800_000_000_000,
  before: { ppm: 180, shuttles: 1, clock: { kind: 'continuous', unit: 100, digits: 5 }, until: null },
  after: {
    ppm: 190,
    shuttles: 1,
    clock: { kind: 'continuous', unit: 100, digits: 6 },
    until: 1_800_000_000_000,
  },
  reason: null,
};

describe('a change in words', () => {
  it('names what is other than before, and nothing else', () => {
    expect(headlineOf(change)).toBe('Loom 14: changed');
    expect(differences(change, namer)).toEqual([
      { field: 'Speed, picks/min', before: '180', after: '190' },
      {
        field: 'Pick clock',
        before: 'kind continuous, unit 100, digits 5',
        after: 'kind continuous, unit 100, digits 6',
      },
      { field: 'Until', before: 'none', after: 'at 1800000000000' },
    ]);
  });

  it('says what was carried out, and that no shed in particular is all of them', () => {
    const recalculated = { ...change, what: 'recalculation', name: 'Long shed', action: 'command' } as const;
    expect(headlineOf(recalculated)).toBe('Long shed: closed shifts recalculated');
    expect(wholeWords({ ...change, before: null, after: { shedIds: [] } }, namer)).toBe('Sheds all');
  });

  it('names things, days and what was added or removed', () => {
    const added = {
      ...change,
      before: null,
      after: { shedId: 'shed-1', weekdays: [1, 5], tacklerIds: [], newThing: true },
    };
    expect(differences(added, namer)).toEqual([
      { field: 'Shed', before: '', after: 'Long shed' },
      { field: 'Days', before: '', after: 'Mon, Fri' },
      { field: 'Tacklers', before: '', after: 'none' },
      { field: 'New thing', before: '', after: 'yes' },
    ]);
    expect(wholeWords(change, namer)).toBe('');
    expect(wholeWords(added, namer)).toBe('Shed Long shed · Days Mon, Fri · Tacklers none · New thing yes');
    expect(differences({ ...added, before: added.after, after: null }, namer)[0]).toEqual({
      field: 'Shed',
      before: 'Long shed',
      after: '',
    });
  });
});
