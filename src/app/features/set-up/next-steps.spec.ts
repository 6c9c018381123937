import type { SetUp } from '@shared/contract/set-up';
import { stepsOf, type Beside } from './next-steps';
import { ROOM_GROUPS } from './rooms';

const EMPTY: SetUp = {
  mill: { name: 'Mill', timeZone: 'Europe/London', units: 'metric' },
  sheds: [],
  looms: [],
  loomVersions: [],
  alleys: [],
  cloths: [],
  clothVersions: [],
  beams: [],
  causeVersions: [],
  targets: [],
  parts: [],
  jobs: [],
  patterns: [],
  calendar: [],
  shifts: [],
};
const NOTHING: Beside = { weavers: 0, tablets: 0, fitted: 0, nextShift: '', hasBegun: false };
const next = (setUp: SetUp, beside = NOTHING) => stepsOf(setUp, beside).find((step) => !step.done)?.id;
const shed = { id: 'shed-1', name: 'Long shed' };
const loom = (number: number, until: number | null = null) => ({
  id: `loom-${number}`,
  shedId: 'shed-1',
  number,
  row: 1,
  position: number,
  alley: 'A',
  from: 0,
  until,
});

describe('the next sensible step', () => {
  it('leads an empty mill to its first shift', () => {
    expect(next(EMPTY)).toBe('shed');
    const withShed = { ...EMPTY, sheds: [shed] };
    expect(next(withShed)).toBe('looms');
    expect(next({ ...withShed, looms: [loom(1, 5)] })).toBe('looms');
    const withLooms = { ...withShed, looms: [loom(1), loom(2)] };
    expect(next(withLooms)).toBe('shifts');
    const pattern = { id: 'early', shedId: 'shed-1', from: null, until: null, name: 'Early' };
    const facts = { startsLocal: '06:00', endsLocal: '14:00', weekdays: [1], meal: null };
    const withShifts = { ...withLooms, patterns: [{ ...pattern, ...facts }] };
    expect(next(withShifts)).toBe('cloths');
    const withCloth = { ...withShifts, cloths: [{ id: 'twill', name: 'Twill' }] };
    expect(next(withCloth)).toBe('on-looms');
    expect(next(withCloth, { ...NOTHING, fitted: 1 })).toBe('on-looms');
    expect(next(withCloth, { ...NOTHING, fitted: 2 })).toBe('people');
    expect(next(withCloth, { ...NOTHING, fitted: 2, weavers: 1 })).toBe('tablet');
    expect(next(withCloth, { ...NOTHING, fitted: 2, weavers: 1, tablets: 1 })).toBe('first-shift');
  });
});

describe('the rooms', () => {
  const missing = (setUp: SetUp) =>
    ROOM_GROUPS.flatMap(({ rooms }) => rooms.map((room) => room.missing(setUp))).filter(Boolean);

  it('say what they lack', () => {
    expect(missing(EMPTY)).toEqual(['no shed yet', 'no cloth yet']);
    expect(missing({ ...EMPTY, sheds: [shed], cloths: [{ id: 'a', name: 'A', retired: true }] })).toEqual([
      'no loom yet',
      'no cloth yet',
      'no shift yet',
    ]);
  });
});
