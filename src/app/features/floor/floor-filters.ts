import { isNoFigure } from '@shared/figures/no-figure';
import type { FloorLoom } from './floor-loom';

export const FLOOR_FILTERS = ['all', 'standing', 'below-target', 'quiet'] as const;
export type FloorFilter = (typeof FLOOR_FILTERS)[number];

/** A loom of which nothing is heard for so long runs very well, or nobody logs. */
const QUIET = 2 * 3_600_000;

export const FILTER_WORDS: Readonly<Record<FloorFilter, string>> = {
  all: 'All',
  standing: 'Standing now',
  'below-target': 'Below target',
  quiet: 'No stop for two hours',
};

/** What stands there when a filter finds nothing. */
export const NOTHING_FOUND: Readonly<Record<FloorFilter, string>> = {
  all: 'This shed has no looms yet.',
  standing: 'Every loom runs, as far as anybody has logged.',
  'below-target': 'No loom is below its cloth’s target, or the mill has set none.',
  quiet: 'Something was logged on every loom within two hours.',
};

export function passes(filter: FloorFilter, loom: FloorLoom): boolean {
  switch (filter) {
    case 'all':
      return true;
    case 'standing':
      return loom.standing !== null;
    case 'below-target':
      return isBelowTarget(loom);
    case 'quiet':
      return loom.standing === null && loom.at - loom.lastStop >= QUIET;
  }
}

/** Also by the most that it can be: then it is below whatever the readings will say. */
function isBelowTarget({ efficiency, target }: FloorLoom): boolean {
  return target !== null && !isNoFigure(efficiency) && efficiency < target;
}

export function isFilter(text: unknown): text is FloorFilter {
  return FLOOR_FILTERS.some((filter) => filter === text);
}
