import type { Loom } from '../../../shared/contract/reference.js';

export interface WrongField {
  readonly path: string;
  readonly message: string;
}

/** Whether two looms are in use at some moment together. */
function together(one: Loom, other: Loom): boolean {
  return one.from < (other.until ?? Infinity) && other.from < (one.until ?? Infinity);
}

/**
 * What is wrong with where looms are to stand: in one shed no two looms that are in use at one time have the same
 * number, or the same place in the same row. `all`: every loom as it is to be; `asked`: where the form says each of
 * the looms that it is about.
 */
export function wrongPlaces(all: readonly Loom[], asked: ReadonlyMap<string, string>): WrongField[] {
  const wrong: WrongField[] = [];
  const byNumber = groups(all, ({ shedId, number }) => `${shedId} ${number}`);
  const byPlace = groups(all, ({ shedId, row, position }) => `${shedId} ${row} ${position}`);
  for (const loom of all) {
    const path = asked.get(loom.id);
    if (path === undefined) continue;
    const sameNumber = rivalOf(loom, byNumber.get(`${loom.shedId} ${loom.number}`));
    if (sameNumber)
      wrong.push({
        path: `${path}.number`,
        message: `The shed has a loom ${loom.number} already. Choose a number that no loom in use has.`,
      });
    const samePlace = rivalOf(loom, byPlace.get(`${loom.shedId} ${loom.row} ${loom.position}`));
    if (samePlace)
      wrong.push({
        path: `${path}.position`,
        message: `Loom ${samePlace.number} stands in row ${loom.row} at place ${loom.position}. Choose a free place.`,
      });
  }
  return wrong;
}

function rivalOf(loom: Loom, others: readonly Loom[] = []): Loom | undefined {
  return others.find((other) => other.id !== loom.id && together(loom, other));
}

function groups(looms: readonly Loom[], keyOf: (loom: Loom) => string): Map<string, Loom[]> {
  const byKey = new Map<string, Loom[]>();
  for (const loom of looms) {
    const key = keyOf(loom);
    const group = byKey.get(key);
    if (group) group.push(loom);
    else byKey.set(key, [loom]);
  }
  return byKey;
}
