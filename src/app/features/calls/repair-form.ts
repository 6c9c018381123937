import { FormControl, FormGroup, Validators, type ValidationErrors } from '@angular/forms';
import { LIMITS } from '@shared/contract/limits';
import type { EntryOf } from '@shared/entries/entry';
import * as z from 'zod/mini';

export type Ran = NonNullable<EntryOf<'repair'>['ran']>;

export const RAN_WORDS: readonly { readonly ran: Ran; readonly words: string; readonly more: string }[] = [
  { ran: 'well', words: 'It runs well', more: 'seen to run' },
  { ran: 'watch', words: 'It runs, watch it', more: 'the weaver keeps an eye on it' },
  { ran: 'stands', words: 'It still stands', more: 'a part is wanted, say' },
];

/** The list has no such part: it is said in words. */
export const OTHER_PART = 'other';

export type RepairForm = ReturnType<typeof repairForm>;

export function repairForm() {
  const text = () =>
    new FormControl('', { nonNullable: true, validators: Validators.maxLength(LIMITS.textLength) });
  return new FormGroup(
    {
      cause: new FormControl('', { nonNullable: true, validators: Validators.required }),
      found: text(),
      done: text(),
      partId: new FormControl('', { nonNullable: true }),
      part: text(),
      ran: new FormControl<Ran | null>(null, { validators: Validators.required }),
      flew: new FormControl(false, { nonNullable: true }),
      nearMiss: text(),
    },
    { validators: whole },
  );
}

function whole(group: { value: unknown }): ValidationErrors | null {
  const { found, done, flew, nearMiss } = group.value as Partial<RepairForm['value']>;
  if (!found?.trim() && !done?.trim()) return { 'nothing-said': true };
  return flew && !nearMiss?.trim() ? { 'no-near-miss': true } : null;
}

/** What is still wanting, as a sentence; empty: nothing. */
export function wantingIn({ controls, errors }: RepairForm): string {
  if (controls.cause.invalid) return 'Say what kind of fault it was.';
  if (errors?.['nothing-said']) return 'Say in a few words what you found, or what you did.';
  if (controls.ran.invalid) return 'Say how the loom ran afterwards.';
  return errors?.['no-near-miss'] ? 'Say in a few words what nearly happened.' : '';
}

/** What a half-written repair is kept as. */
export const repairDraftSchema = z.object({
  repairId: z.uuidv7(),
  cause: z.string(),
  found: z.string(),
  done: z.string(),
  partId: z.string(),
  part: z.string(),
  ran: z.nullable(z.enum(['well', 'watch', 'stands'])),
  flew: z.boolean(),
  nearMiss: z.string(),
});

/** What the form says, as the entry says it. */
export function saidIn(
  form: RepairForm,
  partName: (id: string) => string | undefined,
): Pick<EntryOf<'repair'>, 'cause' | 'found' | 'done' | 'part' | 'partId' | 'ran' | 'nearMiss'> {
  const { cause, found, done, partId, part, ran, flew, nearMiss } = form.getRawValue();
  const listed = partId === '' || partId === OTHER_PART ? undefined : partId;
  const inWords =
    listed === undefined ? (partId === OTHER_PART ? part.trim() : '') : (partName(listed) ?? '');
  return {
    cause,
    ...(found.trim() && { found: found.trim() }),
    ...(done.trim() && { done: done.trim() }),
    ...(inWords && { part: inWords }),
    ...(listed !== undefined && { partId: listed }),
    ...(ran && { ran }),
    ...(flew && nearMiss.trim() && { nearMiss: nearMiss.trim() }),
  };
}
