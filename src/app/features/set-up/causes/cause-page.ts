import { ChangeDetectionStrategy, Component, computed, inject, input, untracked } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { causeFactsSchema } from '@shared/contract/set-up';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { ChoiceField } from '../common/choice-field';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { FromMoment } from '../common/from-moment';
import { versionToEdit } from '../common/in-force';
import { judgeTogether } from '../common/judge-together';
import { NumberField } from '../common/number-field';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { VersionList } from '../common/version-list';
import { whileShown } from '../common/while-shown';
import {
  ATTENDED_CHOICES,
  BREAK_CHOICES,
  CAUSE_LABELS,
  GROUP_CHOICES,
  GROUP_WORDS,
  TIMED_CHOICES,
  allowanceWords,
  causeFacts,
  causeForm,
  followGroup,
  tapSentence,
} from './cause-form';

/** One cause of stops. A change of it holds from a moment on; stops before keep what they counted. */
@Component({
  selector: 'app-cause-page',
  imports: [
    ChoiceField,
    EmptyState,
    FormFoot,
    FromMoment,
    MatButton,
    NumberField,
    RoomHeading,
    RouterLink,
    TextField,
    VersionList,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading [heading]="stored()?.name ?? 'A new cause'" />
    @if (isThere()) {
      <div class="beside">
        <form (submit)="save(); $event.preventDefault()" novalidate>
          <div class="fields">
            <app-text-field class="wide" [label]="labels.name" [control]="form().controls.name" />
            <app-choice-field [label]="labels.group" [control]="form().controls.group" [choices]="groups" />
            <app-choice-field
              [label]="labels.attendedBy"
              hint="Who mends it."
              [control]="form().controls.attendedBy"
              [choices]="attended"
            />
            <app-choice-field
              [label]="labels.breakOf"
              hint="In breaks per 10⁵ picks."
              [control]="form().controls.breakOf"
              [choices]="breaks"
            />
            <app-choice-field [label]="labels.timed" [control]="form().controls.timed" [choices]="timed" />
            @if (!isTimed()) {
              <app-number-field
                [label]="labels.allowanceS"
                unit="s"
                hint="Of one tapped stop."
                [control]="form().controls.allowanceS"
              />
            }
          </div>
          @if (sentence()) {
            <p class="muted" aria-live="polite">{{ sentence() }}</p>
          }
          @if (stored() && changed()) {
            <app-from-moment
              [control]="form().controls.effectiveAt"
              note="Stops before count as they did: closed shifts keep the figures they were signed with."
            />
          }
          <app-form-foot [label]="stored() ? 'Save the cause' : 'Add the cause'" back="/set-up/causes" />
        </form>
        @if (history().length > 0) {
          <div class="aside"><app-version-list [versions]="history()" /></div>
        }
      </div>
    } @else {
      <app-empty-state heading="There is no such cause">
        <a matButton="outlined" routerLink="/set-up/causes">To the causes</a>
      </app-empty-state>
    }
  `,
  styleUrls: ['../common/room.scss', '../common/form.scss'],
})
export class CausePage {
  /** From the address: a cause's id, or `new`. */
  readonly id = input.required<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly labels = CAUSE_LABELS;
  protected readonly groups = GROUP_CHOICES;
  protected readonly attended = ATTENDED_CHOICES;
  protected readonly breaks = BREAK_CHOICES;
  protected readonly timed = TIMED_CHOICES;

  private readonly versions = computed(() =>
    this.store.known().causeVersions.filter((one) => one.causeId === this.id()),
  );
  protected readonly stored = computed(() => versionToEdit(this.versions(), this.clock.tick()));
  protected readonly isThere = computed(() => this.id() === 'new' || this.versions().length > 0);
  protected readonly form = computed(() => {
    const id = this.id();
    return untracked(() =>
      causeForm(this.stored() ?? null, () =>
        this.store.known().causeVersions.flatMap((one) => (one.causeId === id ? [] : one.name)),
      ),
    );
  });
  private readonly turns = turnsOf(this.form);
  protected readonly isTimed = computed(() => {
    this.turns();
    return this.form().controls.timed.value;
  });
  protected readonly sentence = computed(() => {
    this.turns();
    const facts = causeFacts(this.form());
    return facts ? tapSentence(facts) : '';
  });
  /** Only a change takes effect from a moment. */
  protected readonly changed = computed(() => {
    this.turns();
    const [facts, stored] = [causeFacts(this.form()), this.stored()];
    return !stored || !facts || JSON.stringify(facts) !== JSON.stringify(causeFactsSchema.parse(stored));
  });
  protected readonly history = computed(() =>
    this.versions().map(({ id, effectiveAt, name, group, attendedBy, allowanceS }) => ({
      id,
      effectiveAt,
      words: `${name}; ${GROUP_WORDS[group]}; attended by ${attendedBy}; ${allowanceWords(allowanceS)}`,
    })),
  );

  constructor() {
    keepUnsaved(() => this.form().dirty);
    whileShown(this.form, (form) =>
      judgeTogether(form, [form.controls.attendedBy, form.controls.breakOf, form.controls.allowanceS]),
    );
    whileShown(this.form, (form) =>
      form.controls.group.valueChanges.subscribe((group) => followGroup(form, group)),
    );
  }

  protected async save(): Promise<void> {
    const isNew = this.id() === 'new';
    if (!this.changed()) {
      this.form().markAsPristine();
      await this.router.navigate(['/set-up/causes']);
      return;
    }
    const ids = await this.saver.save(
      this.form(),
      'POST',
      isNew ? '/causes' : `/causes/${this.id()}/versions`,
      () => {
        const facts = causeFacts(this.form());
        const at = this.form().controls.effectiveAt.value ?? Math.round(this.clock.correctedNow());
        return isNew ? { facts } : { facts, effectiveAt: at };
      },
      { under: 'facts' },
    );
    if (ids)
      await this.router.navigate(['/set-up/causes'], { queryParams: { at: isNew ? ids[0] : this.id() } });
  }
}
