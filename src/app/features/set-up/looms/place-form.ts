import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  untracked,
} from '@angular/core';
import { FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { loomPlaceSchema } from '@shared/contract/set-up';
import { field } from '../common/field';
import { FormSaver } from '../common/form-saver';
import { NumberField } from '../common/number-field';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';

/** A loom's number, place and alley by typing. Its history goes with it. */
@Component({
  selector: 'app-place-form',
  imports: [MatButton, NumberField, ReactiveFormsModule, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form()" (ngSubmit)="save()" aria-label="Number and place">
      <div class="fields">
        <app-number-field label="Number" [control]="form().controls.number" />
        <app-number-field label="Row" [control]="form().controls.row" />
        <app-number-field label="Place in the row" [control]="form().controls.position" />
        <app-text-field label="Alley" [control]="form().controls.alley" />
      </div>
      <p class="muted small">The loom’s history goes with it under its new number.</p>
      @if (saver.failure()) {
        <p class="problem" role="alert">{{ saver.failure() }}</p>
      }
      <div class="acts">
        <button matButton="filled" type="submit" [disabled]="saver.busy()">Save</button>
        <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
      </div>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class PlaceForm {
  readonly loom = input.required<Loom>();
  readonly done = output<void>();
  readonly left = output<void>();

  protected readonly saver = inject(FormSaver);
  private readonly id = computed(() => this.loom().id);
  protected readonly form = computed(() => {
    this.id();
    const { number, row, position, alley } = untracked(this.loom);
    const shape = loomPlaceSchema.shape;
    return new FormGroup({
      number: field(shape.number, number as number | null),
      row: field(shape.row, row as number | null),
      position: field(shape.position, position as number | null),
      alley: field(shape.alley, alley),
    });
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async save(): Promise<void> {
    const form = this.form();
    const ids = await this.saver.save(
      form,
      'PATCH',
      '/looms',
      () => ({ looms: [{ id: this.id(), ...form.getRawValue() }] }),
      { under: 'looms.0' },
    );
    if (ids) this.done.emit();
  }
}
