import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { reasonSchema } from '@shared/contract/primitives';
import { recalculatedSchema } from '@shared/contract/set-up';
import type * as z from 'zod/mini';
import { ApiClient } from '../../../core/api-client';
import { formatDay, isDate } from '../../../core/dates';
import { ChoiceField } from '../common/choice-field';
import { field, says } from '../common/field';
import { FormSaver } from '../common/form-saver';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';

/** The command *recalculate from a date*: closed shifts are stated anew with what is in force now, signed beside the old. */
@Component({
  selector: 'app-recalculate-form',
  imports: [ChoiceField, MatButton, ReactiveFormsModule, RouterLink, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form" (ngSubmit)="recalculate()" aria-label="Recalculate closed shifts">
      <h2>Recalculate closed shifts</h2>
      <p class="muted">
        Closed shifts keep the figures they were signed with, whatever changes here. If a speed, a cloth or an
        allowance was wrong in the book, this states them anew with what is set up now: a new signed version
        beside the old, which is kept.
      </p>
      <div class="fields">
        <app-choice-field label="Shed" [control]="form.controls.shedId" [choices]="sheds()" />
        <app-text-field label="From the date" type="date" [control]="form.controls.from" />
      </div>
      <app-text-field
        label="Reason"
        hint="The book keeps it with each new version."
        [control]="form.controls.reason"
      />
      @if (saver.failure()) {
        <p class="problem" role="alert">{{ saver.failure() }}</p>
      }
      <div class="acts">
        @if (sure()) {
          <button matButton="filled" type="submit" [disabled]="saver.busy()">
            {{ saver.busy() ? 'Recalculating …' : 'Yes, recalculate' }}
          </button>
          <button matButton="outlined" type="button" (click)="sure.set(false)">Leave it</button>
        } @else {
          <button matButton="outlined" type="submit">Recalculate …</button>
        }
      </div>
      @if (result(); as result) {
        <div role="status">
          <p class="saved">{{ words() }}</p>
          <ul>
            @for (key of result.changed; track key) {
              <li>
                <a [routerLink]="['/shift-book', key, 'close']">{{ nameOf(key) }}</a>
              </li>
            }
          </ul>
        </div>
      }
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class RecalculateForm {
  private readonly store = inject(SetUpStore);
  private readonly api = inject(ApiClient);
  protected readonly saver = inject(FormSaver);
  protected readonly sure = signal(false);
  protected readonly result = signal<z.infer<typeof recalculatedSchema> | null>(null);
  protected readonly sheds = computed(() =>
    this.store.known().sheds.map((shed) => ({ value: shed.id, words: shed.name })),
  );
  protected readonly form = new FormGroup({
    shedId: new FormControl(this.store.known().sheds[0]?.id ?? '', {
      nonNullable: true,
      validators: says<string>((id) =>
        id ? '' : 'The mill has no shed yet, so there is nothing to recalculate.',
      ),
    }),
    from: new FormControl('', {
      nonNullable: true,
      validators: says<string>((date) => (isDate(date) ? '' : 'Choose the date of the first shift.')),
    }),
    reason: field(reasonSchema, ''),
  });
  protected readonly words = computed(() => {
    const result = this.result();
    if (!result) return '';
    if (result.shifts === 0) return 'No shift from that date on is closed: nothing was to be done.';
    const of = result.shifts === 1 ? 'The one closed shift was' : `All ${result.shifts} closed shifts were`;
    if (result.changed.length === 0) return `${of} recalculated. No total is other than before.`;
    return `${of} recalculated. These have other totals now:`;
  });

  constructor() {
    keepUnsaved(() => this.form.dirty);
  }

  protected async recalculate(): Promise<void> {
    this.result.set(null);
    this.form.markAllAsTouched();
    if (this.form.valid && !this.sure()) {
      this.sure.set(true);
      return;
    }
    // Some hundred shifts take the server a while.
    const answer = await this.saver.send(this.form, () =>
      this.api.post('/api/set-up/recalculate', recalculatedSchema, this.form.getRawValue(), {
        timeout: 300_000,
      }),
    );
    this.sure.set(false);
    if (answer) this.result.set(answer);
  }

  /** "Early, Mon 11 May" of `<shedId>:<date>:<patternId>`; an extra shift's own key as it is. */
  protected nameOf(key: string): string {
    const [, date, patternId] = key.split(':');
    if (!date || !isDate(date)) return key;
    const pattern = this.store.known().patterns.find((one) => one.id === patternId);
    return `${pattern?.name ?? 'Shift'}, ${formatDay(date)}`;
  }
}
