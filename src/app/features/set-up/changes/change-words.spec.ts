import type { RecordedChange } from '@shared/contract/set-up';
import { differences, headlineOf, wholeWords } from './change-words';

const namer = {
  units: 'metric' as const,
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

  it.each([
    ['tablet', 'Alley A', 'Tablet Alley A: added'],
    ['alley', 'Alley A', 'Alley A: added'],
    ['cloth', 'Glebe 42', 'Cloth Glebe 42: added'],
    ['pattern', 'Night', 'Shift pattern Night: added'],
    ['person', 'Maud Lee', 'Maud Lee: added'],
  ])('says what kind of thing %s %s is', (what, name, words) => {
    expect(headlineOf({ ...change, what, name, action: 'added' })).toBe(words);
  });

  it.each([
    ['crimp', 0.06, 'Crimp', '6%', '6%'],
    ['reedWidthCm', 168, 'Reed width', '168 cm', '66.14 in'],
    ['picksPerCmOnLoom', 18, 'Picks on the loom', '18 per cm', '45.72 per in'],
    ['lengthM', 914.4, 'Length', '914.4 m', '1,000 yd'],
  ])('shows %s in the mill’s units', (key, value, field, metric, imperial) => {
    const added: RecordedChange = { ...change, before: null, after: { [key]: value } };
    const said = (units: 'metric' | 'imperial') => differences(added, { ...namer, units });
    expect(said('metric')).toEqual([{ field, before: '', after: metric }]);
    expect(said('imperial')).toEqual([{ field, before: '', after: imperial }]);
  });

  it('shows the wefts within a cloth so too', () => {
    const wefts = [{ name: 'Ecru 25', tex: 25, share: 1, waste: 0.02, pernMassG: 30 }];
    expect(wholeWords({ ...change, before: null, after: { wefts } }, namer)).toBe(
      'Wefts name Ecru 25, count 25 tex, share 100%, waste 2%, weft on a full pern 30 g',
    );
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
