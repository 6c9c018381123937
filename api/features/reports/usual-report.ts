import type { EntityManager } from 'typeorm';
import { USUAL_WEEKS, type Usual } from '../../../shared/contract/usual.js';
import { breakRate } from '../../../shared/figures/breaks.js';
import { countInterval } from '../book/group-of-lines.js';
import { mondayOf } from '../book/line-row.js';
import { dispersionOf } from './dispersion.js';
import type { Reports } from './report-reader.js';

const WEEK = 7 * 86_400_000;

interface Row {
  readonly loomId: string;
  readonly clothId: string | null;
  readonly shifts: number;
  readonly picks: number;
  readonly warpBreaks: number;
  readonly weftBreaks: number;
  readonly stops: number;
}

/** What each loom gave with each cloth in the weeks before this one: closed shifts with picks alone, no people. */
export async function usualReport(
  from: EntityManager,
  { shedId, asOf }: Reports['usual']['input'],
): Promise<Usual> {
  const dateAt = (at: number) => mondayOf(new Date(at).toISOString().slice(0, 10));
  const weeks = { from: dateAt(asOf - USUAL_WEEKS * WEEK), to: dateAt(asOf - WEEK) };
  const rows = await from.query<Row[]>(
    `SELECT l."loomId", l."clothId", COUNT(*) AS "shifts", SUM(l."picks") AS "picks",
            SUM(l."warpBreaks") AS "warpBreaks", SUM(l."weftBreaks") AS "weftBreaks", SUM(l."stops") AS "stops"
       FROM "loom_line" l JOIN "shift" s ON s."key" = l."shiftKey"
      WHERE l."shedId" = ? AND l."week" BETWEEN ? AND ? AND l."counted" AND s."state" = 'closed'
      GROUP BY l."loomId", l."clothId" ORDER BY l."loomId", l."clothId"`,
    [shedId, weeks.from, weeks.to],
  );
  const interval = countInterval(await dispersionOf(from, shedId, weeks));
  return {
    shedId,
    ...weeks,
    rows: rows.map(({ loomId, clothId, shifts, picks, warpBreaks, weftBreaks, stops }) => ({
      loomId,
      clothId,
      shifts,
      warp: breakRate(warpBreaks, picks, interval),
      weft: breakRate(weftBreaks, picks, interval),
      stops: breakRate(stops, picks, interval),
    })),
  };
}
