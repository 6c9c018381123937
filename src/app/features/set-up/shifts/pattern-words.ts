import type { Pattern, PatternExamples, PatternFacts } from '@shared/contract/set-up';
import { formatMinutes } from '@shared/figures/format';
import { formatDay } from '../../../core/dates';
import { clockTime } from '../../../ui/clock-time';
import { endsNextDay, minutesBetween } from './local-time';

export const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const;
export const WEEKDAY_NAMES = [
  'Monday',
  'Tuesday',
  'Wednesday',
  'Thursday',
  'Friday',
  'Saturday',
  'Sunday',
] as const;

/** "Mon to Fri", "Mon, Wed, Fri", "every day". */
export function weekdayWords(weekdays: readonly number[]): string {
  const days = [...weekdays].sort((a, b) => a - b);
  const name = (day: number | undefined) => WEEKDAYS[(day ?? 1) - 1] ?? '';
  if (days.length === 7) return 'every day';
  const [first, last] = [days[0], days.at(-1)];
  const unbroken = first !== undefined && last !== undefined && last - first === days.length - 1;
  if (unbroken && days.length > 2) return `${name(first)} to ${name(last)}`;
  return days.map(name).join(', ');
}

/** Minutes of a shift of this pattern on a night without a change of clocks. */
export function usualMinutes(facts: PatternFacts): number {
  const all = minutesBetween(facts.startsLocal, facts.endsLocal);
  const { meal } = facts;
  return meal?.looms === 'stopped' ? all - minutesBetween(meal.startsLocal, meal.endsLocal) : all;
}

/** A pattern as a sentence: "Mon to Fri, 22:00 to 06:00 the next day: 7 h 30 min, the looms stand from 02:00 to 02:30". */
export function patternSentence(facts: PatternFacts): string {
  const { startsLocal, endsLocal, meal, weekdays } = facts;
  const next = endsNextDay(startsLocal, endsLocal) ? ' the next day' : '';
  const eats = meal ? `meal ${meal.startsLocal} to ${meal.endsLocal}, ${MEAL_WORDS[meal.looms]}` : 'no meal';
  const days = weekdayWords(weekdays);
  return `${days.charAt(0).toUpperCase()}${days.slice(1)}, ${startsLocal} to ${endsLocal}${next}: ${formatMinutes(usualMinutes(facts))}, ${eats}.`;
}

export const MEAL_WORDS = { stopped: 'looms stopped', running: 'looms running' } as const;

const EXAMPLE_WORDS: Readonly<Record<PatternExamples['examples'][number]['of'], string>> = {
  next: 'The next shift',
  'clocks-forward': 'The clocks go forward',
  'clocks-back': 'The clocks go back',
};

export interface ExampleWords {
  readonly heading: string;
  /** "Sat 27 Mar, 22:00 to Sun 28 Mar, 06:00". */
  readonly when: string;
  readonly minutes: string;
  /** Against a usual night: "1 h less than usual"; empty: as usual. */
  readonly difference: string;
}

/** Worked examples in words, each against what the pattern usually comes to. */
export function exampleWords(
  examples: PatternExamples,
  facts: PatternFacts,
  timeZone: string,
): ExampleWords[] {
  return examples.examples.map(({ of, date, startsAt, endsAt, minutes }) => {
    const less = usualMinutes(facts) - minutes;
    const end = endsNextDay(facts.startsLocal, facts.endsLocal) ? ' the next day' : '';
    return {
      heading: EXAMPLE_WORDS[of],
      when: `${formatDay(date)}, ${clockTime(startsAt, timeZone)} to ${clockTime(endsAt, timeZone)}${end}`,
      minutes: formatMinutes(minutes),
      difference:
        Math.abs(less) < 1 ? '' : `${formatMinutes(Math.abs(less))} ${less > 0 ? 'less' : 'more'} than usual`,
    };
  });
}

/** Which patterns a new one would overlap, and what to do; empty: none. */
export function overlapWords(overlaps: readonly string[]): string {
  if (overlaps.length === 0) return '';
  const names =
    overlaps.length === 1
      ? (overlaps[0] ?? '')
      : `${overlaps.slice(0, -1).join(', ')} and ${overlaps.at(-1) ?? ''}`;
  return `It overlaps ${names}. Two shifts of one shed never run at once: change the hours or the days, or end ${overlaps.length === 1 ? names : 'those'} first.`;
}

/** From when, and until when: "since the beginning", "from Mon 7 Dec", "Mon 7 Dec to Sun 20 Dec". */
export function spanWords({ from, until }: Pick<Pattern, 'from' | 'until'>): string {
  if (from === null && until === null) return 'since the beginning';
  if (until === null) return `from ${formatDay(from ?? '')}`;
  const last = formatDay(dayBefore(until));
  return from === null ? `until ${last}` : `${formatDay(from)} to ${last}`;
}

function dayBefore(date: string): string {
  return new Date(Date.parse(`${date}T00:00Z`) - 86_400_000).toISOString().slice(0, 10);
}
