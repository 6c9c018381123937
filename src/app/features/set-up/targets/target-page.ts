import { ChangeDetectionStrategy, Component, computed, inject, input, untracked } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { targetFactsSchema } from '@shared/contract/set-up';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { FromMoment } from '../common/from-moment';
import { versionToEdit } from '../common/in-force';
import { NumberField } from '../common/number-field';
import { PERCENT } from '../common/quantity';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { keepUnsaved } from '../common/unsaved';
import { VersionList } from '../common/version-list';
import { BREAK_RATE, TARGET_LABELS, targetFacts, targetForm, targetWords } from './target-form';

const NO_TARGET = { efficiency: null, warpBreaks: null, weftBreaks: null };

/** The targets of one cloth, from a moment on. */
@Component({
  selector: 'app-target-page',
  imports: [EmptyState, FormFoot, FromMoment, MatButton, NumberField, RoomHeading, RouterLink, VersionList],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (cloth(); as one) {
      <app-room-heading [heading]="'Targets of ' + one.name" words="An empty field is no target." />
      <div class="beside">
        <form (submit)="save(); $event.preventDefault()" novalidate>
          <div class="fields">
            <app-number-field
              [label]="labels.efficiency"
              [quantity]="percent"
              hint="At least."
              [control]="form().controls.efficiency"
            />
            <app-number-field
              [label]="labels.warpBreaks"
              [quantity]="rate"
              hint="At most."
              [control]="form().controls.warpBreaks"
            />
            <app-number-field
              [label]="labels.weftBreaks"
              [quantity]="rate"
              hint="At most."
              [control]="form().controls.weftBreaks"
            />
          </div>
          @if (changed()) {
            <app-from-moment
              [control]="form().controls.effectiveAt"
              note="Weeks before are held against the targets of then."
            />
          }
          <app-form-foot label="Save the targets" back="/set-up/targets" />
        </form>
        @if (history().length > 0) {
          <div class="aside"><app-version-list [versions]="history()" /></div>
        }
      </div>
    } @else {
      <app-empty-state heading="There is no such cloth">
        <a matButton="outlined" routerLink="/set-up/targets">To the targets</a>
      </app-empty-state>
    }
  `,
  styleUrls: ['../common/room.scss', '../common/form.scss'],
})
export class TargetPage {
  /** From the address: the cloth's id. */
  readonly id = input.required<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly labels = TARGET_LABELS;
  protected readonly percent = PERCENT;
  protected readonly rate = BREAK_RATE;
  protected readonly cloth = computed(() => this.store.known().cloths.find(({ id }) => id === this.id()));
  private readonly targets = computed(() =>
    this.store.known().targets.filter(({ clothId }) => clothId === this.id()),
  );
  protected readonly form = computed(() => {
    this.id();
    return untracked(() => targetForm(versionToEdit(this.targets(), this.clock.tick()) ?? null));
  });
  private readonly turns = turnsOf(this.form);
  /** Only a change takes effect from a moment. */
  protected readonly changed = computed(() => {
    this.turns();
    const stored = versionToEdit(this.targets(), this.clock.tick());
    const facts = targetFacts(this.form());
    const before = targetFactsSchema.parse(stored ?? NO_TARGET);
    return !facts || JSON.stringify(facts) !== JSON.stringify(before);
  });
  protected readonly history = computed(() =>
    this.targets().map((target) => ({ ...target, words: targetWords(target) })),
  );

  constructor() {
    keepUnsaved(() => this.form().dirty);
  }

  protected async save(): Promise<void> {
    if (!this.changed()) {
      this.form().markAsPristine();
      await this.router.navigate(['/set-up/targets']);
      return;
    }
    const ids = await this.saver.save(
      this.form(),
      'POST',
      '/targets',
      () => ({
        clothId: this.id(),
        effectiveAt: this.form().controls.effectiveAt.value ?? Math.round(this.clock.correctedNow()),
        facts: targetFacts(this.form()),
      }),
      { under: 'facts' },
    );
    if (ids) await this.router.navigate(['/set-up/targets'], { queryParams: { at: this.id() } });
  }
}
