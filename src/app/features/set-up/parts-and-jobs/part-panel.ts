import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  untracked,
} from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Part } from '@shared/contract/reference';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { PART_LABELS, partForm } from './job-form';

/** A spare part: its name, and whether it is still kept. */
@Component({
  selector: 'app-part-panel',
  imports: [FormFoot, MatButton, ReactiveFormsModule, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form
      (submit)="save(); $event.preventDefault()"
      novalidate
      [attr.aria-label]="part()?.name ?? 'A new part'"
    >
      <app-text-field [label]="labels.name" [control]="form().controls.name" placeholder="Picking band" />
      @if (part()) {
        <label class="tick">
          <input type="checkbox" [formControl]="form().controls.retired" />
          No longer kept: repairs that name it keep its name
        </label>
      }
      <app-form-foot [label]="part() ? 'Save the part' : 'Add the part'">
        <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
      </app-form-foot>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class PartPanel {
  /** Null: a new one. */
  readonly part = input.required<Part | null>();
  readonly left = output<void>();
  /** Its name, once it is saved. */
  readonly saved = output<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  protected readonly labels = PART_LABELS;
  protected readonly form = computed(() => {
    const part = this.part();
    return untracked(() =>
      partForm(part, () => this.store.known().parts.flatMap(({ id, name }) => (id === part?.id ? [] : name))),
    );
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async save(): Promise<void> {
    const id = this.part()?.id;
    const said = this.form().getRawValue();
    const ids = await this.saver.save(
      this.form(),
      id === undefined ? 'POST' : 'PATCH',
      id === undefined ? '/parts' : `/parts/${id}`,
      () => said,
    );
    if (ids) this.saved.emit(said.name.trim());
  }
}
