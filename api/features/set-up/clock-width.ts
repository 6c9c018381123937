import type { EntityManager } from 'typeorm';
import type { LoomFacts } from '../../../shared/contract/set-up.js';
import { clockRange, isWideEnough } from '../../../shared/figures/pick-clock.js';
import { ShiftPatternRow } from '../../database/entities/index.js';
import { lengthOf } from './local-times.js';

/** Minutes that a clock must be wide enough for while the shed has no pattern yet. */
const COMMON_SHIFT = 8 * 60;

/** Minutes of a shed's longest pattern. */
export async function longestShift(tx: EntityManager, shedId: string): Promise<number> {
  const patterns = await tx.findBy(ShiftPatternRow, { shedId });
  return patterns.length === 0 ? COMMON_SHIFT : Math.max(...patterns.map(lengthOf));
}

/** Why a pick clock is too narrow for a shift of so many minutes; null: it is wide enough. */
export function whyTooNarrow(
  { clock, ppm }: Pick<LoomFacts, 'clock' | 'ppm'>,
  minutes: number,
): string | null {
  if (isWideEnough(clock, ppm, minutes)) return null;
  const shows = (clockRange(clock) * clock.unit).toLocaleString('en');
  const possible = Math.round(ppm * minutes).toLocaleString('en');
  const hours = Number((minutes / 60).toFixed(2));
  return (
    `This clock begins again after ${shows} picks, but a shift of ${hours} h can have ${possible} at ${ppm} picks/min. ` +
    'Give it more digits or a larger unit.'
  );
}
