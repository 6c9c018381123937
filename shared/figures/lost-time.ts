import type { CauseGroup } from '../contract/reference.js';
import type { LineTotals } from '../entries/loom-line.js';
import { isNoFigure, noFigure, type Figure } from './no-figure.js';

/** What became of the picks that were possible and not woven. */
export interface LostPicks {
  /** n·T − A; negative where more was woven than the book speed allows. */
  readonly lost: Figure;
  /** By timed stops, at the loom's own speed. */
  readonly measured: Figure;
  /** By the allowances of counted stops. */
  readonly estimated: Figure;
  /**
   * The rest: short stops, waiting for the weaver, a loom under its book speed. Negative is over-logged: more was
   * logged as standing than the picks lost allow.
   */
  readonly unaccounted: Figure;
}

/**
 * Lost picks, n·T − A, as measured + estimated + unaccounted.
 *
 * @param totals a line's or a group's; no figure without picks or speed
 */
export function lostPicks(
  totals: Pick<LineTotals, 'possiblePicks' | 'measuredPicks' | 'estimatedPicks' | 'picks'>,
): LostPicks {
  const { possiblePicks, picks } = totals;
  const measured = totals.measuredPicks ?? noFigure('no-speed');
  const estimated = totals.estimatedPicks ?? noFigure('no-speed');
  const lost = lostFrom(possiblePicks, picks);
  const unaccounted = minus(minus(lost, measured), estimated);
  return { lost, measured, estimated, unaccounted };
}

function minus(a: Figure, b: Figure): Figure {
  if (isNoFigure(a)) return a;
  return isNoFigure(b) ? b : a - b;
}

function lostFrom(possible: number | null, picks: number | null): Figure {
  if (possible === null) return noFigure('no-speed');
  return picks === null ? noFigure('missing-input') : possible - picks;
}

/** One cause's part in the lost time, minutes. */
export interface LostByCause {
  readonly cause: string;
  readonly group: CauseGroup | null;
  readonly measured: number;
  readonly estimated: number;
  readonly minutes: number;
}

/**
 * Minutes lost by cause, the greatest first (equal ones by cause): after precedence and clipping, each minute once.
 *
 * @param groupOf the group of a cause, null where the mill no longer knows it
 */
export function lostByCause(
  totals: Pick<LineTotals, 'minutesByCause'>,
  groupOf: (cause: string) => CauseGroup | null,
): LostByCause[] {
  return Object.entries(totals.minutesByCause)
    .map(([cause, { measured, estimated }]) => ({
      cause,
      group: groupOf(cause),
      measured,
      estimated,
      minutes: measured + estimated,
    }))
    .sort((a, b) => b.minutes - a.minutes || (a.cause < b.cause ? -1 : 1));
}
