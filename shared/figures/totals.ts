import type { Figures, GroupFigures, LineTotals, LoomLine } from '../entries/loom-line.js';
import { breakRate, warpBreaksPer1000Ends, type CountInterval } from './breaks.js';
import { efficiency, picksPerHour } from './efficiency.js';
import { ownValue } from './own-value.js';
import { isNoFigure, noFigure, numberOrNull, type Figure, type NoFigureReason } from './no-figure.js';

/** What figures are made from; minutes by cause are for the lost time. SQL sums of a line's columns will do. */
export type Sums = Omit<LineTotals, 'minutesByCause'>;

interface FigureOptions {
  /** Why there are no picks, where there are none. */
  readonly why: NoFigureReason;
  readonly interval: CountInterval;
}

/**
 * The figures of a line or of a group: every one a ratio of the sums. The one arithmetic of sheet, Weeks and tablet.
 *
 * @returns figures, `atMost` null (see `lineFigures`, `groupFigures`)
 */
export function figuresOfTotals(totals: Sums, { why, interval }: FigureOptions): Figures {
  const picks: Figure = totals.picks ?? noFigure(why);
  const atSpeed = (value: number | null): Figure => value ?? noFigure('no-speed');
  const runningMinutes = totals.minutes - totals.stopMinutes;
  return {
    efficiency: efficiency(picks, atSpeed(totals.possiblePicks)),
    efficiencyScheduled: efficiency(picks, atSpeed(totals.possibleScheduled)),
    efficiencyLessShed: efficiency(picks, atSpeed(totals.possibleLessShed)),
    picks,
    picksPerHour: picksPerHour(picks, totals.minutes),
    picksPerRunningHour: picksPerHour(picks, runningMinutes),
    warp: breakRate(totals.warpBreaks, picks, interval),
    weft: breakRate(totals.weftBreaks, picks, interval),
    warpPer1000Ends: isNoFigure(picks)
      ? picks
      : warpBreaksPer1000Ends(totals.warpBreaks, totals.pickEnds ?? noFigure('no-ends')),
    lostPicks: minus(atSpeed(totals.possiblePicks), picks),
    unaccountedMinutes: minus(runningMinutes, isNoFigure(picks) ? picks : atSpeed(totals.weavingMinutes)),
    measuredMinutes: totals.measuredMinutes,
    estimatedMinutes: totals.estimatedMinutes,
    stopMinutes: totals.stopMinutes,
    minutes: totals.minutes,
    atMost: null,
  };
}

/** a − b; the reason of `b` first: where picks are not known, that is what is missing. */
function minus(a: Figure, b: Figure): Figure {
  if (isNoFigure(b)) return b;
  return isNoFigure(a) ? a : a - b;
}

const NOTHING: LineTotals = {
  minutes: 0,
  plannedMinutes: 0,
  shedStopMinutes: 0,
  stopMinutes: 0,
  measuredMinutes: 0,
  estimatedMinutes: 0,
  possiblePicks: 0,
  possibleScheduled: 0,
  possibleLessShed: 0,
  measuredPicks: 0,
  estimatedPicks: 0,
  picks: 0,
  weavingMinutes: 0,
  warpBreaks: 0,
  weftBreaks: 0,
  stops: 0,
  perns: 0,
  pickEnds: 0,
  minutesByCause: {},
};

/**
 * Adds totals up. What one of them does not know the sum does not know either (null): leave lines without figure
 * out before adding (`groupFigures` does).
 */
export function sumTotals(all: readonly LineTotals[]): LineTotals {
  return all.reduce(addTotals, NOTHING);
}

function addTotals(a: LineTotals, b: LineTotals): LineTotals {
  const known = (x: number | null, y: number | null) => (x === null || y === null ? null : x + y);
  const causes = [...new Set([...Object.keys(a.minutesByCause), ...Object.keys(b.minutesByCause)])].sort();
  const lost = (totals: LineTotals, cause: string) =>
    ownValue(totals.minutesByCause, cause) ?? { measured: 0, estimated: 0 };
  return {
    minutes: a.minutes + b.minutes,
    plannedMinutes: a.plannedMinutes + b.plannedMinutes,
    shedStopMinutes: a.shedStopMinutes + b.shedStopMinutes,
    stopMinutes: a.stopMinutes + b.stopMinutes,
    measuredMinutes: a.measuredMinutes + b.measuredMinutes,
    estimatedMinutes: a.estimatedMinutes + b.estimatedMinutes,
    possiblePicks: known(a.possiblePicks, b.possiblePicks),
    possibleScheduled: known(a.possibleScheduled, b.possibleScheduled),
    possibleLessShed: known(a.possibleLessShed, b.possibleLessShed),
    measuredPicks: known(a.measuredPicks, b.measuredPicks),
    estimatedPicks: known(a.estimatedPicks, b.estimatedPicks),
    picks: known(a.picks, b.picks),
    weavingMinutes: known(a.weavingMinutes, b.weavingMinutes),
    warpBreaks: a.warpBreaks + b.warpBreaks,
    weftBreaks: a.weftBreaks + b.weftBreaks,
    stops: a.stops + b.stops,
    perns: a.perns + b.perns,
    pickEnds: known(a.pickEnds, b.pickEnds),
    minutesByCause: Object.fromEntries(
      causes.map((cause) => {
        const [x, y] = [lost(a, cause), lost(b, cause)];
        return [cause, { measured: x.measured + y.measured, estimated: x.estimated + y.estimated }];
      }),
    ),
  };
}

