import type { AbstractControl } from '@angular/forms';
import type { CalendarDay, Pattern } from '@shared/contract/set-up';
import { problemOfField } from '../common/field';
import { judge } from '../common/judge-together';
import { DAY_LABELS, calendarDay, dayForm, hanging } from './day-form';
import { addMonths, dateByKey, dayWords, monthWeeks, runsOn, spokenDay } from './month';

const pattern = (
  id: string,
  startsLocal: string,
  weekdays: number[],
  more: Partial<Pattern> = {},
): Pattern => ({
  id,
  shedId: 'shed',
  name: id,
  startsLocal,
  endsLocal: '14:00',
  weekdays,
  meal: null,
  from: null,
  until: null,
  ...more,
});
const PATTERNS = [pattern('Late', '14:00', [1, 2, 3, 4, 5]), pattern('Early', '06:00', [1, 2, 3, 4, 5])];
const DAY: CalendarDay = {
  shedId: 'shed',
  date: '2026-12-25',
  patternId: '*',
  kind: 'off',
  startsLocal: null,
  endsLocal: null,
  reason: 'Christmas Day',
};
const has = (id: string, date: string) => PATTERNS.some((one) => one.id === id && runsOn(one, date));
const open = (day: Partial<CalendarDay> = {}) => dayForm({ ...DAY, ...day }, has);

describe('a day of the calendar', () => {
  it('says what it opened with', () => {
    expect(calendarDay(open(), 'shed')).toEqual(DAY);
    const short = {
      ...DAY,
      kind: 'short',
      patternId: 'Early',
      startsLocal: '06:00',
      endsLocal: '10:00',
    } as const;
    expect(calendarDay(open(short), 'shed')).toEqual(short);
  });

  it.each<[keyof typeof DAY_LABELS, Record<string, unknown>, string]>([
    ['date', { date: '2026-02-30' }, 'Choose a date, such as 2026-12-25.'],
    ['reason', { reason: ' ' }, 'Reason is missing.'],
    ['patternId', { patternId: '' }, 'Choose which shifts it is for.'],
    ['patternId', { kind: 'short' }, 'Choose one of the patterns: all at other hours would run at once.'],
    [
      'patternId',
      { kind: 'short', patternId: 'Early', date: '2026-12-26' },
      'This pattern has no shift on that date. Choose another, or overtime.',
    ],
    ['starts', { kind: 'short', patternId: 'Early' }, 'Type the start as hours and minutes, such as 06:00.'],
    [
      'ends',
      { kind: 'overtime', patternId: 'Early', starts: '06:00' },
      'Type the end as hours and minutes, such as 12:00.',
    ],
    [
      'ends',
      { kind: 'overtime', patternId: 'Early', starts: '06:00', ends: 'noon' },
      '“noon” is no time of day. Type the end as hours and minutes, such as 12:00.',
    ],
  ])('%s: %j', (at, change, sentence) => {
    const form = open();
    for (const [key, value] of Object.entries(change)) form.get(key)?.setValue(value);
    judge(form, hanging(form));
    const control: AbstractControl | null = form.get(at);
    expect(control && problemOfField(control, DAY_LABELS[at])).toBe(sentence);
    expect(calendarDay(form, 'shed')).toBeNull();
  });

  it('takes overtime without hours for the pattern’s own, and forgets hours on a holiday', () => {
    expect(calendarDay(open({ kind: 'overtime', patternId: 'Early' }), 'shed')).toMatchObject({
      startsLocal: null,
    });
    expect(calendarDay(open({ startsLocal: '06:00', endsLocal: '10:00' }), 'shed')).toEqual(DAY);
  });
});

describe('a month', () => {
  const calendar: CalendarDay[] = [
    DAY,
    { ...DAY, date: '2026-12-26', kind: 'overtime', patternId: 'Early', reason: 'a large order' },
    { ...DAY, date: '2026-12-24', kind: 'off', patternId: 'Late', reason: 'Christmas Eve' },
    { ...DAY, date: '2026-12-02', shedId: 'other' },
  ];
  const weeks = monthWeeks('2026-12', 'shed', PATTERNS, calendar);
  const day = (date: string) => weeks.flat().find((one) => one.date === date);

  it('has whole weeks from Monday on', () => {
    expect(weeks).toHaveLength(5);
    expect([weeks[0]?.[0]?.date, weeks.at(-1)?.at(-1)?.date]).toEqual(['2026-11-30', '2027-01-03']);
    expect(day('2026-11-30')?.inMonth).toBe(false);
  });

  it.each([
    ['2026-12-02', ['Early', 'Late']],
    ['2026-12-24', ['Early']],
    ['2026-12-25', []],
    ['2026-12-26', ['Early']],
    ['2026-12-27', []],
  ])('%s has %j', (date, shifts) => {
    expect(day(date)?.shifts).toEqual(shifts);
  });

  it('is said in words', () => {
    const christmas = day('2026-12-25');
    expect(christmas && spokenDay(christmas)).toBe('Fri 25 Dec. Holiday: Christmas Day. No shift');
    expect(
      dayWords(
        { ...DAY, kind: 'short', patternId: 'Early', startsLocal: '06:00', endsLocal: '10:00' },
        PATTERNS,
      ),
    ).toBe('Short day, Early 06:00 to 10:00: Christmas Day');
  });
});

it.each([
  ['ArrowLeft', '2026-02-28'],
  ['ArrowRight', '2026-03-02'],
  ['ArrowUp', '2026-02-22'],
  ['ArrowDown', '2026-03-08'],
  ['Home', '2026-02-23'],
  ['End', '2026-03-01'],
  ['PageUp', '2026-02-01'],
  ['PageDown', '2026-04-01'],
  ['a', null],
])('%s goes from Sunday 1 March to %s', (key, date) => {
  expect(dateByKey(key, '2026-03-01')).toBe(date);
});

it('goes to the last day of a shorter month', () => {
  expect(dateByKey('PageDown', '2026-01-31')).toBe('2026-02-28');
  expect(addMonths('2026-12', 1)).toBe('2027-01');
});
