/** A cell of the grid: row and column, both from 0. */
export interface Cell {
  readonly row: number;
  readonly column: number;
}

/** A key as a keyboard event has it. */
export interface Key {
  readonly key: string;
  readonly shiftKey: boolean;
  readonly ctrlKey: boolean;
}

/** How the text in the cell is marked: whether the caret has text before it or behind it. */
export interface Caret {
  readonly atStart: boolean;
  readonly atEnd: boolean;
}

export interface Grid {
  readonly rows: number;
  readonly columns: number;
  /** The first column of a row that needs something: the start is often in the book. */
  readonly first: (row: number) => number;
}

/**
 * Where a key leads, as on a spreadsheet: Enter along the card and on to the next, + to the next card at once, arrows
 * up and down, and sideways from the edge of the text. Null: the key is the field's own (Tab is the browser's).
 */
export function cellAfter(key: Key, at: Cell, caret: Caret, grid: Grid): Cell | null {
  switch (key.key) {
    case 'Enter':
      return key.shiftKey ? before(at, grid) : after(at, grid);
    case '+':
      return nextCard(at.row, grid);
    case 'ArrowDown':
      return within({ ...at, row: at.row + 1 }, grid);
    case 'ArrowUp':
      return within({ ...at, row: at.row - 1 }, grid);
    case 'ArrowRight':
      return caret.atEnd ? within({ ...at, column: at.column + 1 }, grid) : null;
    case 'ArrowLeft':
      return caret.atStart ? within({ ...at, column: at.column - 1 }, grid) : null;
    case 'Home':
      return key.ctrlKey ? within({ row: 0, column: grid.first(0) }, grid) : null;
    case 'End':
      return key.ctrlKey ? within({ row: grid.rows - 1, column: grid.first(grid.rows - 1) }, grid) : null;
    default:
      return null;
  }
}

function after({ row, column }: Cell, grid: Grid): Cell | null {
  return column + 1 < grid.columns ? { row, column: column + 1 } : nextCard(row, grid);
}

function before({ row, column }: Cell, grid: Grid): Cell | null {
  if (column > 0) return { row, column: column - 1 };
  return row > 0 ? { row: row - 1, column: grid.columns - 1 } : null;
}

function nextCard(row: number, grid: Grid): Cell | null {
  return row + 1 < grid.rows ? { row: row + 1, column: grid.first(row + 1) } : null;
}

function within(cell: Cell, grid: Grid): Cell | null {
  const inside = cell.row >= 0 && cell.row < grid.rows && cell.column >= 0 && cell.column < grid.columns;
  return inside ? cell : null;
}
