import type { PatternFacts } from '@shared/contract/set-up';
import { isDate } from '../../../core/dates';
import { nameProblem } from '../cloths/typed';
import { localTimeProblem, minutesBetween, readLocalTime } from './local-time';

/** A pattern's form as typed. */
export interface PatternValues {
  readonly name: string;
  readonly starts: string;
  readonly ends: string;
  /** 1 Monday … 7 Sunday. */
  readonly weekdays: readonly number[];
  readonly meal: 'none' | 'stopped' | 'running';
  readonly mealStarts: string;
  readonly mealEnds: string;
  /** The first date on which it is so. */
  readonly from: string;
}
export type PatternField = Exclude<keyof PatternValues, 'meal'>;

export interface PatternReading {
  readonly facts: PatternFacts | null;
  readonly from: string | null;
  readonly problems: Readonly<Partial<Record<PatternField, string>>>;
}

export function patternValuesOf(facts: PatternFacts | null, from: string): PatternValues {
  if (!facts)
    return {
      name: '',
      starts: '',
      ends: '',
      weekdays: [1, 2, 3, 4, 5],
      meal: 'none',
      mealStarts: '',
      mealEnds: '',
      from,
    };
  return {
    name: facts.name,
    starts: facts.startsLocal,
    ends: facts.endsLocal,
    weekdays: [...facts.weekdays].sort((a, b) => a - b),
    meal: facts.meal?.looms ?? 'none',
    mealStarts: facts.meal?.startsLocal ?? '',
    mealEnds: facts.meal?.endsLocal ?? '',
    from,
  };
}

/** What the form says. `facts` can be whole while the date is not: examples need no date. */
export function readPattern(values: PatternValues, taken: readonly string[] = []): PatternReading {
  const problems: Partial<Record<PatternField, string>> = {};
  const say = (field: PatternField, problem: string) => {
    if (problem) problems[field] = problem;
  };
  say('name', nameProblem(values.name, 'the pattern', taken));
  say('starts', localTimeProblem(values.starts, 'the start', '06:00'));
  say('ends', localTimeProblem(values.ends, 'the end', '14:00'));
  if (values.weekdays.length === 0) say('weekdays', 'Choose at least one day on which it starts.');
  const [startsLocal, endsLocal] = [readLocalTime(values.starts), readLocalTime(values.ends)];
  const meal = values.meal === 'none' ? null : readMeal(values, startsLocal, endsLocal, say);
  const whole = Object.keys(problems).length === 0 && startsLocal !== null && endsLocal !== null;
  say('from', isDate(values.from) ? '' : 'Type the first date, such as 2026-12-07.');
  if (!whole) return { facts: null, from: null, problems };
  const weekdays = [...values.weekdays].sort((a, b) => a - b);
  return {
    facts: { name: values.name.trim(), startsLocal, endsLocal, weekdays, meal },
    from: problems.from ? null : values.from,
    problems,
  };
}

function readMeal(
  values: PatternValues,
  startsLocal: string | null,
  endsLocal: string | null,
  say: (field: PatternField, problem: string) => void,
): PatternFacts['meal'] {
  say('mealStarts', localTimeProblem(values.mealStarts, 'when the meal begins', '10:00'));
  say('mealEnds', localTimeProblem(values.mealEnds, 'when the meal ends', '10:30'));
  const [from, to] = [readLocalTime(values.mealStarts), readLocalTime(values.mealEnds)];
  if (from === null || to === null || startsLocal === null || endsLocal === null) return null;
  const length = minutesBetween(startsLocal, endsLocal);
  const [begins, lasts] = [minutesBetween(startsLocal, from) % 1_440, minutesBetween(from, to)];
  if (begins >= length)
    say(
      'mealStarts',
      `The meal begins at ${from}, outside the shift: it lies between ${startsLocal} and ${endsLocal}.`,
    );
  else if (begins + lasts > length)
    say('mealEnds', `The meal ends at ${to}, after the shift’s end: it is over by ${endsLocal}.`);
  else if (lasts === length) say('mealEnds', 'The meal is as long as the shift: no time to weave is left.');
  return { startsLocal: from, endsLocal: to, looms: values.meal === 'running' ? 'running' : 'stopped' };
}
