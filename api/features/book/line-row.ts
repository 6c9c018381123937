import type { LoomLineRow } from '../../database/entities/index.js';
import { flagNeedsLook } from '../../../shared/entries/needs-look.js';
import { isCounted } from '../../../shared/figures/totals.js';
import { canonicalJson } from './canonical-json.js';
import type { ProjectedLine } from './line-store.js';

export const LINE_COLUMNS = [
  'shiftKey',
  'loomId',
  'shedId',
  'date',
  'week',
  'row',
  'clothId',
  'picksBy',
  'minutes',
  'plannedMinutes',
  'shedStopMinutes',
  'stopMinutes',
  'measuredMinutes',
  'estimatedMinutes',
  'possiblePicks',
  'possibleScheduled',
  'possibleLessShed',
  'measuredPicks',
  'estimatedPicks',
  'picks',
  'weavingMinutes',
  'pickEnds',
  'warpBreaks',
  'weftBreaks',
  'stops',
  'perns',
  'flagCount',
  'counted',
  'minutesByCause',
  'line',
] as const satisfies readonly (keyof LoomLineRow)[];

/** The Monday of a date's week (ISO 8601). */
export function mondayOf(date: string): string {
  const day = new Date(`${date}T00:00Z`);
  const sinceMonday = (day.getUTCDay() + 6) % 7;
  return new Date(day.getTime() - sinceMonday * 86_400_000).toISOString().slice(0, 10);
}

/** A line as the read model keeps it: equal lines are equal bytes. */
export function lineRow({ loom, line, totals }: ProjectedLine): (string | number | null)[] {
  const row: LoomLineRow = {
    shiftKey: line.shift.key,
    loomId: line.loomId,
    shedId: line.shedId,
    date: line.shift.date,
    week: mondayOf(line.shift.date),
    row: loom.row,
    clothId: mainCloth(line),
    picksBy: line.picksBy,
    minutes: totals.minutes,
    plannedMinutes: totals.plannedMinutes,
    shedStopMinutes: totals.shedStopMinutes,
    stopMinutes: totals.stopMinutes,
    measuredMinutes: totals.measuredMinutes,
    estimatedMinutes: totals.estimatedMinutes,
    possiblePicks: totals.possiblePicks,
    possibleScheduled: totals.possibleScheduled,
    possibleLessShed: totals.possibleLessShed,
    measuredPicks: totals.measuredPicks,
    estimatedPicks: totals.estimatedPicks,
    picks: totals.picks,
    weavingMinutes: totals.weavingMinutes,
    pickEnds: totals.pickEnds,
    warpBreaks: totals.warpBreaks,
    weftBreaks: totals.weftBreaks,
    stops: totals.stops,
    perns: totals.perns,
    // What asks for a look, as the sheet counts it; flags for the record alone do not.
    flagCount: line.flags.filter((flag) => flagNeedsLook(flag.code)).length,
    counted: isCounted({ totals, picksBy: line.picksBy }) ? 1 : 0,
    minutesByCause: canonicalJson(totals.minutesByCause),
    line: JSON.stringify(line),
  };
  return LINE_COLUMNS.map((column) => row[column]);
}

/** The cloth that was on the loom for most of the shift. */
function mainCloth(line: ProjectedLine['line']): string | null {
  const spans = new Map<string, number>();
  for (const { clothId, from, until } of line.stretches)
    if (clothId !== null) spans.set(clothId, (spans.get(clothId) ?? 0) + until - from);
  let main: string | null = null;
  for (const [clothId, span] of spans) if (main === null || span > (spans.get(main) ?? 0)) main = clothId;
  return main;
}
