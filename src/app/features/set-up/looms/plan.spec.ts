import { alleyCount, newPlaces, place, planOf, type NewPlaces, type PlannedLoom } from './plan';

const asked: NewPlaces = {
  firstNumber: 1,
  firstRow: 1,
  rows: 4,
  perRow: 6,
  direction: 'left',
  firstFaces: 'alley',
  alleys: [],
};
const looms: readonly PlannedLoom[] = newPlaces(asked).map((one) => ({ ...one, id: `loom-${one.number}` }));

describe('new looms on the floor', () => {
  it('stand two rows to an alley', () => {
    expect(looms).toHaveLength(24);
    expect(looms[6]).toMatchObject({ number: 7, row: 2, position: 1, alley: 'A' });
    expect(looms[12]).toMatchObject({ number: 13, row: 3, position: 1, alley: 'B' });
  });

  it('are numbered there and back, or from the right', () => {
    const toAndFro = newPlaces({ ...asked, direction: 'to-and-fro' });
    expect(toAndFro[6]).toMatchObject({ number: 7, row: 2, position: 6 });
    expect(newPlaces({ ...asked, direction: 'right' })[0]).toMatchObject({ number: 1, position: 6 });
  });

  it('have an alley each side where the first row stands at the wall; letters go on after the names', () => {
    const walled = { ...asked, firstFaces: 'wall', alleys: ['North', 'A'] } as const;
    expect(alleyCount(walled)).toBe(3);
    expect(newPlaces(walled).map((one) => one.alley)).toEqual([
      ...Array.from({ length: 6 }, () => 'North'),
      ...Array.from({ length: 12 }, () => 'A'),
      ...Array.from({ length: 6 }, () => 'B'),
    ]);
  });

  it('stand at alleys of their own, unless one that is there is named', () => {
    const more = { ...asked, firstRow: 5, firstNumber: 25, rows: 2, taken: ['A', 'B'] };
    expect(new Set(newPlaces(more).map((one) => one.alley))).toEqual(new Set(['C']));
    expect(new Set(newPlaces({ ...more, alleys: ['B'] }).map((one) => one.alley))).toEqual(new Set(['B']));
  });
});

describe('the plan', () => {
  it('has alleys between rows that share one, and backs', () => {
    expect(planOf(looms, false).map((row) => row.beyond)).toEqual(['alley', 'back', 'alley', 'wall']);
  });

  it('has room to put a loom: a row and a place more', () => {
    const plan = planOf(looms, true);
    expect(plan).toHaveLength(5);
    expect(plan[0]?.cells).toHaveLength(7);
    expect(plan[4]?.cells.every((cell) => cell.loom === null)).toBe(true);
  });

  it('moves a loom to a free place, which has that row’s alley', () => {
    const moved = place(looms, 'loom-1', { row: 3, position: 7 });
    expect(moved.find((loom) => loom.id === 'loom-1')).toMatchObject({
      number: 1,
      row: 3,
      position: 7,
      alley: 'B',
    });
    expect(planOf(moved, false)[0]?.cells[0]?.loom).toBeNull();
  });

  it('lets two looms change places', () => {
    const moved = place(looms, 'loom-1', { row: 4, position: 2 });
    expect(moved.find((loom) => loom.id === 'loom-20')).toMatchObject({ row: 1, position: 1, alley: 'A' });
    expect(moved.find((loom) => loom.id === 'loom-1')).toMatchObject({ row: 4, position: 2, alley: 'B' });
  });
});
