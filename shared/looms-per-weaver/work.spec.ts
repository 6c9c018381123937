import { describe, expect, it } from 'vitest';
import { stopWork, type StopWork } from './work.js';

describe('stopWork', () => {
  it('adds kinds of stops into ρ', () => {
    // 200 ppm: 2 warp breaks of 1 min and 3 weft breaks of half a minute in 100,000 picks, 500 min of running
    const { stopsPerRunningMinute, attendingMinutes, rho } = stopWork(
      [
        { per100000Picks: 2, attendingMinutes: 1 },
        { per100000Picks: 3, attendingMinutes: 0.5 },
      ],
      200,
    ) as StopWork;
    expect(stopsPerRunningMinute).toBeCloseTo(0.01, 14);
    expect(rho).toBeCloseTo(3.5 / 500, 14);
    expect(attendingMinutes).toBeCloseTo(0.7, 14);
  });

  it('has no figure without speed or stops, nor from impossible input', () => {
    const stops = [{ per100000Picks: 2, attendingMinutes: 1 }];
    expect(stopWork(stops, 0)).toEqual({ none: 'no-speed' });
    expect(stopWork([], 200)).toEqual({ none: 'no-events' });
    expect(stopWork([{ per100000Picks: 0, attendingMinutes: 1 }], 200)).toEqual({ none: 'no-events' });
    expect(stopWork(stops, NaN)).toEqual({ none: 'missing-input' });
    expect(stopWork([{ per100000Picks: NaN, attendingMinutes: 1 }], 200)).toEqual({ none: 'missing-input' });
    expect(stopWork(stops, -200)).toEqual({ none: 'out-of-range' });
    expect(stopWork([{ per100000Picks: 2, attendingMinutes: Infinity }], 200)).toEqual({
      none: 'out-of-range',
    });
  });
});
