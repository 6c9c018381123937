import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Loom } from '@shared/contract/reference';
import { Clock } from '../../../core/clock';
import { NotSaved, notSaved } from '../../../offline/not-saved';
import { OfflineBook } from '../../../offline/offline-book';
import { ChoiceField } from '../common/choice-field';
import { says } from '../common/field';
import { turnsOf } from '../common/field-state';
import { FromMoment, effectControl } from '../common/from-moment';
import { SetUpStore } from '../common/set-up-store';
import { keepUnsaved } from '../common/unsaved';
import { momentOnLoom, onLoomTrouble } from './on-loom-moment';

/** What is on looms now, as it was found: an entry of the book like any warp change, so it reaches the tablets too. */
@Component({
  selector: 'app-on-loom-form',
  imports: [ChoiceField, FromMoment, MatButton, ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form" (ngSubmit)="save()" aria-label="On the loom now">
      <div class="fields">
        <app-choice-field
          label="Cloth"
          unchosen="Choose …"
          [control]="form.controls.clothId"
          [choices]="cloths()"
        />
        @if (looms().length === 1) {
          <app-choice-field
            label="Beam"
            unchosen="Not known, or not in the list"
            [control]="form.controls.warpId"
            [choices]="beams()"
          />
        }
      </div>
      <app-from-moment
        legend="There since"
        note="Shifts that are open count their cloth by it from then on; a later gaiting or knotting follows it."
        [control]="form.controls.at"
        [shedId]="looms()[0]?.shedId ?? null"
        [begunOnly]="true"
      />
      @if (trouble()) {
        <p class="problem" role="alert">{{ trouble() }}</p>
      }
      @if (failure()) {
        <p class="problem" role="alert">{{ failure() }}</p>
      }
      <div class="acts">
        <button matButton="filled" type="submit" [disabled]="busy()">Put it in the book</button>
        <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
      </div>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class OnLoomForm {
  readonly looms = input.required<readonly Loom[]>();
  readonly done = output<void>();
  readonly left = output<void>();

  private readonly store = inject(SetUpStore);
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  protected readonly busy = signal(false);
  protected readonly failure = signal('');
  protected readonly form = new FormGroup({
    clothId: new FormControl('', {
      nonNullable: true,
      validators: says<string>((id) => (id ? '' : 'Choose the cloth.')),
    }),
    warpId: new FormControl('', { nonNullable: true }),
    at: effectControl(),
  });
  private readonly turns = turnsOf(signal(this.form.controls.at));
  /** Why the book would not take the moment: said before anything is saved, since an entry cannot be taken back. */
  protected readonly trouble = computed(() => {
    this.turns();
    // A minute that is not whole yet is said by its own field.
    if (this.form.controls.at.invalid) return '';
    this.clock.tick();
    return this.troubleNow();
  });
  protected readonly cloths = computed(() =>
    this.store
      .known()
      .cloths.filter((cloth) => !cloth.retired)
      .map((cloth) => ({ value: cloth.id, words: cloth.name })),
  );
  /** Beams in store, and the one that is on this loom. */
  protected readonly beams = computed(() => {
    const [loom] = this.looms();
    return this.store
      .known()
      .beams.filter((beam) => !beam.used || beam.onLoomId === loom?.id)
      .map((beam) => ({ value: beam.id, words: beam.name }));
  });

  constructor() {
    keepUnsaved(() => this.form.dirty);
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    this.form.controls.clothId.updateValueAndValidity();
    if (this.form.invalid || this.troubleNow() || this.busy()) return;
    this.busy.set(true);
    this.failure.set('');
    const { clothId, warpId, at } = this.form.getRawValue();
    const moment = at ?? this.clock.correctedNow();
    try {
      await this.book.logAll(
        this.looms().map((loom) => ({
          kind: 'warp-change',
          how: 'as-found',
          loomId: loom.id,
          shedId: loom.shedId,
          warpId: warpId === '' || this.looms().length > 1 ? null : warpId,
          clothId,
          at: momentOnLoom(moment, loom) - this.clock.offset(),
        })),
      );
      this.form.markAsPristine();
      this.done.emit();
    } catch (error) {
      this.failure.set((error instanceof NotSaved ? error : notSaved(error)).sentence);
    } finally {
      this.busy.set(false);
    }
  }
  private troubleNow(): string {
    const now = this.clock.correctedNow();
    return onLoomTrouble(this.form.controls.at.value ?? now, this.looms(), now, this.store.timeZone());
  }
}
