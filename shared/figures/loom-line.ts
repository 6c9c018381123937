import { PERN_CHANGE } from '../entries/phases.js';
import type { Figures, LineStop, LineTotals, LoomLine } from '../entries/loom-line.js';
import type { CountInterval } from './breaks.js';
import { efficiency } from './efficiency.js';
import { LineSums } from './line-sums.js';
import { noFigure, type NoFigureReason } from './no-figure.js';
import { standingTime, standsAs, overlapMs, without, type Span } from './standing-time.js';
import { ownValue } from './own-value.js';
import { figuresOfTotals, mostPicks } from './totals.js';

const MINUTE = 60_000;

/** The time that a line's picks are held against: the shift, or from reading to reading. Meals are still in it. */
export function windowOf(line: Pick<LoomLine, 'stretches' | 'shift'>): Span {
  return {
    from: line.stretches[0]?.from ?? line.shift.startsAt,
    until: line.stretches.at(-1)?.until ?? line.shift.endsAt,
  };
}

/** The meal break in which looms are stopped, which lies outside shift minutes; null: none, or looms run. */
export function stoppedMeal(shift: LoomLine['shift']): Span | null {
  const { meal } = shift;
  return meal?.looms === 'stopped' ? { from: meal.startsAt, until: meal.endsAt } : null;
}

/**
 * What of a line adds up: minutes, picks, counts. Sums of these over lines give the figures of any group.
 *
 * Minutes that the loom stood are the union of its timed stops, clipped to the time that picks are held against and
 * less a meal with looms stopped; a counted stop adds its cause's allowance, as estimated. Stops that began outside
 * that time do not count either: a rate is breaks and picks of the same minutes.
 *
 * @param asOf ms since 1970: while picks are not known, a shift that still runs is clipped here, and stops that
 *   begin later do not count yet; past the end is the end. Where picks are known T is whole.
 */
export function lineTotals(line: LoomLine, asOf: number): LineTotals {
  const whole = windowOf(line);
  const elapsed = { from: whole.from, until: Math.max(whole.from, Math.min(whole.until, asOf)) };
  const window = line.picks === null ? elapsed : whole;
  const meal = stoppedMeal(line.shift);
  const begun = line.stops.filter((stop) => stop.from <= asOf);
  const standing = without(standingTime(begun, elapsed), meal);
  const sums = new LineSums();
  for (const stretch of line.stretches) {
    // A change of weaver or speed may be set down before it comes: that stretch has not begun.
    const until = Math.max(stretch.from, Math.min(stretch.until, window.until));
    const parts = without([{ from: stretch.from, until }], meal);
    for (const part of parts) sums.run(part.until - part.from, stretch.ppm);
    for (const span of standing)
      sums.stand(span.cause, span.as, overlapMs(span, stretch), stretch.ppm, 'measured');
  }
  addTotalledMinutes(sums, line);
  const counts = addEstimates(sums, line, begun);
  return { ...sums.totals(), ...picksOf(line), ...counts };
}

/**
 * The figures of one loom in one shift.
 *
 * @param asOf ms since 1970; while readings are missing `atMost` is ppm × (elapsed − logged stops) as of then
 * @param interval the exact interval of a count (`poissonInterval`), or `noInterval`
 */
export function lineFigures(line: LoomLine, asOf: number, interval: CountInterval): Figures {
  const totals = lineTotals(line, asOf);
  const figures = figuresOfTotals(totals, { why: whyNoPicks(line, asOf), interval });
  if (line.picks !== null) return figures;
  const atMost = mostPicks(totals);
  const possible = totals.possiblePicks ?? noFigure('no-speed');
  const until = Math.min(asOf, windowOf(line).until);
  return { ...figures, atMost: { efficiency: efficiency(atMost, possible), picks: atMost, asOf: until } };
}

/** Why a line has no picks; of no meaning where it has. */
export function whyNoPicks(line: LoomLine, asOf: number): NoFigureReason {
  const has = (code: LoomLine['flags'][number]['code']) => line.flags.some((flag) => flag.code === code);
  if (has('readings-disagree')) return 'readings-disagree';
  if (has('no-start-reading')) return 'no-start-reading';
  if (has('no-end-reading')) return asOf < line.shift.endsAt ? 'shift-not-over' : 'no-end-reading';
  return has('no-speed') ? 'no-speed' : 'not-comparable';
}

/** Minutes from a paper sheet are the shift's total of their cause: what was timed by taps is in them already. */
function addTotalledMinutes(sums: LineSums, line: LoomLine): void {
  const ppm = sums.meanPpm();
  for (const [cause, minutes] of Object.entries(line.sheetMinutes)) {
    const group = ownValue(line.totalledCauses, cause)?.group ?? 'loom';
    const more = minutes * MINUTE - sums.measuredMs(cause);
    sums.stand(cause, standsAs(group, false), more, ppm, 'measured');
  }
}

/** Counts of stops, and the allowances of those that have no duration of their own. */
function addEstimates(sums: LineSums, line: LoomLine, begun: readonly LineStop[]) {
  const counts = { warpBreaks: 0, weftBreaks: 0, stops: 0, perns: 0 };
  const count = (cause: string, breakOf: LineStop['breakOf'], n: number) => {
    if (breakOf === 'warp') counts.warpBreaks += n;
    if (breakOf === 'weft') counts.weftBreaks += n;
    if (cause === PERN_CHANGE) counts.perns += n;
    else counts.stops += n;
  };
  const { from, until } = windowOf(line);
  for (const stop of begun) {
    if (stop.from < from || stop.from >= until) continue;
    if (Object.hasOwn(line.handOverCounts, stop.cause)) continue;
    count(stop.cause, stop.breakOf, stop.count);
    if (Object.hasOwn(line.sheetMinutes, stop.cause)) continue; // the sheet's minutes are the cause's total
    const as = standsAs(stop.group, stop.shedWide);
    sums.stand(stop.cause, as, stop.estimatedMs, speedAt(line, stop.from), 'estimated');
  }
  for (const [cause, total] of Object.entries(line.handOverCounts)) {
    const known = ownValue(line.totalledCauses, cause);
    count(cause, known?.breakOf ?? null, total);
    if (Object.hasOwn(line.sheetMinutes, cause)) continue;
    const timed = begun.filter((stop) => stop.cause === cause && (stop.timed || stop.estimatedMs === 0));
    const untimed = Math.max(0, total - timed.reduce((sum, stop) => sum + stop.count, 0));
    const as = standsAs(known?.group ?? 'loom', false);
    sums.stand(cause, as, untimed * (known?.allowanceMs ?? 0), sums.meanPpm(), 'estimated');
  }
  return counts;
}

function speedAt(line: LoomLine, at: number): number | null {
  return line.stretches.find((one) => one.from <= at && at < one.until)?.ppm ?? null;
}

function picksOf(line: LoomLine) {
  let pickEnds: number | null = line.picks === null ? null : 0;
  let weavingMinutes: number | null = line.picks === null ? null : 0;
  for (const { picks, ends, ppm } of line.stretches) {
    if (picks === 0) continue;
    pickEnds = pickEnds === null || picks === null || ends === null ? null : pickEnds + picks * ends;
    weavingMinutes =
      weavingMinutes === null || picks === null || ppm === null ? null : weavingMinutes + picks / ppm;
  }
  return { picks: line.picks, weavingMinutes, pickEnds };
}
