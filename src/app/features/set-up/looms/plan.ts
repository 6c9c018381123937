import type { LoomPlace } from '@shared/contract/set-up';

/** A loom as the plan shows it. */
export interface PlannedLoom extends LoomPlace {
  readonly id: string;
}

export interface PlanCell {
  readonly row: number;
  readonly position: number;
  /** Null: nothing stands there. */
  readonly loom: PlannedLoom | null;
}

export interface PlanRow {
  readonly row: number;
  /** The alley that most of the row's looms stand at; empty: none. */
  readonly alley: string;
  /** What lies between this row and the next. */
  readonly beyond: 'alley' | 'back' | 'wall';
  readonly cells: readonly PlanCell[];
}

/**
 * The floor as a grid: rows, and in each as many places as the longest has. `spare`: with an empty row and an empty
 * place at each row's end, so that there is somewhere to put a loom.
 */
export function planOf(looms: readonly PlannedLoom[], spare: boolean): readonly PlanRow[] {
  const known = [...new Set(looms.map((loom) => loom.row))].sort((a, b) => a - b);
  const last = known.at(-1) ?? 0;
  const rows = spare ? Array.from({ length: last + 1 }, (_, i) => i + 1) : known;
  const places = Math.max(0, ...looms.map((loom) => loom.position)) + (spare ? 1 : 0);
  const at = new Map(looms.map((loom) => [cellKey(loom), loom]));
  return rows.map((row, i) => {
    const alley = alleyOfRow(looms, row);
    const next = rows[i + 1];
    const beyond =
      next === undefined ? 'wall' : alley && alleyOfRow(looms, next) === alley ? 'alley' : 'back';
    const cells = Array.from({ length: places }, (_, place) => {
      const cell = { row, position: place + 1 };
      return { ...cell, loom: at.get(cellKey(cell)) ?? null };
    });
    return { row, alley, beyond, cells };
  });
}

/** The alley of most looms of a row: one loom may be turned round. */
export function alleyOfRow(looms: readonly PlannedLoom[], row: number): string {
  const counts = new Map<string, number>();
  for (const loom of looms) if (loom.row === row) counts.set(loom.alley, (counts.get(loom.alley) ?? 0) + 1);
  return [...counts].reduce((best, one) => (one[1] > best[1] ? one : best), ['', 0] as [string, number])[0];
}

/**
 * Puts a loom on a place: it takes the row's alley; whoever stands there takes its place in turn. In an empty row it
 * keeps its alley.
 */
export function place(
  looms: readonly PlannedLoom[],
  id: string,
  to: { readonly row: number; readonly position: number },
): readonly PlannedLoom[] {
  const moved = looms.find((loom) => loom.id === id);
  if (!moved || cellKey(moved) === cellKey(to)) return looms;
  const there = looms.find((loom) => cellKey(loom) === cellKey(to));
  const alleyAt = (row: number, own: PlannedLoom) =>
    row === own.row ? own.alley : alleyOfRow(looms, row) || own.alley;
  return looms.map((loom) => {
    if (loom.id === id) return { ...loom, ...to, alley: alleyAt(to.row, loom) };
    if (loom.id === there?.id)
      return { ...loom, row: moved.row, position: moved.position, alley: alleyAt(moved.row, loom) };
    return loom;
  });
}

const cellKey = ({ row, position }: { row: number; position: number }) => `${row}/${position}`;

export interface NewPlaces {
  readonly firstNumber: number;
  readonly firstRow: number;
  readonly rows: number;
  readonly perRow: number;
  /** Every row from the left, every row from the right, or there and back. */
  readonly direction: 'left' | 'right' | 'to-and-fro';
  /** Whether the first row looks at the second across an alley, or stands with its back to it. */
  readonly firstFaces: 'alley' | 'wall';
  /** Names of the alleys in order; where they run out, letters go on. */
  readonly alleys: readonly string[];
  /** Names of alleys that are there already: a letter that goes on is none of them. */
  readonly taken?: readonly string[];
}

/** Where new looms stand, in the order of their numbers. */
export function newPlaces(asked: NewPlaces): readonly LoomPlace[] {
  const names = alleyNames(asked);
  return Array.from({ length: asked.rows * asked.perRow }, (_, i) => {
    const inRow = i % asked.perRow;
    const row = Math.floor(i / asked.perRow);
    const fromRight = asked.direction === 'right' || (asked.direction === 'to-and-fro' && row % 2 === 1);
    return {
      number: asked.firstNumber + i,
      row: asked.firstRow + row,
      position: fromRight ? asked.perRow - inRow : inRow + 1,
      alley: names[alleyIndex(row, asked.firstFaces)] ?? 'A',
    };
  });
}

/** How many alleys so many rows stand at. */
export function alleyCount({ rows, firstFaces }: Pick<NewPlaces, 'rows' | 'firstFaces'>): number {
  return rows === 0 ? 0 : alleyIndex(rows - 1, firstFaces) + 1;
}

function alleyIndex(row: number, firstFaces: NewPlaces['firstFaces']): number {
  return Math.floor((firstFaces === 'alley' ? row : row + 1) / 2);
}

function alleyNames(asked: NewPlaces): readonly string[] {
  const names = [...asked.alleys];
  for (let letter = 0; names.length < alleyCount(asked); letter++) {
    const name = letterName(letter);
    if (!names.includes(name) && !asked.taken?.includes(name)) names.push(name);
  }
  return names;
}

/** A … Z, AA, AB … */
function letterName(index: number): string {
  const last = String.fromCharCode(65 + (index % 26));
  return index < 26 ? last : letterName(Math.floor(index / 26) - 1) + last;
}
