import { FormControl, FormGroup, type AbstractControl } from '@angular/forms';
import { calendarDaySchema, type CalendarDay } from '@shared/contract/set-up';
import { isDate } from '../../../core/dates';
import { field, says } from '../common/field';
import { judge } from '../common/judge-together';
import { localTimeProblem, readLocalTime } from '../shifts/local-time';

export const DAY_LABELS = {
  date: 'Date',
  patternId: 'Which shifts',
  kind: 'What it is',
  starts: 'Starts',
  ends: 'Ends',
  reason: 'Reason',
} as const;

export type DayKind = CalendarDay['kind'];
export const KIND_CHOICES: readonly { readonly value: DayKind; readonly words: string }[] = [
  { value: 'off', words: 'holiday: no shift' },
  { value: 'short', words: 'short day: other hours' },
  { value: 'overtime', words: 'overtime: a shift more, or longer' },
];

/** All patterns of a day. */
export const ALL = '*';

/** A day's form. `runsOn` says whether a pattern has a shift on a date anyway. */
export function dayForm(day: CalendarDay, runsOn: (patternId: string, date: string) => boolean) {
  const form = new FormGroup({
    date: new FormControl(day.date, {
      nonNullable: true,
      validators: [says<string>((date) => (isDate(date) ? '' : 'Choose a date, such as 2026-12-25.'))],
    }),
    kind: new FormControl<DayKind>(day.kind, { nonNullable: true }),
    patternId: new FormControl(day.patternId, {
      nonNullable: true,
      validators: [says<string>((id, control) => patternProblem(id, control, runsOn))],
    }),
    starts: time(day.startsLocal, 'the start', '06:00'),
    ends: time(day.endsLocal, 'the end', '12:00'),
    reason: field(calendarDaySchema.shape.reason, day.reason),
  });
  judge(form, hanging(form));
  return form;
}
export type DayForm = ReturnType<typeof dayForm>;

/** Fields that hang on what the day is. */
export function hanging({ controls }: DayForm): AbstractControl[] {
  return [controls.patternId, controls.starts, controls.ends];
}

/** What the form says; null: something is not right yet. Overtime without hours has the pattern's own. */
export function calendarDay(form: DayForm, shedId: string): CalendarDay | null {
  const { starts, ends, kind, ...rest } = form.getRawValue();
  const hours =
    kind === 'off' || starts.trim() === '' ? null : { from: readLocalTime(starts), to: readLocalTime(ends) };
  const read = calendarDaySchema.safeParse({
    ...rest,
    kind,
    shedId,
    startsLocal: hours?.from ?? null,
    endsLocal: hours?.to ?? null,
  });
  return read.success && form.valid ? read.data : null;
}

function time(initial: string | null, what: string, usual: string): FormControl<string> {
  return new FormControl(initial ?? '', {
    nonNullable: true,
    validators: [says<string>((text, control) => timeProblem(text, control, what, usual))],
  });
}

function timeProblem(text: string, control: AbstractControl, what: string, usual: string): string {
  const said = (key: string): string => String(control.parent?.get(key)?.value ?? '');
  const kind = said('kind');
  if (!control.parent || kind === 'off') return '';
  const none = said('starts').trim() === '' && said('ends').trim() === '';
  if (kind === 'overtime' && none) return '';
  return localTimeProblem(text, what, usual);
}

function patternProblem(
  id: string,
  control: AbstractControl,
  runsOn: (patternId: string, date: string) => boolean,
): string {
  const kind = control.parent?.get('kind')?.value as DayKind | undefined;
  if (!kind) return '';
  if (id === ALL)
    return kind === 'off' ? '' : 'Choose one of the patterns: all at other hours would run at once.';
  if (!id) return 'Choose which shifts it is for.';
  const date = String(control.parent?.get('date')?.value ?? '');
  return kind === 'short' && isDate(date) && !runsOn(id, date)
    ? 'This pattern has no shift on that date. Choose another, or overtime.'
    : '';
}
