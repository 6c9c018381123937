import { FormControl, type AbstractControl, type ValidationErrors, type ValidatorFn } from '@angular/forms';
import type * as z from 'zod/mini';
import { limitsOf, limitSentence, type FieldLimits } from './limits';
import { plain, type Quantity } from './quantity';

/** The limits that a value breaks, for the field to word in the units that it shows. */
interface Fits {
  readonly limits: FieldLimits;
  readonly missing: boolean;
}

/** Validates a control by the schema that the server asks again with. */
export function fits(
  schema: z.core.$ZodType & { safeParse(value: unknown): { success: boolean } },
): ValidatorFn {
  const limits = limitsOf(schema);
  return ({ value }: AbstractControl): ValidationErrors | null => {
    if (schema.safeParse(value).success) return null;
    const missing = value === null || (typeof value === 'string' && value.trim() === '');
    return { fits: { limits, missing } satisfies Fits };
  };
}

/**
 * A control that takes what a schema takes, e.g. `field(loomFactsSchema.shape.ppm, null)`. Its value is in stored
 * units; what is typed and shown in others is the field component's affair.
 */
export function field<T>(
  schema: z.ZodMiniType<unknown, unknown>,
  initial: T,
  more: readonly ValidatorFn[] = [],
): FormControl<T> {
  return new FormControl(initial, { nonNullable: true, validators: [fits(schema), ...more] });
}

/** A validator that says its own sentence; empty: nothing is wrong. */
export function says<T>(sentence: (value: T, control: AbstractControl) => string): ValidatorFn {
  return (control) => {
    const words = sentence(control.value as T, control);
    return words ? { says: words } : null;
  };
}

/** What is wrong with a control, as one sentence; empty: nothing. */
export function problemOfField(
  control: AbstractControl,
  label: string,
  quantity: Quantity = plain(''),
): string {
  const errors = control.errors;
  if (!errors) return '';
  for (const said of ['server', 'typed', 'says']) {
    const sentence: unknown = errors[said];
    if (typeof sentence === 'string') return sentence;
  }
  const broken = errors['fits'] as Fits | undefined;
  if (!broken) return `${label} is not as it should be.`;
  const sentence = limitSentence(label, broken.limits, quantity);
  if (!broken.missing || broken.limits.kind === 'other') return sentence;
  return broken.limits.kind === 'text' ? `${label} is missing.` : `${label} is missing. ${sentence}`;
}
