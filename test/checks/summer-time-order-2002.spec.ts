import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { shiftsOn } from '../../api/features/book/pattern-shifts.js';
import { projectLine } from '../../shared/entries/projection.js';
import { noInterval } from '../../shared/figures/breaks.js';
import { lineFigures, lineTotals } from '../../shared/figures/loom-line.js';
import { aLineInput, aShift, bookOf, entryBuilder, SHED_ID } from '../../shared/testing/builders.js';

// Clocks change at 01:00 UTC in the United Kingdom (Summer Time Order 2002) and in Ireland (S.I. 506/2001).

const NIGHT = {
  id: 'night',
  shedId: SHED_ID,
  name: 'Night',
  startsLocal: '22:00',
  endsLocal: '06:00',
  weekdays: [1, 2, 3, 4, 5, 6, 7],
  meal: null,
  rootId: null,
  from: null,
  until: null,
};

function nightOf(date: string, zone: string) {
  const [shift] = shiftsOn(date, [NIGHT], [], zone);
  if (!shift) throw new Error(`no night shift on ${date}`);
  return shift;
}
const local = (text: string, zone = 'Europe/London') => DateTime.fromISO(text, { zone }).toMillis();

describe.each(['Europe/London', 'Europe/Dublin'])('22:00 to 06:00 in %s', (zone) => {
  it.each([
    ['2026-03-27', 8],
    ['2026-03-28', 7],
    ['2026-03-29', 8],
    ['2026-10-23', 8],
    ['2026-10-24', 9],
    ['2026-10-25', 8],
  ])('from %s is %d h long', (date, hours) => {
    const night = nightOf(date, zone);
    expect((night.endsAt - night.startsAt) / 3_600_000).toBe(hours);
  });

  it('changes at 01:00 UTC', () => {
    const offset = (instant: string) => DateTime.fromISO(instant).setZone(zone).offset;
    expect(offset('2026-03-29T00:59:59Z')).toBe(0);
    expect(offset('2026-03-29T01:00:00Z')).toBe(60);
    expect(offset('2026-10-25T00:59:59Z')).toBe(60);
    expect(offset('2026-10-25T01:00:00Z')).toBe(0);
  });
});

describe('half past one', () => {
  it('does not exist on the night in March', () => {
    const moment = DateTime.fromISO('2026-03-29T01:30', { zone: 'Europe/London' });
    expect(moment.toFormat('HH:mm')).toBe('02:30');
  });

  it('comes twice on the night in October, an hour apart', () => {
    const shown = (instant: string) =>
      DateTime.fromISO(instant).setZone('Europe/London').toFormat('yyyy-MM-dd HH:mm');
    expect(shown('2026-10-25T00:30:00Z')).toBe('2026-10-25 01:30');
    expect(shown('2026-10-25T01:30:00Z')).toBe('2026-10-25 01:30');
  });
});

describe('figures of a night at a clock change', () => {
  function lineOf(date: string, from: number, until: number) {
    const row = nightOf(date, 'Europe/London');
    const shift = aShift({ key: row.key, date, startsAt: row.startsAt, endsAt: row.endsAt });
    const { entry } = entryBuilder(1, shift);
    const read = (boundary: 'start' | 'end', at: number, value: number) =>
      bookOf(entry('reading', 0, { boundary, value, at }), shift);
    const stop = entry('stop', 0, { cause: 'smash', count: 1, at: from, until });
    const fromThen = <V extends { effectiveAt: number }>(versions: readonly V[]) =>
      versions.map((one) => ({ ...one, effectiveAt: 0 }));
    const input = aLineInput({ shift });
    const line = projectLine({
      ...input,
      loomVersions: fromThen(input.loomVersions),
      causeVersions: fromThen(input.causeVersions),
      entries: [read('start', shift.startsAt, 0), read('end', shift.endsAt, 70_000), bookOf(stop, shift)],
    });
    return { totals: lineTotals(line, shift.endsAt), figures: lineFigures(line, shift.endsAt, noInterval) };
  }

  it('in March holds 70,000 picks against 7 h, and a stop from 00:50 to 02:10 lasts 20 min', () => {
    const { totals, figures } = lineOf('2026-03-28', local('2026-03-29T00:50'), local('2026-03-29T02:10'));
    expect(totals).toMatchObject({ minutes: 420, measuredMinutes: 20 });
    expect(figures).toMatchObject({ efficiency: 70_000 / (180 * 420), picksPerHour: 10_000 });
  });

  it('in October against 9 h, and a stop from 00:50 to 02:10 lasts 140 min', () => {
    const { totals, figures } = lineOf('2026-10-24', local('2026-10-25T00:50'), local('2026-10-25T02:10'));
    expect(totals).toMatchObject({ minutes: 540, measuredMinutes: 140 });
    expect(figures).toMatchObject({ efficiency: 70_000 / (180 * 540) });
  });
});