/** A line as its group sees it. */
export interface GroupLine {
  readonly totals: LineTotals;
  readonly picksBy: LoomLine['picksBy'];
  /** Why it has no picks, if known. */
  readonly why?: NoFigureReason;
}

/**
 * Whether a line counts in its group's statistics: its picks and its speed are known, and the picks were read, not
 * agreed. The server stores the answer as a column, so that SQL leaves out the same lines.
 */
export function isCounted(line: {
  readonly totals: Pick<Sums, 'picks' | 'possiblePicks'>;
  readonly picksBy: LoomLine['picksBy'];
}): boolean {
  return line.totals.picks !== null && line.totals.possiblePicks !== null && line.picksBy !== 'agreed';
}

/**
 * Figures of a group of lines, a week, a shed: ratios of sums, never means of percentages. Lines without figure
 * stand neither in numerator nor denominator and are counted; agreed picks are reported apart. While picks of a
 * line are unknown, `atMost` says what the whole group (agreed lines apart) can have woven at most as of `asOf`.
 */
export function groupFigures(
  lines: readonly GroupLine[],
  options: { readonly interval: CountInterval; readonly asOf: number },
): GroupFigures {
  const counted = lines.filter(isCounted);
  const reasons = new Set(lines.filter((line) => !isCounted(line)).map((line) => line.why));
  const [only] = reasons;
  const group = groupFiguresOfSums(
    {
      sums: counted.length > 0 ? sumTotals(counted.map((line) => line.totals)) : null,
      lines: lines.length,
      linesLeftOut: lines.length - counted.length,
      agreedPicks: lines.reduce(
        (sum, line) => sum + (line.picksBy === 'agreed' ? (line.totals.picks ?? 0) : 0),
        0,
      ),
    },
    { interval: options.interval, why: reasons.size === 1 ? only : undefined },
  );
  return { ...group, figures: { ...group.figures, atMost: atMostOf(lines, options.asOf) } };
}

/**
 * The same from sums that a database made over the lines that count (`isCounted`).
 *
 * A column that is null in some of these lines must be null in the sum, where SQL's SUM passes over it:
 * `CASE WHEN COUNT(pick_ends) = COUNT(*) THEN SUM(pick_ends) END`.
 *
 * @param group sums: null where no line counts; lines: all, with those left out
 */
export function groupFiguresOfSums(
  group: {
    readonly sums: Sums | null;
    readonly lines: number;
    readonly linesLeftOut: number;
    readonly agreedPicks: number;
  },
  options: { readonly interval: CountInterval; readonly why?: NoFigureReason | undefined },
): GroupFigures {
  const { sums, lines, linesLeftOut, agreedPicks } = group;
  const totals = sums ?? { ...NOTHING, picks: null };
  const why = options.why ?? 'missing-input';
  return {
    figures: figuresOfTotals(totals, { why, interval: options.interval }),
    lines,
    linesLeftOut,
    agreedPicks,
  };
}

function atMostOf(lines: readonly GroupLine[], asOf: number): Figures['atMost'] {
  if (!lines.some((line) => line.totals.picks === null)) return null;
  const whole = lines
    .filter((line) => line.picksBy !== 'agreed' && line.totals.possiblePicks !== null)
    .map(({ totals }) => ({ ...totals, picks: totals.picks ?? numberOrNull(mostPicks(totals)) }));
  const sum = sumTotals(whole);
  const picks = whole.length > 0 ? (sum.picks ?? noFigure('no-speed')) : noFigure('no-speed');
  return { efficiency: efficiency(picks, sum.possiblePicks ?? noFigure('no-speed')), picks, asOf };
}

/** ppm × (T − logged stops): what was woven at most, since nobody knows the picks between readings. */
export function mostPicks({
  possiblePicks,
  measuredPicks,
  estimatedPicks,
}: Pick<Sums, 'possiblePicks' | 'measuredPicks' | 'estimatedPicks'>): Figure {
  if (possiblePicks === null || measuredPicks === null || estimatedPicks === null)
    return noFigure('no-speed');
  return Math.max(0, possiblePicks - measuredPicks - estimatedPicks);
}
