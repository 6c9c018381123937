import { describe, expect, it } from 'vitest';
import { efficiency, picksPerHour, ratio } from './efficiency.js';
import { noFigure } from './no-figure.js';

describe('ratio', () => {
  it('is the quotient', () => {
    expect(ratio(1, 4, 'no-time')).toBe(0.25);
    expect(ratio(-1, 4, 'no-time')).toBe(-0.25);
  });

  it('passes a reason on, the numerator’s first', () => {
    expect(ratio(noFigure('no-picks'), noFigure('no-speed'), 'no-time')).toEqual(noFigure('no-picks'));
    expect(ratio(1, noFigure('no-speed'), 'no-time')).toEqual(noFigure('no-speed'));
  });

  it.each([
    [1, 0, 'no-time'],
    [0, 0, 'no-time'],
    [1, -5, 'no-time'],
    [Number.NaN, 5, 'missing-input'],
    [5, Number.NaN, 'missing-input'],
    [Infinity, 5, 'out-of-range'],
    [1e308, 1e-308, 'out-of-range'],
  ] as const)('is never NaN or infinite: %d / %d', (a, b, reason) => {
    expect(ratio(a, b, 'no-time')).toEqual(noFigure(reason));
  });
});

describe('efficiency', () => {
  it('is A / (n·T)', () => {
    expect(efficiency(74_250, 86_400)).toBe(0.859375);
  });

  it('above 1 is given, not hidden', () => {
    expect(efficiency(90_000, 86_400)).toBeCloseTo(1.0416667, 7);
  });

  it('has no figure where nothing was possible', () => {
    expect(efficiency(0, 0)).toEqual(noFigure('no-time'));
  });
});

describe('picksPerHour', () => {
  it('is A / (T/60)', () => {
    expect(picksPerHour(74_250, 480)).toBe(9281.25);
  });

  it('has no figure in no time, nor without picks or minutes', () => {
    expect(picksPerHour(74_250, 0)).toEqual(noFigure('no-time'));
    expect(picksPerHour(74_250, -3)).toEqual(noFigure('no-time'));
    expect(picksPerHour(noFigure('no-end-reading'), 480)).toEqual(noFigure('no-end-reading'));
    expect(picksPerHour(1, noFigure('missing-input'))).toEqual(noFigure('missing-input'));
  });
});
