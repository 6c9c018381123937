import { clockTime } from '../../ui/clock-time';
import { momentAfter, momentNear } from './times';

const LONDON = 'Europe/London';
/** Tuesday 10 March 2026, 06:00 in London, then on UTC. */
const MORNING = Date.UTC(2026, 2, 10, 6);
const MINUTE = 60_000;

describe('a typed time', () => {
  it.each(['09:40', '0940', '9:40', ' 9.40 '])('takes %s', (text) => {
    expect(momentNear(text, MORNING, LONDON)).toBe(MORNING + 220 * MINUTE);
  });

  it.each(['', '9', 'ten', '24:00', '09:60'])('does not take "%s"', (text) => {
    expect(momentNear(text, MORNING, LONDON)).toBeNull();
    expect(momentAfter(text, MORNING, LONDON)).toBeNull();
  });

  it('is the nearest one, before or after, also over midnight', () => {
    const night = Date.UTC(2026, 2, 10, 23, 50);
    expect(momentNear('00:10', night, LONDON)).toBe(night + 20 * MINUTE);
    expect(momentNear('23:30', night + 30 * MINUTE, LONDON)).toBe(night - 20 * MINUTE);
  });

  it('is the first one from a moment on, where an end is asked for', () => {
    const night = Date.UTC(2026, 2, 10, 23, 50);
    expect(momentAfter('00:10', night, LONDON)).toBe(night + 20 * MINUTE);
    expect(momentAfter('23:40', night, LONDON)).toBe(night + (24 * 60 - 10) * MINUTE);
  });

  it('does not exist in the hour that the clocks leave out, and is the earlier where it exists twice', () => {
    // 29 March 2026: 01:00 becomes 02:00. 25 October: 02:00 becomes 01:00 again.
    expect(momentNear('01:30', Date.UTC(2026, 2, 29, 1), LONDON)).toBeNull();
    const twice = momentAfter('01:30', Date.UTC(2026, 9, 25, 0), LONDON);
    expect(twice).toBe(Date.UTC(2026, 9, 25, 0, 30));
    expect(clockTime(Date.UTC(2026, 9, 25, 1, 30), LONDON)).toBe('01:30');
  });
});
