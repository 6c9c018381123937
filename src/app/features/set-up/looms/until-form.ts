import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { FormSaver } from '../common/form-saver';
import { FromMoment, effectControl } from '../common/from-moment';
import { longMoment } from '../common/moments';
import { SetUpStore } from '../common/set-up-store';
import { keepUnsaved } from '../common/unsaved';

/** Takes looms out of use from a moment on, or lets one stay after all. */
@Component({
  selector: 'app-until-form',
  imports: [FromMoment, MatButton, ReactiveFormsModule],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form" (ngSubmit)="takeOut()" aria-label="Out of use">
      @if (ends(); as ends) {
        <p>
          Loom {{ ends.number }} is out of use from {{ ends.when }} on. Its shifts, repairs and figures are
          kept.
        </p>
      } @else {
        <app-from-moment
          legend="Out of use from"
          note="Their shifts, repairs and figures are kept; their numbers and places are free again."
          [control]="form.controls.until"
          [shedId]="looms()[0]?.shedId ?? null"
        />
      }
      @if (saver.failure()) {
        <p class="problem" role="alert">{{ saver.failure() }}</p>
      }
      <div class="acts">
        @if (ends()) {
          <button matButton="filled" type="button" [disabled]="saver.busy()" (click)="letStay()">
            It stays in use after all
          </button>
        } @else {
          <button matButton="filled" type="submit" [disabled]="saver.busy()">Take out of use</button>
        }
        <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
      </div>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class UntilForm {
  readonly looms = input.required<readonly Loom[]>();
  readonly done = output<void>();
  readonly left = output<void>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  protected readonly saver = inject(FormSaver);
  protected readonly form = new FormGroup({ until: effectControl() });
  protected readonly ends = computed(() => {
    const ended = this.looms().find((loom) => loom.until !== null);
    return ended?.until
      ? { number: ended.number, when: longMoment(ended.until, this.store.timeZone()) }
      : null;
  });

  constructor() {
    keepUnsaved(() => this.form.dirty);
  }

  protected takeOut(): Promise<void> {
    return this.send(this.form.controls.until.value ?? this.clock.correctedNow());
  }

  protected letStay(): Promise<void> {
    return this.send(null);
  }

  /** One loom after the other: what is done stays done, and the sentence names the one that is not. */
  private async send(until: number | null): Promise<void> {
    for (const loom of this.looms()) {
      if ((loom.until === null) === (until === null)) continue;
      if (!(await this.saver.save(this.form, 'PATCH', `/looms/${loom.id}/until`, () => ({ until })))) return;
    }
    this.done.emit();
  }
}
