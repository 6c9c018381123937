import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { CalendarDayRow, ShiftPatternRow, type ShiftRow } from '../../database/entities/index.js';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { HOUR } from '../../testing/test-entries.js';
import { testShiftKey } from '../../testing/test-mill.js';
import { ensureShifts } from './shifts.js';

const at = (moment: string) => Date.parse(moment);

describe('shifts from patterns and calendar', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  const make = (from: string, until: string) =>
    book.writer.write((tx) => ensureShifts(tx, at(from), at(until)));
  const shifts = () => book.data.query<ShiftRow[]>(`SELECT * FROM "shift" ORDER BY "shedId", "startsAt"`);
  const hoursOf = async (key: string) => {
    const shift = (await shifts()).find((one) => one.key === key);
    return shift ? (shift.endsAt - shift.startsAt) / HOUR : null;
  };

  it('keeps real elapsed time over both changes of the clocks in London', async () => {
    await make('2026-03-27T12:00Z', '2026-03-30T12:00Z');
    await make('2026-10-23T12:00Z', '2026-10-26T12:00Z');
    expect(await hoursOf(testShiftKey('2026-03-28', 'night'))).toBe(7);
    expect(await hoursOf(testShiftKey('2026-03-29', 'night'))).toBe(8);
    expect(await hoursOf(testShiftKey('2026-10-24', 'night'))).toBe(9);
    const spring = (await shifts()).find((one) => one.key === testShiftKey('2026-03-28', 'night'));
    expect(spring).toMatchObject({ startsAt: at('2026-03-28T22:00Z'), endsAt: at('2026-03-29T05:00Z') });
  });

  it('makes each once, whatever range it is asked for, and never changes one that is there', async () => {
    const { made } = await make('2026-03-13T12:00Z', '2026-03-20T12:00Z');
    expect(made).toBe(8 * 3 * 2);
    const before = await shifts();
    await book.data.query(`UPDATE "shift_pattern" SET "startsLocal" = '07:00' WHERE "id" = 'north-early'`);
    expect((await make('2026-03-10T12:00Z', '2026-03-20T12:00Z')).made).toBe(0);
    expect(await shifts()).toEqual(before);
  });

  it('never makes shifts of one shed overlap', async () => {
    await book.data.query(`UPDATE "shift_pattern" SET "endsLocal" = '15:00' WHERE "id" = 'north-early'`);
    await make('2026-03-13T12:00Z', '2026-03-20T12:00Z');
    for (const shed of ['north', 'south']) {
      const ofShed = (await shifts()).filter((one) => one.shedId === shed);
      ofShed.slice(1).forEach((one, before) => {
        expect(one.startsAt).toBeGreaterThanOrEqual(ofShed[before]?.endsAt ?? 0);
      });
    }
  });

  it('heeds days off, short days and overtime, and drops a meal that a short day has no room for', async () => {
    await book.data.getRepository(ShiftPatternRow).update('north-early', {
      weekdays: [1, 2, 3, 4, 5],
      meal: { startsLocal: '12:00', endsLocal: '12:30', looms: 'stopped' },
    });
    const day = (date: string, patternId: string, more: Partial<CalendarDayRow>) => ({
      shedId: 'north',
      date,
      patternId,
      kind: 'off' as const,
      startsLocal: null,
      endsLocal: null,
      reason: 'Test',
      ...more,
    });
    await book.data
      .getRepository(CalendarDayRow)
      .insert([
        day('2026-03-16', '*', { kind: 'off' }),
        day('2026-03-17', 'north-early', { kind: 'short', endsLocal: '11:00' }),
        day('2026-03-21', 'north-early', { kind: 'overtime', endsLocal: '10:00' }),
      ]);
    await make('2026-03-16T12:00Z', '2026-03-22T12:00Z');
    const made = await shifts();
    expect(made.filter((one) => one.shedId === 'north' && one.date === '2026-03-16')).toEqual([]);
    expect(await hoursOf(testShiftKey('2026-03-17'))).toBe(5);
    expect(await hoursOf(testShiftKey('2026-03-21'))).toBe(4);
    expect(await hoursOf(testShiftKey('2026-03-22'))).toBeNull();
    const meal = (date: string) => made.find((one) => one.key === testShiftKey(date))?.mealStartsAt;
    expect(meal('2026-03-17')).toBeNull();
    expect(meal('2026-03-18')).toBe(at('2026-03-18T12:00Z'));
  });
});
