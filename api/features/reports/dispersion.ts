import type { EntityManager } from 'typeorm';
import { dispersionBetweenShifts } from '../../../shared/chance/over-dispersion.js';
import type { Counted } from '../../../shared/chance/count.js';
import { isNoFigure } from '../../../shared/figures/no-figure.js';
import { push } from '../book/bulk.js';

interface Line {
  loomId: string;
  clothId: string | null;
  week: string;
  picks: number;
  warpBreaks: number;
  weftBreaks: number;
}

/**
 * How much more the breaks of closed shifts differ than chance alone would have it: between shifts of one loom on one
 * cloth in one week, pooled over the looms shown. Of warp and weft the larger, so that no interval is too narrow.
 */
export async function dispersionOf(
  from: EntityManager,
  shedId: string,
  weeks: { readonly from: string; readonly to: string },
): Promise<number> {
  const lines = await from.query<Line[]>(
    `SELECT l."loomId", l."clothId", l."week", l."picks", l."warpBreaks", l."weftBreaks"
       FROM "loom_line" l JOIN "shift" s ON s."key" = l."shiftKey"
      WHERE l."shedId" = ? AND l."week" BETWEEN ? AND ? AND l."counted" AND s."state" = 'closed'`,
    [shedId, weeks.from, weeks.to],
  );
  return Math.max(...[between(lines, 'warpBreaks'), between(lines, 'weftBreaks')]);
}

function between(lines: readonly Line[], breaks: 'warpBreaks' | 'weftBreaks'): number {
  const groups = new Map<string, Counted[]>();
  for (const line of lines)
    push(groups, `${line.loomId} ${line.clothId ?? ''} ${line.week}`, {
      count: line[breaks],
      exposure: line.picks,
    });
  const found = dispersionBetweenShifts([...groups.values()]);
  return isNoFigure(found) ? 1 : found.dispersion;
}
