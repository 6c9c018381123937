import type { AbstractControl, FormGroup } from '@angular/forms';
import type { Subscription } from 'rxjs';

/** Asks fields anew that hang on others. What they say is shown at once; the form's own state follows. */
export function judge(form: FormGroup, fields: readonly AbstractControl[]): void {
  for (const control of fields) control.updateValueAndValidity({ onlySelf: true });
  form.updateValueAndValidity({ emitEvent: false });
}

/** Asks fields anew that hang on others, whenever anything in the form is typed. End it with the form. */
export function judgeTogether(form: FormGroup, fields: readonly AbstractControl[]): Subscription {
  return form.valueChanges.subscribe(() => judge(form, fields));
}
