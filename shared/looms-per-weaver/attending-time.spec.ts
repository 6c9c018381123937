import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { attendingTimeFromStanding, type SolvedAttendingTime } from './attending-time.js';
import { solve } from './interference.js';

const solved = (...args: Parameters<typeof attendingTimeFromStanding>) =>
  attendingTimeFromStanding(...args) as SolvedAttendingTime;

describe('attendingTimeFromStanding', () => {
  it('is all of the standing time of a single loom', () => {
    const { attendingMinutes, waitingMinutes, rho } = solved(
      { stops: 50, runningMinutes: 400, standingMinutes: 100 },
      1,
    );
    expect(attendingMinutes).toBeCloseTo(2, 10);
    expect(waitingMinutes).toBeCloseTo(0, 10);
    expect(rho).toBeCloseTo(0.25, 10);
  });

  it('takes the waiting out', () => {
    // Six looms at ρ .1 run .8591418272 of the time: a stop every 10 min of running, attended in 1 min.
    const efficiency = 0.859141827202605;
    const logged = { stops: 100, runningMinutes: 1000, standingMinutes: 1000 / efficiency - 1000 };
    const { attendingMinutes, waitingMinutes } = solved(logged, 6);
    expect(attendingMinutes).toBeCloseTo(1, 9);
    expect(waitingMinutes).toBeCloseTo(10 / efficiency - 10 - 1, 9);
  });

  it('gives back the ρ that made the standing time', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.double({ min: 0.001, max: 0.3, noNaN: true }),
        fc.constantFrom('exponential', 'constant'),
        fc.integer({ min: 1, max: 4 }),
        (looms, rho, times, sharing) => {
          const weavers = times === 'constant' ? 1 : sharing;
          fc.pre(looms * rho < 0.9 * weavers);
          const { efficiency } = solve(times, looms, rho, weavers);
          const logged = { stops: 10, runningMinutes: 100, standingMinutes: 100 / efficiency - 100 };
          const back = solved(logged, looms, weavers, times);
          expect(back.rho / rho).toBeCloseTo(1, 8);
          expect(back.attendingMinutes / (10 * rho)).toBeCloseTo(1, 8);
        },
      ),
    );
  });

  it('is nothing where nothing stood', () => {
    expect(solved({ stops: 4, runningMinutes: 100, standingMinutes: 0 }, 6)).toEqual({
      rho: 0,
      attendingMinutes: 0,
      waitingMinutes: 0,
    });
  });

  it('has no figure without stops or running, nor from impossible input', () => {
    const logged = { stops: 4, runningMinutes: 100, standingMinutes: 10 };
    expect(attendingTimeFromStanding({ ...logged, stops: 0 }, 6)).toEqual({ none: 'no-events' });
    expect(attendingTimeFromStanding({ ...logged, runningMinutes: 0 }, 6)).toEqual({ none: 'no-time' });
    for (const missing of ['stops', 'runningMinutes', 'standingMinutes']) {
      expect(attendingTimeFromStanding({ ...logged, [missing]: NaN }, 6)).toEqual({ none: 'missing-input' });
      expect(attendingTimeFromStanding({ ...logged, [missing]: -1 }, 6)).toEqual({ none: 'out-of-range' });
      expect(attendingTimeFromStanding({ ...logged, [missing]: Infinity }, 6)).toEqual({
        none: 'out-of-range',
      });
    }
    expect(attendingTimeFromStanding(logged, 0)).toEqual({ none: 'out-of-range' });
    expect(attendingTimeFromStanding(logged, 6, 2, 'constant')).toEqual({ none: 'out-of-range' });
    // One loom that stands longer than it runs: ρ is 2.
    expect(attendingTimeFromStanding({ ...logged, standingMinutes: 200 }, 1)).toEqual({
      none: 'out-of-range',
    });
  });
});
