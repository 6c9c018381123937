import { noFigure, type NoFigure } from '../figures/no-figure.js';

/** Events counted, and what they were counted over. */
export interface Counted {
  /** Events, such as breaks: a whole number ≥ 0. */
  readonly count: number;
  /** What they were counted over, such as picks: ≥ 0, in one unit throughout a comparison. */
  readonly exposure: number;
}

/** Why a count cannot be used, or null where it can. An exposure of 0 is left to the caller. */
export function whyNotCounted(counted: Counted): NoFigure | null {
  const { count, exposure } = counted;
  if (Number.isNaN(count) || Number.isNaN(exposure)) return noFigure('missing-input');
  if (!Number.isSafeInteger(count) || count < 0) return noFigure('out-of-range');
  if (!(exposure >= 0 && exposure < Infinity)) return noFigure('out-of-range');
  return null;
}

/** Counts and exposures added: a rate for several is a ratio of sums, never a mean of rates. */
export function total(many: readonly Counted[]): Counted {
  return {
    count: many.reduce((sum, one) => sum + one.count, 0),
    exposure: many.reduce((sum, one) => sum + one.exposure, 0),
  };
}

/** Whether a level or share lies strictly between 0 and 1. */
export function isShare(level: number): boolean {
  return level > 0 && level < 1;
}
