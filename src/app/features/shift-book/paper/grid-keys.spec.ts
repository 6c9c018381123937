import { cellAfter, type Caret, type Grid } from './grid-keys';

/** Three looms, eight columns; the start of loom 1 is not known, of the others it is. */
const GRID: Grid = { rows: 3, columns: 8, first: (row) => (row === 0 ? 0 : 1) };
const INSIDE: Caret = { atStart: false, atEnd: false };
const press = (key: string, row: number, column: number, caret = INSIDE, more = {}) =>
  cellAfter({ key, shiftKey: false, ctrlKey: false, ...more }, { row, column }, caret, GRID);

describe('keys of the grid', () => {
  it('Enter goes along the card, and from its end to where the next card begins', () => {
    expect(press('Enter', 0, 1)).toEqual({ row: 0, column: 2 });
    expect(press('Enter', 0, 7)).toEqual({ row: 1, column: 1 });
    expect(press('Enter', 2, 7)).toBeNull();
    expect(press('Enter', 1, 0, INSIDE, { shiftKey: true })).toEqual({ row: 0, column: 7 });
    expect(press('Enter', 0, 0, INSIDE, { shiftKey: true })).toBeNull();
  });

  it('+ goes to the next card at once', () => {
    expect(press('+', 0, 3)).toEqual({ row: 1, column: 1 });
    expect(press('+', 2, 3)).toBeNull();
  });

  it('arrows go up and down, and sideways only from the edge of the text', () => {
    expect(press('ArrowDown', 0, 3)).toEqual({ row: 1, column: 3 });
    expect(press('ArrowUp', 0, 3)).toBeNull();
    expect(press('ArrowRight', 0, 3)).toBeNull();
    expect(press('ArrowRight', 0, 3, { atStart: false, atEnd: true })).toEqual({ row: 0, column: 4 });
    expect(press('ArrowLeft', 0, 3, { atStart: true, atEnd: false })).toEqual({ row: 0, column: 2 });
    expect(press('ArrowRight', 0, 7, { atStart: true, atEnd: true })).toBeNull();
  });

  it('leaves Tab, digits and the plain Home and End to the field', () => {
    for (const key of ['Tab', '5', 'Home', 'End', 'Backspace']) expect(press(key, 1, 1)).toBeNull();
    expect(press('Home', 2, 4, INSIDE, { ctrlKey: true })).toEqual({ row: 0, column: 0 });
    expect(press('End', 0, 4, INSIDE, { ctrlKey: true })).toEqual({ row: 2, column: 1 });
  });
});
