import { describe, expect, it } from 'vitest';
import { lostByCause, lostPicks } from './lost-time.js';
import { noFigure } from './no-figure.js';

const TOTALS = { possiblePicks: 86_400, measuredPicks: 9_000, estimatedPicks: 1_800, picks: 70_000 };

describe('lostPicks', () => {
  it('is n·T − A: measured, estimated and the unaccounted rest', () => {
    expect(lostPicks(TOTALS)).toEqual({
      lost: 16_400,
      measured: 9_000,
      estimated: 1_800,
      unaccounted: 5_600,
    });
  });

  it('shows over-logging as negative', () => {
    expect(lostPicks({ ...TOTALS, picks: 80_000 })).toMatchObject({ lost: 6_400, unaccounted: -4_400 });
  });

  it('has no figure without picks or speed', () => {
    const none = noFigure('missing-input');
    expect(lostPicks({ ...TOTALS, picks: null })).toEqual({
      lost: none,
      measured: 9_000,
      estimated: 1_800,
      unaccounted: none,
    });
    const slow = noFigure('no-speed');
    expect(lostPicks({ ...TOTALS, possiblePicks: null })).toMatchObject({ lost: slow, unaccounted: slow });
    expect(lostPicks({ ...TOTALS, measuredPicks: null })).toMatchObject({
      measured: slow,
      unaccounted: slow,
    });
    expect(lostPicks({ ...TOTALS, estimatedPicks: null })).toMatchObject({
      estimated: slow,
      unaccounted: slow,
    });
  });
});

describe('lostByCause', () => {
  it('has the greatest first, equal ones by cause, each with its group', () => {
    const rows = lostByCause(
      {
        minutesByCause: {
          picking: { measured: 5, estimated: 0 },
          boxes: { measured: 3, estimated: 2 },
          smash: { measured: 20, estimated: 0 },
        },
      },
      (cause) => (cause === 'smash' ? 'warp' : null),
    );
    expect(rows).toEqual([
      { cause: 'smash', group: 'warp', measured: 20, estimated: 0, minutes: 20 },
      { cause: 'boxes', group: null, measured: 3, estimated: 2, minutes: 5 },
      { cause: 'picking', group: null, measured: 5, estimated: 0, minutes: 5 },
    ]);
  });
});
