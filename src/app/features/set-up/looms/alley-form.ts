import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  untracked,
} from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { PersonRow } from '@shared/contract/session';
import { shedFormSchema } from '@shared/contract/set-up';
import { field } from '../common/field';
import { FormSaver } from '../common/form-saver';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';

/** An alley's name and who serves it. */
@Component({
  selector: 'app-alley-form',
  imports: [MatButton, ReactiveFormsModule, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form()" (ngSubmit)="save()" [attr.aria-label]="'Alley ' + name()">
      <app-text-field label="Name of the alley" [control]="form().controls.newName" />
      <fieldset>
        <legend>Tacklers who serve it</legend>
        @for (person of tacklers(); track person.id) {
          <label class="tick">
            <input type="checkbox" [checked]="serves(person.id)" (change)="toggle(person.id)" />
            {{ person.name }}
          </label>
        } @empty {
          <p class="muted">There is no tackler of this shed yet. Add one under People.</p>
        }
      </fieldset>
      @if (saver.failure()) {
        <p class="problem" role="alert">{{ saver.failure() }}</p>
      }
      <div class="acts">
        <button matButton="filled" type="submit" [disabled]="saver.busy()">Save</button>
        <button matButton="outlined" type="button" (click)="done.emit()">Leave it</button>
      </div>
    </form>
  `,
  styles: `
    fieldset {
      margin: 0;
      padding: 0;
      border: 0;
    }
  `,
  styleUrl: '../common/form.scss',
})
export class AlleyForm {
  readonly shedId = input.required<string>();
  readonly name = input.required<string>();
  readonly tacklerIds = input.required<readonly string[]>();
  readonly tacklers = input.required<readonly PersonRow[]>();
  readonly done = output<void>();

  protected readonly saver = inject(FormSaver);
  protected readonly form = computed(
    () =>
      new FormGroup({
        newName: field(shedFormSchema.shape.name, this.name()),
        tacklerIds: new FormControl<readonly string[]>(untracked(this.tacklerIds), { nonNullable: true }),
      }),
  );

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected serves(id: string): boolean {
    return this.form().controls.tacklerIds.value.includes(id);
  }

  protected toggle(id: string): void {
    const control = this.form().controls.tacklerIds;
    control.setValue(this.serves(id) ? control.value.filter((one) => one !== id) : [...control.value, id]);
    control.markAsDirty();
  }

  protected async save(): Promise<void> {
    const { newName, tacklerIds } = this.form().getRawValue();
    const ids = await this.saver.save(this.form(), 'PATCH', '/alleys', () => ({
      shedId: this.shedId(),
      name: this.name(),
      tacklerIds,
      ...(newName.trim() !== this.name() && { newName: newName.trim() }),
    }));
    if (ids) this.done.emit();
  }
}
