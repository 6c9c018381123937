import type { Pattern, PatternFacts } from '@shared/contract/set-up';
import { exampleWords, overlapWords, patternSentence, spanWords, weekdayWords } from './pattern-words';
import { ribbonPieces, uncoveredMinutes, weekRibbons } from './week-ribbons';

const NIGHT: PatternFacts = {
  name: 'Night',
  startsLocal: '22:00',
  endsLocal: '06:00',
  weekdays: [1, 2, 3, 4, 7],
  meal: { startsLocal: '02:00', endsLocal: '02:30', looms: 'stopped' },
};
const pattern = (name: string, facts: Partial<Pattern>): Pattern => ({
  ...NIGHT,
  id: name,
  shedId: 'shed',
  name,
  from: null,
  until: null,
  ...facts,
});

it.each([
  [[1, 2, 3, 4, 5], 'Mon to Fri'],
  [[5, 1, 3], 'Mon, Wed, Fri'],
  [[6, 7], 'Sat, Sun'],
  [[1, 2, 3, 4, 5, 6, 7], 'every day'],
])('%j is %s', (days, words) => {
  expect(weekdayWords(days)).toBe(words);
});

it('says a pattern as a sentence, less a meal at which the looms stand', () => {
  expect(patternSentence({ ...NIGHT, weekdays: [1, 2, 3, 4] })).toBe(
    'Mon to Thu, 22:00 to 06:00 the next day: 7 h 30 min, meal 02:00 to 02:30, looms stopped.',
  );
  const running = { startsLocal: '10:00', endsLocal: '10:30', looms: 'running' as const };
  expect(patternSentence({ ...NIGHT, startsLocal: '06:00', endsLocal: '14:00', meal: running })).toBe(
    'Mon, Tue, Wed, Thu, Sun, 06:00 to 14:00: 8 h, meal 10:00 to 10:30, looms running.',
  );
});

it('begins a sentence with a capital', () => {
  expect(patternSentence({ ...NIGHT, weekdays: [1, 2, 3, 4, 5, 6, 7], meal: null })).toBe(
    'Every day, 22:00 to 06:00 the next day: 8 h, no meal.',
  );
});

it('holds the nights on which the clocks change against a usual one', () => {
  const at = (text: string) => Date.parse(text);
  const said = exampleWords(
    {
      examples: [
        {
          of: 'next',
          date: '2026-12-01',
          startsAt: at('2026-12-01T22:00Z'),
          endsAt: at('2026-12-02T06:00Z'),
          minutes: 450,
        },
        {
          of: 'clocks-forward',
          date: '2027-03-27',
          startsAt: at('2027-03-27T22:00Z'),
          endsAt: at('2027-03-28T05:00Z'),
          minutes: 390,
        },
        {
          of: 'clocks-back',
          date: '2027-10-30',
          startsAt: at('2027-10-30T21:00Z'),
          endsAt: at('2027-10-31T06:00Z'),
          minutes: 510,
        },
      ],
      overlaps: [],
    },
    NIGHT,
    'Europe/London',
  );
  expect(said.map(({ when, minutes, difference }) => [when, minutes, difference])).toEqual([
    ['Tue 1 Dec, 22:00 to 06:00 the next day', '7 h 30 min', ''],
    ['Sat 27 Mar, 22:00 to 06:00 the next day', '6 h 30 min', '1 h less than usual'],
    ['Sat 30 Oct, 22:00 to 06:00 the next day', '8 h 30 min', '1 h more than usual'],
  ]);
});

it.each([
  [[], ''],
  [
    ['Early'],
    'It overlaps Early. Two shifts of one shed never run at once: change the hours or the days, or end Early first.',
  ],
  [
    ['Early', 'Late', 'Night'],
    'It overlaps Early, Late and Night. Two shifts of one shed never run at once: change the hours or the days, or end those first.',
  ],
])('names the overlaps of %j', (overlaps, words) => {
  expect(overlapWords(overlaps)).toBe(words);
});

it.each([
  [{ from: null, until: null }, 'since the beginning'],
  [{ from: '2026-12-07', until: null }, 'from Mon 7 Dec'],
  [{ from: '2026-12-07', until: '2026-12-21' }, 'Mon 7 Dec to Sun 20 Dec'],
  [{ from: null, until: '2026-12-07' }, 'until Sun 6 Dec'],
])('%j is %s', (span, words) => {
  expect(spanWords(span)).toBe(words);
});

describe('a shed’s week as ribbons', () => {
  const minutes = ({ left, width, kind }: { left: number; width: number; kind: string }) => [
    Math.round(left * 10_080),
    Math.round(width * 10_080),
    kind,
  ];

  it('brings Sunday night back in on Monday', () => {
    expect(ribbonPieces({ ...NIGHT, weekdays: [7] }).map(minutes)).toEqual([
      [9_960, 120, 'shift'],
      [0, 360, 'shift'],
      [120, 30, 'meal-stopped'],
    ]);
  });

  it('shows what is in force on the date, by its start, of that shed alone', () => {
    const patterns = [
      pattern('Night', {}),
      pattern('Early', { startsLocal: '06:00', endsLocal: '14:00', meal: null }),
      pattern('Old', { until: '2026-12-01' }),
      pattern('Next year', { from: '2027-01-01' }),
      pattern('Elsewhere', { shedId: 'other' }),
    ];
    expect(weekRibbons(patterns, 'shed', '2026-12-01').map(({ name }) => name)).toEqual(['Early', 'Night']);
    expect(uncoveredMinutes(weekRibbons(patterns, 'shed', '2026-12-01'))).toBe(7 * 1_440 - 5 * 960);
  });
});
