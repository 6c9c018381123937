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
import { Clock } from '../../../core/clock';
import { FormSaver } from '../common/form-saver';
import { FromMoment, effectControl } from '../common/from-moment';
import { SetUpStore } from '../common/set-up-store';
import { keepUnsaved } from '../common/unsaved';
import { FactsFields } from './facts-fields';
import { changedFacts, commonFacts, factsForm, longestShift, newFacts, versionsInForce } from './loom-facts';

/** New facts of one loom or several from a moment on; what nobody changes stays as it was. */
@Component({
  selector: 'app-change-facts-form',
  imports: [FactsFields, FromMoment, MatButton, ReactiveFormsModule],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form()" (ngSubmit)="save()" aria-label="Speed, clock and the rest">
      <app-facts-fields [form]="form().controls.facts" [partial]="true" />
      <app-from-moment [control]="form().controls.effectiveAt" [shedId]="looms()[0]?.shedId ?? null" />
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
export class ChangeFactsForm {
  readonly looms = input.required<readonly Loom[]>();
  readonly done = output<void>();
  readonly left = output<void>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  protected readonly saver = inject(FormSaver);
  private readonly ids = computed(() => this.looms().map((loom) => loom.id), {
    equal: (a, b) => a.join() === b.join(),
  });
  /** What they have in common as the form was opened: a reload must not change it under the typist's hand. */
  private readonly common = computed(() => {
    this.ids();
    const [looms, setUp] = [untracked(this.looms), untracked(this.store.known)];
    return commonFacts(versionsInForce(looms, setUp.loomVersions, this.clock.correctedNow()));
  });
  protected readonly form = computed(() => {
    const shedId = untracked(this.looms)[0]?.shedId ?? '';
    const minutes = longestShift(untracked(this.store.known).patterns, shedId);
    return new FormGroup({ facts: factsForm(this.common(), true, minutes), effectiveAt: effectControl() });
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async save(): Promise<void> {
    const form = this.form();
    const facts = newFacts(changedFacts(form.controls.facts), this.common());
    if (form.valid && Object.keys(facts).length === 0) {
      this.saver.failure.set('Nothing is different from what holds now. Change something, or leave it.');
      return;
    }
    const ids = await this.saver.save(form, 'POST', '/looms/versions', () => ({
      loomIds: this.ids(),
      effectiveAt: form.controls.effectiveAt.value ?? this.clock.correctedNow(),
      facts,
    }));
    if (ids) this.done.emit();
  }
}
