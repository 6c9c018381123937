import type { Loom } from '@shared/contract/reference';

/** A row of looms as it stands, and what lies between it and the next one. */
export interface FloorRow {
  readonly row: number;
  /** In walking order. */
  readonly looms: readonly Loom[];
  /** Places of the row, empty ones among them: the farthest loom's. */
  readonly places: number;
  /** "Alley A"; a row may have none. */
  readonly alley: string;
  /** What lies between this row and the next: their common alley, the backs of two rows, or the wall. */
  readonly beyond: 'alley' | 'back' | 'wall';
}

/** The shed's floor: rows by number, an alley between two rows that share one. */
export function floorPlan(looms: readonly Loom[]): readonly FloorRow[] {
  const rows = new Map<number, Loom[]>();
  for (const loom of looms) rows.set(loom.row, [...(rows.get(loom.row) ?? []), loom]);
  const sorted = [...rows].sort(([a], [b]) => a - b);
  return sorted.map(([row, own], i) => {
    const next = sorted[i + 1]?.[1];
    const alley = commonAlley(own);
    return {
      row,
      looms: own.sort((a, b) => a.position - b.position),
      places: Math.max(...own.map((loom) => loom.position)),
      alley: alley === '' ? '' : `Alley ${alley}`,
      beyond: !next ? 'wall' : alley !== '' && commonAlley(next) === alley ? 'alley' : 'back',
    };
  });
}

/** The alley of most looms of a row: one loom may be turned round. */
function commonAlley(looms: readonly Loom[]): string {
  const counts = new Map<string, number>();
  for (const { alley } of looms) counts.set(alley, (counts.get(alley) ?? 0) + 1);
  return [...counts].reduce((best, one) => (one[1] > best[1] ? one : best), ['', 0])[0];
}
