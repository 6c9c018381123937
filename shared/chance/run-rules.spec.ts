import { describe, expect, it } from 'vitest';
import { runRules, type RunSignal } from './run-rules.js';

const told = (values: readonly number[], centre = 0, sigma = 1) =>
  runRules(values, centre, sigma) as readonly RunSignal[];

describe('runRules', () => {
  it('says side, from and to, and goes on while the run does', () => {
    expect(told([0, -2.5, 0, -2.6, -2.7])).toEqual([
      { rule: '2-of-3', side: 'below', from: 1, to: 3 },
      { rule: '2-of-3', side: 'below', from: 3, to: 4 },
    ]);
  });

  it('speaks of the point that completes a run only if it lies beyond itself', () => {
    expect(told([2.5, 2.5, 0.5])).toEqual([{ rule: '2-of-3', side: 'above', from: 0, to: 1 }]);
  });

  it('works in the unit of the values', () => {
    expect(told([80, 80, 71], 80, 2.9).map((one) => one.rule)).toEqual(['beyond-3-sigma']);
    expect(told([80, 80, 71.3], 80, 2.9)).toEqual([]);
    expect(told([0.1 + 0.2], 0, 0.1)).toEqual([]);
  });

  it('tells falling from rising', () => {
    expect(told([0, 1, 2, 3, 4, 5], 0, 100)).toEqual([
      { rule: '6-in-a-row', side: 'rising', from: 0, to: 5 },
    ]);
    expect(told([5, 4, 3, 2, 1, 0], 0, 100)).toEqual([
      { rule: '6-in-a-row', side: 'falling', from: 0, to: 5 },
    ]);
    expect(told([0, 1, 2, 3, 3, 4], 0, 100)).toEqual([]);
  });

  it('needs all of its points', () => {
    expect(told([1.5, 1.5, 1.5])).toEqual([]);
    expect(told([1.5, 1.5, 1.5, 1.5])).toEqual([{ rule: '4-of-5', side: 'above', from: 0, to: 3 }]);
    expect(told([])).toEqual([]);
  });

  it('has no figure from impossible input', () => {
    expect(runRules([NaN], 0, 1)).toEqual({ none: 'missing-input' });
    expect(runRules([1], NaN, 1)).toEqual({ none: 'missing-input' });
    expect(runRules([1], 0, -1)).toEqual({ none: 'out-of-range' });
    expect(runRules([Infinity], 0, 1)).toEqual({ none: 'out-of-range' });
  });
});
