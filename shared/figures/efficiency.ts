import { isNoFigure, noFigure, type Figure, type NoFigureReason } from './no-figure.js';

/**
 * A quotient, or the reason why there is none: the one division that every figure goes through.
 *
 * @param numerator,denominator figures; the reason of the one that has none is passed on, the numerator's first
 * @param whenZero the reason given where the denominator is zero or less
 */
export function ratio(numerator: Figure, denominator: Figure, whenZero: NoFigureReason): Figure {
  if (isNoFigure(numerator)) return numerator;
  if (isNoFigure(denominator)) return denominator;
  if (Number.isNaN(numerator) || Number.isNaN(denominator)) return noFigure('missing-input');
  if (!(denominator > 0)) return noFigure(whenZero);
  const quotient = numerator / denominator;
  return Number.isFinite(quotient) ? quotient : noFigure('out-of-range');
}

/**
 * Loom efficiency on one of its three bases: A / (n·T), A / (n·(T − P)) or A / (n·(T − P − H)).
 *
 * @param picks A, picks woven
 * @param possible picks possible on that base, summed over stretches, each at its own speed
 * @returns a share, 0 … 1 and above (over 100% is flagged, not hidden); `no-time` where nothing was possible
 */
export function efficiency(picks: Figure, possible: Figure): Figure {
  return ratio(picks, possible, 'no-time');
}

/**
 * Picks per hour, A / (T/60); per running hour with T − S for the minutes.
 *
 * @param minutes the minutes they are held against; `no-time` where these are zero or less (over-logged)
 */
export function picksPerHour(picks: Figure, minutes: Figure): Figure {
  return ratio(picks, isNoFigure(minutes) ? minutes : minutes / 60, 'no-time');
}
