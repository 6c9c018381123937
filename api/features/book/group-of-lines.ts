import type { GroupFigures } from '../../../shared/entries/loom-line.js';
import { poissonInterval } from '../../../shared/chance/poisson-interval.js';
import type { CountInterval } from '../../../shared/figures/breaks.js';
import { whyNoPicks } from '../../../shared/figures/loom-line.js';
import { groupFigures } from '../../../shared/figures/totals.js';
import type { ProjectedLine } from './line-store.js';

/** The 95% interval of a count; `dispersion` 1 is Poisson's own, above it the interval is widened. */
export function countInterval(dispersion: number): CountInterval {
  return (count) => poissonInterval(count, 0.95, dispersion);
}

/** Figures of a shift's lines together, as of its end. */
export function groupFiguresOfLines(
  lines: readonly Pick<ProjectedLine, 'line' | 'totals'>[],
  asOf?: number,
): GroupFigures {
  return groupFigures(
    lines.map(({ line, totals }) => ({
      totals,
      picksBy: line.picksBy,
      why: whyNoPicks(line, asOf ?? line.shift.endsAt),
    })),
    { interval: countInterval(1), asOf: asOf ?? Math.max(0, ...lines.map(({ line }) => line.shift.endsAt)) },
  );
}
