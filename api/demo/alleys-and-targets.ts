import type { Alley, Target } from '../../shared/contract/reference.js';
import { CLOTH_IDS, DEMO_SHED } from './mill.js';
import { demoPeople } from './people.js';

/** A crew has one tackler, so each of them serves both alleys. */
export function demoAlleys(): Alley[] {
  const tacklerIds = demoPeople()
    .filter((person) => person.role === 'tackler')
    .map((person) => person.id);
  return ['A', 'B'].map((name) => ({ shedId: DEMO_SHED, name, tacklerIds }));
}

/** What the mill wants of each cloth, in the order of `CLOTH_IDS`: efficiency, breaks of warp and weft per 10⁵ picks. */
const WANTED = [
  [0.84, 6, 5],
  [0.82, 7, 5],
  [0.84, 6, 4],
  [0.8, 7, 6],
  [0.78, 9, 7],
] as const;

export function demoTargets(from: number): Target[] {
  return CLOTH_IDS.flatMap((clothId, i) => {
    const [efficiency, warpBreaks, weftBreaks] = WANTED[i] ?? [];
    if (efficiency === undefined) return [];
    return [{ id: `${clothId}.target`, clothId, effectiveAt: from, efficiency, warpBreaks, weftBreaks }];
  });
}
