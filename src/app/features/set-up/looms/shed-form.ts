import { ChangeDetectionStrategy, Component, inject, input, linkedSignal, output } from '@angular/core';
import { FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Shed } from '@shared/contract/reference';
import { shedFormSchema } from '@shared/contract/set-up';
import { field } from '../common/field';
import { FormSaver } from '../common/form-saver';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';

/** A new shed, or another name for one. */
@Component({
  selector: 'app-shed-form',
  imports: [MatButton, ReactiveFormsModule, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form
      [formGroup]="form()"
      (ngSubmit)="save()"
      [attr.aria-label]="shed() ? 'Rename the shed' : 'A new shed'"
    >
      <app-text-field label="Name of the shed" placeholder="Long shed" [control]="form().controls.name" />
      @if (saver.failure()) {
        <p class="problem" role="alert">{{ saver.failure() }}</p>
      }
      <div class="acts">
        <button matButton="filled" type="submit" [disabled]="saver.busy()">
          {{ shed() ? 'Save the name' : 'Add the shed' }}
        </button>
        @if (canLeave()) {
          <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
        }
      </div>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class ShedForm {
  /** Null: a new one. */
  readonly shed = input<Shed | null>(null);
  readonly canLeave = input(true);
  /** The shed's id, once it is stored. */
  readonly done = output<string>();
  readonly left = output<void>();

  protected readonly saver = inject(FormSaver);
  protected readonly form = linkedSignal(
    () => new FormGroup({ name: field(shedFormSchema.shape.name, this.shed()?.name ?? '') }),
  );

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async save(): Promise<void> {
    const shed = this.shed();
    const ids = await this.saver.save(
      this.form(),
      shed ? 'PATCH' : 'POST',
      shed ? `/sheds/${shed.id}` : '/sheds',
      () => this.form().getRawValue(),
    );
    if (ids) this.done.emit(shed?.id ?? ids[0] ?? '');
  }
}
