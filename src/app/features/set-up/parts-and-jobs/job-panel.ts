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
import type { Job } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { versionToEdit } from '../common/in-force';
import { NumberField } from '../common/number-field';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { JOB_LABELS, jobForm, picksInHours } from './job-form';

/** A job of care, due again after so many picks of a loom. */
@Component({
  selector: 'app-job-panel',
  imports: [FormFoot, MatButton, NumberField, ReactiveFormsModule, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form
      (submit)="save(); $event.preventDefault()"
      novalidate
      [attr.aria-label]="job()?.name ?? 'A new job'"
    >
      <div class="fields">
        <app-text-field
          [label]="labels.name"
          [control]="form().controls.name"
          placeholder="Oil the picking shafts"
        />
        <app-number-field
          [label]="labels.everyPicks"
          unit="picks"
          [control]="form().controls.everyPicks"
          [hint]="hours()"
        />
      </div>
      @if (job()) {
        <label class="tick">
          <input type="checkbox" [formControl]="form().controls.retired" />
          No longer done: it comes due no more
        </label>
      }
      <app-form-foot [label]="job() ? 'Save the job' : 'Add the job'">
        <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
      </app-form-foot>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class JobPanel {
  /** Null: a new one. */
  readonly job = input.required<Job | null>();
  readonly left = output<void>();
  /** Its name, once it is saved. */
  readonly saved = output<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  protected readonly labels = JOB_LABELS;
  protected readonly form = computed(() => {
    const job = this.job();
    return untracked(() =>
      jobForm(job, () => this.store.known().jobs.flatMap(({ id, name }) => (id === job?.id ? [] : name))),
    );
  });
  private readonly turns = turnsOf(this.form);
  protected readonly hours = computed(() => {
    this.turns();
    const { looms, loomVersions } = this.store.known();
    const now = this.clock.tick();
    const versions = looms.flatMap(
      (loom) =>
        versionToEdit(
          loomVersions.filter((one) => one.loomId === loom.id),
          now,
        ) ?? [],
    );
    const words = picksInHours(this.form().controls.everyPicks.value, versions);
    return words ? `That is ${words}.` : '';
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async save(): Promise<void> {
    const id = this.job()?.id;
    const said = this.form().getRawValue();
    const ids = await this.saver.save(
      this.form(),
      id === undefined ? 'POST' : 'PATCH',
      id === undefined ? '/jobs' : `/jobs/${id}`,
      () => said,
    );
    if (ids) this.saved.emit(said.name.trim());
  }
}
