import { expect } from 'vitest';
import { isNoFigure, type NoFigure } from '../../shared/figures/no-figure.js';

/** Holds a figure to a source's value, by relative error (absolute where the value is 0). */
export function expectClose(actual: number | NoFigure, expected: number, relative = 1e-8): void {
  const value = given(actual);
  const error = expected === 0 ? Math.abs(value) : Math.abs(value - expected) / Math.abs(expected);
  expect(error, `${value} against ${expected}`).toBeLessThanOrEqual(relative);
}

/** What was asked for, where the spec knows that it can be given. */
export function given<T>(figure: T | NoFigure): T {
  if (isNoFigure(figure)) throw new Error(`no figure: ${figure.none}`);
  return figure;
}
