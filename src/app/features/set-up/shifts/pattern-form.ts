import { FormControl, FormGroup, type AbstractControl } from '@angular/forms';
import { patternFactsSchema, type PatternFacts } from '@shared/contract/set-up';
import { isDate } from '../../../core/dates';
import { field, says } from '../common/field';
import { judge } from '../common/judge-together';
import { nameFree } from '../common/name-taken';
import { localTimeProblem, minutesBetween, readLocalTime } from './local-time';

export const PATTERN_LABELS = {
  name: 'Name',
  starts: 'Starts',
  ends: 'Ends',
  weekdays: 'Starts on',
  meal: 'Meal',
  mealStarts: 'Meal begins',
  mealEnds: 'Meal ends',
  from: 'From the date',
} as const;

/** Where a pattern's facts stand in the form. */
export const PATTERN_FIELDS: Readonly<Record<string, keyof typeof PATTERN_LABELS>> = {
  startsLocal: 'starts',
  endsLocal: 'ends',
  'meal.startsLocal': 'mealStarts',
  'meal.endsLocal': 'mealEnds',
};

export type Meal = 'none' | 'stopped' | 'running';
export const MEAL_CHOICES: readonly { readonly value: Meal; readonly words: string }[] = [
  { value: 'none', words: 'no meal' },
  { value: 'stopped', words: 'looms stopped: not shift minutes' },
  { value: 'running', words: 'looms running: shift minutes' },
];

/** A pattern's form, empty or as stored; times as they are typed. */
export function patternForm(pattern: PatternFacts | null, from: string, others: () => readonly string[]) {
  const text = (initial: string, sentence: (value: string, control: AbstractControl) => string) =>
    new FormControl(initial, { nonNullable: true, validators: [says<string>(sentence)] });
  const form = new FormGroup({
    name: field(patternFactsSchema.shape.name, pattern?.name ?? '', [nameFree(others)]),
    starts: text(pattern?.startsLocal ?? '', (time) => localTimeProblem(time, 'the start', '06:00')),
    ends: text(pattern?.endsLocal ?? '', (time) => localTimeProblem(time, 'the end', '14:00')),
    weekdays: new FormControl<readonly number[]>(pattern?.weekdays ?? [1, 2, 3, 4, 5], {
      nonNullable: true,
      validators: [
        says<readonly number[]>((days) =>
          days.length > 0 ? '' : 'Choose at least one day on which it starts.',
        ),
      ],
    }),
    meal: new FormControl<Meal>(pattern?.meal?.looms ?? 'none', { nonNullable: true }),
    mealStarts: text(pattern?.meal?.startsLocal ?? '', (_, control) => mealProblem(control).mealStarts),
    mealEnds: text(pattern?.meal?.endsLocal ?? '', (_, control) => mealProblem(control).mealEnds),
    from: text(from, (date) =>
      isDate(date) ? '' : 'Choose the first date on which it is so, such as 2026-12-07.',
    ),
  });
  // A field made before its form knew of no shift.
  judge(form, mealFields(form));
  return form;
}
export type PatternForm = ReturnType<typeof patternForm>;

/** Each of a meal's times hangs on the other and on the shift's. */
export function mealFields(form: FormGroup): AbstractControl[] {
  return [form.get('mealStarts'), form.get('mealEnds')].filter((control) => control !== null);
}

/** What the form says of the pattern, whatever its date; null: something is not right yet. */
export function patternFacts(form: PatternForm): PatternFacts | null {
  const { starts, ends, weekdays, meal, mealStarts, mealEnds, name } = form.getRawValue();
  const whole = Object.entries(form.controls).every(([key, control]) => key === 'from' || control.valid);
  const read = patternFactsSchema.safeParse({
    name,
    startsLocal: readLocalTime(starts),
    endsLocal: readLocalTime(ends),
    weekdays: [...weekdays].sort((a, b) => a - b),
    meal:
      meal === 'none'
        ? null
        : { startsLocal: readLocalTime(mealStarts), endsLocal: readLocalTime(mealEnds), looms: meal },
  });
  return whole && read.success ? read.data : null;
}

function mealProblem(control: AbstractControl): { mealStarts: string; mealEnds: string } {
  const form = control.parent;
  const said = (key: string): string => String(form?.get(key)?.value ?? '');
  if (!form || said('meal') === 'none') return { mealStarts: '', mealEnds: '' };
  const wrong = {
    mealStarts: localTimeProblem(said('mealStarts'), 'when the meal begins', '10:00'),
    mealEnds: localTimeProblem(said('mealEnds'), 'when the meal ends', '10:30'),
  };
  const [start, end] = [readLocalTime(said('starts')), readLocalTime(said('ends'))];
  const [from, to] = [readLocalTime(said('mealStarts')), readLocalTime(said('mealEnds'))];
  if (start === null || end === null || from === null || to === null) return wrong;
  const length = minutesBetween(start, end);
  const [begins, lasts] = [minutesBetween(start, from) % 1_440, minutesBetween(from, to)];
  if (begins >= length)
    wrong.mealStarts = `The meal begins at ${from}, outside the shift from ${start} to ${end}.`;
  else if (begins + lasts > length)
    wrong.mealEnds = `The meal ends at ${to}, after the shift’s end: it is over by ${end}.`;
  else if (lasts === length) wrong.mealEnds = 'The meal is as long as the shift: no time to weave is left.';
  return wrong;
}
