import { FormControl, FormGroup, type AbstractControl } from '@angular/forms';
import { ATTENDED_BY, CAUSE_GROUPS, type CauseGroup } from '@shared/contract/reference';
import { causeFactsSchema, type CauseFacts } from '@shared/contract/set-up';
import { field, says } from '../common/field';
import { judge } from '../common/judge-together';
import { nameFree } from '../common/name-taken';
import { plain, textOf } from '../common/quantity';

export const CAUSE_LABELS = {
  name: 'Cause',
  group: 'Group',
  attendedBy: 'Attended by',
  timed: 'A tap without a time counts',
  allowanceS: 'Allowance',
  breakOf: 'Counts as a break of',
} as const;

export const GROUP_WORDS: Readonly<Record<CauseGroup, string>> = {
  warp: 'Warp',
  weft: 'Weft',
  loom: 'Loom',
  waiting: 'Waiting',
  'warp-change': 'Warp change',
  care: 'Care',
  shed: 'Shed',
  planned: 'Planned',
};
export const GROUP_CHOICES = CAUSE_GROUPS.map((value) => ({ value, words: GROUP_WORDS[value] }));
export const ATTENDED_CHOICES = ATTENDED_BY.map((value) => ({ value, words: value }));
export const BREAK_CHOICES = [
  { value: null, words: 'neither' },
  { value: 'warp', words: 'warp' },
  { value: 'weft', words: 'weft' },
] as const;
export const TIMED_CHOICES = [
  { value: true, words: 'no minutes: it is always timed' },
  { value: false, words: 'an allowance' },
] as const;

type Num = number | null;
const facts = causeFactsSchema.shape;
/** Groups of stops that nobody mends. */
const UNATTENDED: readonly CauseGroup[] = ['waiting', 'shed', 'planned'];

/** A cause's form, empty or as stored. */
export function causeForm(cause: CauseFacts | null, others: () => readonly string[]) {
  const form = new FormGroup({
    name: field(facts.name, cause?.name ?? '', [nameFree(others)]),
    group: new FormControl<CauseGroup>(cause?.group ?? 'loom', { nonNullable: true }),
    attendedBy: new FormControl<CauseFacts['attendedBy']>(cause?.attendedBy ?? 'tackler', {
      nonNullable: true,
      validators: [says<CauseFacts['attendedBy']>((who, control) => attendedProblem(who, control))],
    }),
    timed: new FormControl(cause ? cause.allowanceS === null : true, { nonNullable: true }),
    allowanceS: field<Num>(facts.allowanceS, cause?.allowanceS ?? null, [
      says<Num>((seconds, control) =>
        seconds === null && control.parent?.get('timed')?.value === false
          ? 'Type the allowance in seconds, such as 60, or choose that it is always timed.'
          : '',
      ),
    ]),
    breakOf: new FormControl<CauseFacts['breakOf']>(cause?.breakOf ?? null, {
      validators: [says<CauseFacts['breakOf']>((of, control) => breakProblem(of, control))],
    }),
    effectiveAt: new FormControl<number | null>(null),
  });
  // A field made before its form knew of no group.
  judge(form, [form.controls.attendedBy, form.controls.breakOf, form.controls.allowanceS]);
  return form;
}

/** A group that nobody mends, or that is no break of warp or weft, says so of itself. */
export function followGroup({ controls }: ReturnType<typeof causeForm>, group: CauseGroup): void {
  const { attendedBy, breakOf } = controls;
  if (UNATTENDED.includes(group) && attendedBy.value !== 'nobody') attendedBy.setValue('nobody');
  if (breakOf.value !== null && breakOf.value !== group) breakOf.setValue(null);
}

/** What the form says; null: something is not right yet. */
export function causeFacts(form: ReturnType<typeof causeForm>): CauseFacts | null {
  const { timed, allowanceS, ...rest } = form.getRawValue();
  const read = causeFactsSchema.safeParse({ ...rest, allowanceS: timed ? null : allowanceS });
  return read.success && form.valid ? read.data : null;
}

function groupOf(control: AbstractControl): CauseGroup | undefined {
  return control.parent?.get('group')?.value as CauseGroup | undefined;
}

function attendedProblem(who: CauseFacts['attendedBy'], control: AbstractControl): string {
  const group = groupOf(control);
  return group && UNATTENDED.includes(group) && who !== 'nobody'
    ? 'Nobody mends a stop of this group: choose nobody.'
    : '';
}

function breakProblem(of: CauseFacts['breakOf'], control: AbstractControl): string {
  if (of === null || groupOf(control) === of) return '';
  return `Only a cause of the group ${GROUP_WORDS[of]} counts as a ${of} break.`;
}

/** "60 s", or "timed". */
export function allowanceWords(allowanceS: number | null): string {
  return allowanceS === null ? 'timed' : `${textOf(allowanceS, plain('s'))} s`;
}

/** What a tap on this cause will count for, as a sentence. */
export function tapSentence(cause: CauseFacts): string {
  const counts = cause.breakOf === null ? 'one stop' : `one stop, which is a ${cause.breakOf} break`;
  return cause.allowanceS === null
    ? `A tap counts ${counts}; its minutes are those that somebody times, or none.`
    : `A tap counts ${counts}, and ${allowanceWords(cause.allowanceS)} of lost time, marked as estimated unless it is timed.`;
}
