import { addDays, dateOf, formatDay, formatMoment, formatTime, isDate, mondayOf } from './dates';

describe('dates', () => {
  it('know the calendar', () => {
    expect(isDate('2024-02-29')).toBe(true);
    for (const text of ['2026-02-29', '2026-13-01', '2026-1-1', 'today', ''])
      expect(isDate(text)).toBe(false);
  });

  it('count days over months, years and changes of the clock', () => {
    expect(addDays('2026-12-31', 1)).toBe('2027-01-01');
    expect(addDays('2026-03-29', 1)).toBe('2026-03-30');
    expect(addDays('2026-03-01', -1)).toBe('2026-02-28');
  });

  it('begin weeks on Mondays', () => {
    expect(mondayOf('2026-05-11')).toBe('2026-05-11');
    expect(mondayOf('2026-05-17')).toBe('2026-05-11');
    expect(mondayOf('2027-01-01')).toBe('2026-12-28');
  });

  it('read moments by the mill’s clock, wherever the device is', () => {
    const midnightInLondon = Date.UTC(2026, 5, 1, 23, 0);
    expect(formatTime(midnightInLondon, 'Europe/London')).toBe('00:00');
    expect(dateOf(midnightInLondon, 'Europe/London')).toBe('2026-06-02');
    expect(dateOf(midnightInLondon, 'UTC')).toBe('2026-06-01');
    expect(formatMoment(midnightInLondon, midnightInLondon + 3_600_000, 'Europe/London')).toBe('00:00');
    expect(formatMoment(midnightInLondon, midnightInLondon + 3_600_000, 'UTC')).toBe('Mon 1 Jun, 23:00');
    expect(formatDay('2026-05-11')).toBe('Mon 11 May');
  });
});
