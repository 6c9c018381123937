import { ChangeDetectionStrategy, Component, computed, inject, input, untracked } from '@angular/core';
import { FormControl, FormGroup } from '@angular/forms';
import { Router } from '@angular/router';
import type { Pattern } from '@shared/contract/set-up';
import { Clock } from '../../../core/clock';
import { addDays, dateOf, isDate } from '../../../core/dates';
import { says } from '../common/field';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';

/** Ends a pattern: its last date is the day before. */
@Component({
  selector: 'app-end-pattern',
  imports: [FormFoot, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form (submit)="end(); $event.preventDefault()" novalidate aria-label="End the pattern">
      <h2>End it</h2>
      <p class="muted small">Shifts that were woven stay in the book.</p>
      <app-text-field label="No more from" type="date" [control]="form().controls.from" />
      <app-form-foot label="End the pattern" />
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class EndPattern {
  readonly pattern = input.required<Pattern>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);
  protected readonly form = computed(() => {
    const id = this.pattern().id;
    return untracked(() => {
      const tomorrow = addDays(dateOf(this.clock.correctedNow(), this.store.timeZone()), 1);
      return new FormGroup({
        id: new FormControl(id, { nonNullable: true }),
        from: new FormControl(tomorrow, {
          nonNullable: true,
          validators: [
            says<string>((date) =>
              isDate(date) ? '' : 'Choose the first date on which it is no more, such as 2026-12-24.',
            ),
          ],
        }),
      });
    });
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async end(): Promise<void> {
    const { id, from } = this.form().getRawValue();
    const ids = await this.saver.save(this.form(), 'POST', `/patterns/${id}/end`, () => ({ from }));
    if (ids) await this.router.navigate(['/set-up/shifts'], { queryParams: { at: id } });
  }
}
