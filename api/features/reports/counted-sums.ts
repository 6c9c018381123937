import type { GroupFigures } from '../../../shared/entries/loom-line.js';
import type { CountInterval } from '../../../shared/figures/breaks.js';
import { groupFiguresOfSums, type Sums } from '../../../shared/figures/totals.js';

/** Columns of a line that add up; the nullable ones are unknown in the sum where one of its lines does not know. */
const KNOWN = [
  'minutes',
  'plannedMinutes',
  'shedStopMinutes',
  'stopMinutes',
  'measuredMinutes',
  'estimatedMinutes',
  'warpBreaks',
  'weftBreaks',
  'stops',
  'perns',
] as const satisfies readonly (keyof Sums)[];
const PERHAPS = [
  'possiblePicks',
  'possibleScheduled',
  'possibleLessShed',
  'measuredPicks',
  'estimatedPicks',
  'picks',
  'weavingMinutes',
  'pickEnds',
] as const satisfies readonly (keyof Sums)[];

/** Sums over the lines that count (`isCounted`), for a SELECT over `loom_line` that is grouped. */
export const COUNTED_SUMS = [
  `COUNT(*) AS "lines"`,
  `SUM("counted") AS "countedLines"`,
  `SUM(CASE WHEN "picksBy" = 'agreed' THEN COALESCE("picks", 0) ELSE 0 END) AS "agreedPicks"`,
  ...KNOWN.map((column) => `SUM(CASE WHEN "counted" THEN "${column}" ELSE 0 END) AS "${column}"`),
  ...PERHAPS.map(
    (column) =>
      `CASE WHEN SUM("counted" AND "${column}" IS NULL) = 0
        THEN SUM(CASE WHEN "counted" THEN "${column}" END) END AS "${column}"`,
  ),
].join(', ');

export interface CountedSums extends Sums {
  readonly lines: number;
  readonly countedLines: number;
  readonly agreedPicks: number;
}

/** Figures of a group from its sums: ratios of sums. */
export function figuresOfSums(row: CountedSums, interval: CountInterval): GroupFigures {
  const { lines, countedLines, agreedPicks, ...sums } = row;
  return groupFiguresOfSums(
    { sums: countedLines > 0 ? sums : null, lines, linesLeftOut: lines - countedLines, agreedPicks },
    { interval },
  );
}
