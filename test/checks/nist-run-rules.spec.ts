import { describe, expect, it } from 'vitest';
import { runRules } from '../../shared/chance/run-rules.js';
import { given } from './close-to.js';

// NIST/SEMATECH e-Handbook 6.3.2, the Western Electric rules (wording from memory); six in a row from
// L. S. Nelson, Journal of Quality Technology 16 (1984), as SAS/QC test 3. The points are this spec's own.
describe('run rules, on points in standard deviations from the centre', () => {
  const told = (values: readonly number[]) => given(runRules(values, 0, 1)).map(({ rule, to }) => [rule, to]);

  it('one point beyond 3σ; on 3σ is not beyond', () => {
    expect(told([0, 3.01])).toEqual([['beyond-3-sigma', 1]]);
    expect(told([0, 3])).toEqual([]);
  });

  it('two of three beyond 2σ on one side', () => {
    expect(told([2.1, 0, 2.2])).toEqual([['2-of-3', 2]]);
    expect(told([2.1, 0, 0, 2.2])).toEqual([]);
    expect(told([2.1, 0, -2.2])).toEqual([]);
  });

  it('four of five beyond 1σ on one side', () => {
    expect(told([-1.1, -1.2, 0, -1.1, -1.3])).toEqual([['4-of-5', 4]]);
    expect(told([-1.1, -1.2, 0, 0, -1.1, -1.3])).toEqual([]);
  });

  it('eight in a row on one side', () => {
    expect(told([0.5, 0.2, 0.5, 0.2, 0.5, 0.2, 0.5, 0.2])).toEqual([['8-on-one-side', 7]]);
    expect(told([0.5, 0.2, 0.5, 0.2, 0.5, 0.2, 0.5, 0, 0.2])).toEqual([]);
  });

  it('six rising or falling in a row', () => {
    expect(told([-0.9, -0.6, -0.3, 0, 0.3, 0.6])).toEqual([['6-in-a-row', 5]]);
    expect(told([0.6, 0.3, 0, -0.3, -0.6, -0.9])).toEqual([['6-in-a-row', 5]]);
    expect(told([0.6, 0.3, 0, 0, -0.6, -0.9])).toEqual([]);
  });
});
