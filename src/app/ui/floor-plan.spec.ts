import type { Loom } from '@shared/contract/reference';
import { floorPlan } from './floor-plan';

const loom = (number: number, row: number, position: number, alley: string): Loom => ({
  id: `loom-${number}`,
  shedId: 'shed-1',
  number,
  row,
  position,
  alley,
  from: 0,
  until: null,
});

describe('floorPlan', () => {
  it('lays an alley between two rows that share one, and backs between rows that do not', () => {
    const plan = floorPlan([
      loom(4, 3, 1, 'B'),
      loom(1, 1, 1, 'A'),
      loom(2, 2, 1, 'A'),
      loom(5, 4, 1, 'B'),
      loom(6, 5, 1, 'C'),
    ]);
    expect(plan.map(({ row, alley, beyond }) => [row, alley, beyond])).toEqual([
      [1, 'Alley A', 'alley'],
      [2, 'Alley A', 'back'],
      [3, 'Alley B', 'alley'],
      [4, 'Alley B', 'back'],
      [5, 'Alley C', 'wall'],
    ]);
  });

  it('stands the looms by their place and keeps an empty place', () => {
    const [row] = floorPlan([loom(9, 1, 5, 'A'), loom(7, 1, 1, 'A'), loom(8, 1, 2, 'A')]);
    expect(row?.looms.map(({ number }) => number)).toEqual([7, 8, 9]);
    expect(row?.places).toBe(5);
  });

  it('takes the alley of most looms of a row', () => {
    const [row] = floorPlan([loom(1, 1, 1, 'B'), loom(2, 1, 2, 'A'), loom(3, 1, 3, 'A')]);
    expect(row?.alley).toBe('Alley A');
  });

  it('names no alley where the mill has named none', () => {
    const plan = floorPlan([loom(1, 1, 1, ''), loom(2, 2, 1, '')]);
    expect(plan.map(({ alley, beyond }) => [alley, beyond])).toEqual([
      ['', 'back'],
      ['', 'wall'],
    ]);
  });

  it('is empty without looms', () => expect(floorPlan([])).toEqual([]));
});
