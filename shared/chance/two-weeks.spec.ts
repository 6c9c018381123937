import { describe, expect, it } from 'vitest';
import { compareTwoWeeks, type LoomVerdict, type LoomWeeks, type TwoWeeksPage } from './two-weeks.js';

const week = (counts: readonly number[], exposure = 100_000, cloth = 'sheeting', beam = '7') =>
  counts.map((count) => ({ count, exposure, cloth, beam }));

/** Counts about a mean that differ no more than Poisson counts may. */
const about = (mean: number) => Array.from({ length: 20 }, (_, at) => mean + [0, 1, -1, 2, -2][at % 5]);

const page = (looms: readonly LoomWeeks[]) => compareTwoWeeks(looms) as TwoWeeksPage;
const steady = (loom: string): LoomWeeks => ({ loom, before: week(about(5)), after: week(about(5)) });
const verdict = (looms: readonly LoomWeeks[], loom: string) =>
  page(looms).looms.find((one) => one.loom === loom) as LoomVerdict;

describe('compareTwoWeeks', () => {
  it('names the loom that doubled, and not its neighbours', () => {
    const looms = [steady('1'), { loom: '2', before: week(about(5)), after: week(about(10)) }, steady('3')];
    const { looms: verdicts, dispersion } = page(looms);
    expect(verdicts.map((one) => [one.loom, one.verdict])).toEqual([
      ['1', 'no-change-shown'],
      ['2', 'changed'],
      ['3', 'no-change-shown'],
    ]);
    expect(dispersion).toMatchObject({ dispersion: 1, degrees: 6 * 19 });
    expect(verdicts[1]).toMatchObject({
      before: { count: 100, exposure: 2_000_000 },
      after: { count: 200, exposure: 2_000_000 },
      comparison: { ratio: 2 },
    });
    expect(verdicts[0].adjusted).toBe(1);
  });

  it('adjusts for the looms judged', () => {
    const changed = { loom: '2', before: week(about(5)), after: week(about(10)) };
    const alone = verdict([changed], '2');
    const among = verdict([steady('1'), changed, steady('3')], '2');
    expect(alone.adjusted).toBe((alone.comparison as { p: number }).p);
    expect(among.adjusted).toBeCloseTo(3 * (among.comparison as { p: number }).p, 15);
    expect((among.enough as { events: number }).events).toBeGreaterThan(
      (alone.enough as { events: number }).events,
    );
  });

  it('carries the dispersion: the same totals in rough shifts are not named', () => {
    const rough = (mean: number) => Array.from({ length: 20 }, (_, at) => (at % 4 === 0 ? 4 * mean : 0));
    const looms = [
      { loom: '1', before: week(rough(5)), after: week(rough(5)) },
      { loom: '2', before: week(rough(5)), after: week(rough(8)) },
    ];
    expect(page(looms).dispersion.dispersion).toBeGreaterThan(15);
    expect(verdict(looms, '2').verdict).toBe('too-little');
    const smooth = [steady('1'), { loom: '2', before: week(about(5)), after: week(about(8)) }];
    expect(verdict(smooth, '2').verdict).toBe('changed');
  });

  it('does not take a change for dispersion', () => {
    const changed = { loom: '2', before: week([5, 5, 5, 6]), after: week([20, 20, 20, 21]) };
    expect(page([changed]).dispersion).toMatchObject({ dispersion: 1, degrees: 6 });
  });

  it('does not judge a loom whose cloth or beam changed, but learns from its shifts', () => {
    for (const other of [week(about(20), 100_000, 'drill'), week(about(20), 100_000, 'sheeting', '8')]) {
      const looms = [steady('1'), { loom: '2', before: week(about(5)), after: other }];
      expect(verdict(looms, '2')).toMatchObject({
        verdict: 'warp-changed',
        comparison: { none: 'not-comparable' },
        adjusted: { none: 'not-comparable' },
      });
      expect(page(looms).dispersion.degrees).toBe(4 * 19);
    }
  });

  it('keeps cloths and beams of one week apart when it looks at dispersion', () => {
    const both = [...week([2, 2, 2]), ...week([40, 40, 40], 100_000, 'drill')];
    const mixed = { loom: '1', before: both, after: [...both].reverse() };
    expect(page([mixed]).dispersion).toMatchObject({ asFound: 0, degrees: 8 });
    expect(verdict([mixed], '1').verdict).not.toBe('warp-changed');
  });

  it('says too little, and what would be enough', () => {
    const short = { loom: '2', before: week([2, 3]), after: week([3, 2]) };
    const { verdict: said, enough } = verdict([steady('1'), short], '2');
    expect(said).toBe('too-little');
    const { events, exposure } = enough as { events: number; exposure: number };
    expect(exposure).toBeCloseTo(events / (10 / 400_000), 4);
    expect(exposure).toBeGreaterThan(200_000);
  });

  it('takes the rate of the shed where a loom had no breaks', () => {
    const quiet = { loom: '2', before: week([0, 0]), after: week([0, 0]) };
    const { enough, verdict: said } = verdict([steady('1'), quiet], '2');
    const { events, exposure } = enough as { events: number; exposure: number };
    expect(exposure).toBeCloseTo(events / (200 / 4_400_000), 4);
    expect(said).toBe('too-little');
  });

  it('has no comparison where a week has no picks', () => {
    const idle = { loom: '2', before: week([0, 0], 0), after: week(about(5)) };
    expect(verdict([steady('1'), idle], '2')).toMatchObject({
      verdict: 'too-little',
      comparison: { none: 'no-exposure' },
      adjusted: { none: 'not-comparable' },
      before: { count: 0, exposure: 0 },
    });
    expect(page([idle]).looms[0].verdict).toBe('too-little');
  });

  it('leaves out shifts without picks, whatever was logged in them', () => {
    const loom = steady('1');
    const stood = { count: 9, exposure: 0, cloth: 'other', beam: '9' };
    expect(page([{ ...loom, after: [...loom.after, stood] }])).toEqual(page([loom]));
  });

  it('has no figure where nothing can be told, nor from impossible input', () => {
    expect(compareTwoWeeks([])).toEqual({ none: 'no-exposure' });
    expect(compareTwoWeeks([{ loom: '1', before: week([-1]), after: week([1]) }])).toEqual({
      none: 'out-of-range',
    });
    expect(compareTwoWeeks([{ loom: '1', before: week([1]), after: week([NaN]) }])).toEqual({
      none: 'missing-input',
    });
  });
});
