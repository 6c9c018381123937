import type { Loom } from '@shared/contract/reference';
import type { FloorLoom } from './floor-loom';

/** A shed stop that some looms have not restarted after. */
export interface OpenShedStop {
  readonly id: string;
  readonly cause: string;
  readonly since: number;
  /** Those that still stand, by number. */
  readonly looms: readonly Loom[];
}

/** Shed stops that are open on some loom, the oldest first. */
export function openShedStops(looms: readonly FloorLoom[]): readonly OpenShedStop[] {
  const found = new Map<string, { cause: string; since: number; looms: Loom[] }>();
  for (const { line, loom, at } of looms)
    for (const stop of line.stops) {
      if (!stop.shedWide || !stop.timed || stop.until !== null || stop.from > at) continue;
      const known = found.get(stop.id) ?? { cause: stop.cause, since: stop.from, looms: [] };
      known.looms.push(loom);
      found.set(stop.id, known);
    }
  return [...found]
    .map(([id, one]) => ({ id, ...one, looms: one.looms.sort((a, b) => a.number - b.number) }))
    .sort((a, b) => a.since - b.since);
}
