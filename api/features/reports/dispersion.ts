import type { EntityManager } from 'typeorm';
import { dispersionBetweenShifts, type Dispersion } from '../../../shared/chance/over-dispersion.js';
import type { Counted } from '../../../shared/chance/count.js';
import { isNoFigure } from '../../../shared/figures/no-figure.js';
import { push } from '../book/bulk.js';

interface Weeks {
  readonly from: string;
  readonly to: string;
}

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
export async function dispersionOf(from: EntityManager, shedId: string, weeks: Weeks): Promise<number> {
  return (await dispersionRecord(from, shedId, weeks))?.dispersion ?? 1;
}

/** The same with what it rests on; null: too few shifts to know. */
export async function dispersionRecord(
  from: EntityManager,
  shedId: string,
  weeks: Weeks,
): Promise<Dispersion | null> {
  const lines = await from.query<Line[]>(
    `SELECT l."loomId", l."clothId", l."week", l."picks", l."warpBreaks", l."weftBreaks"
       FROM "loom_line" l JOIN "shift" s ON s."key" = l."shiftKey"
      WHERE l."shedId" = ? AND l."week" BETWEEN ? AND ? AND l."counted" AND s."state" = 'closed'`,
    [shedId, weeks.from, weeks.to],
  );
  const [warp, weft] = [between(lines, 'warpBreaks'), between(lines, 'weftBreaks')];
  if (!warp || !weft) return warp ?? weft;
  return warp.dispersion >= weft.dispersion ? warp : weft;
}

function between(lines: readonly Line[], breaks: 'warpBreaks' | 'weftBreaks'): Dispersion | null {
  const groups = new Map<string, Counted[]>();
  for (const line of lines)
    push(groups, `${line.loomId} ${line.clothId ?? ''} ${line.week}`, {
      count: line[breaks],
      exposure: line.picks,
    });
  const found = dispersionBetweenShifts([...groups.values()]);
  return isNoFigure(found) ? null : found;
}
