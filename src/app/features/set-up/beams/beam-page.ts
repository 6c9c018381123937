import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { clothFromWarp } from '@shared/figures/cloth';
import { isNoFigure } from '@shared/figures/no-figure';
import { outcomeOf } from '../../../core/answer';
import { Clock } from '../../../core/clock';
import { EmptyState } from '../../../ui/empty-state';
import { ChoiceField } from '../common/choice-field';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { versionToEdit } from '../common/in-force';
import { judgeTogether } from '../common/judge-together';
import { NumberField } from '../common/number-field';
import { QUANTITIES } from '../common/quantity';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { whileShown } from '../common/while-shown';
import { withUnit } from '../common/with-unit';
import { BEAM_LABELS, beamForm, beamOf } from './beam-form';
import { beamPlace } from './beam-place';

/** One beam: whose cloth's warp, how long. */
@Component({
  selector: 'app-beam-page',
  imports: [ChoiceField, EmptyState, FormFoot, MatButton, NumberField, RoomHeading, RouterLink, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-room-heading
      [heading]="beam() ? 'Beam ' + beam()?.name : 'A new beam'"
      [words]="place() ? 'It is ' + place() + '. Closed shifts keep what they were signed with.' : ''"
    />
    @if (isThere()) {
      <form (submit)="save(); $event.preventDefault()" novalidate>
        <div class="fields">
          <app-text-field [label]="labels.name" [control]="form().controls.name" hint="As on its ticket." />
          <app-choice-field
            [label]="labels.clothId"
            unchosen="Choose a cloth"
            [control]="form().controls.clothId"
            [choices]="cloths()"
          />
          <app-number-field
            [label]="labels.lengthM"
            of="length"
            [control]="form().controls.lengthM"
            [hint]="gives()"
          />
          <app-number-field
            [label]="labels.thrumM"
            of="length"
            [control]="form().controls.thrumM"
            hint="What cannot be woven at its end."
          />
        </div>
        <app-form-foot [label]="beam() ? 'Save the beam' : 'Add the beam'" back="/set-up/beams">
          @if (beam(); as one) {
            @if (!one.used) {
              <button matButton="text" type="button" (click)="remove(one.id)">
                {{ sure() ? 'Press again to remove it' : 'Remove it' }}
              </button>
            }
          }
        </app-form-foot>
      </form>
    } @else {
      <app-empty-state heading="There is no such beam">
        <a matButton="outlined" routerLink="/set-up/beams">To the beams</a>
      </app-empty-state>
    }
  `,
  styleUrls: ['../common/room.scss', '../common/form.scss'],
})
export class BeamPage {
  /** From the address: a beam's id, or `new`. */
  readonly id = input.required<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);

  protected readonly labels = BEAM_LABELS;
  protected readonly sure = signal(false);
  protected readonly beam = computed(() => this.store.known().beams.find((one) => one.id === this.id()));
  protected readonly isThere = computed(() => this.id() === 'new' || this.beam() !== undefined);
  protected readonly place = computed(() => {
    const beam = this.beam();
    return beam ? beamPlace(beam, this.store.known().looms) : '';
  });
  protected readonly cloths = computed(() =>
    this.store
      .known()
      .cloths.filter(({ id, retired }) => !retired || id === this.beam()?.clothId)
      .map(({ id, name }) => ({ value: id, words: name })),
  );
  protected readonly form = computed(() => {
    const id = this.id();
    return untracked(() =>
      beamForm(this.beam() ?? null, () =>
        this.store.known().beams.flatMap((one) => (one.id === id ? [] : one.name)),
      ),
    );
  });
  private readonly turns = turnsOf(this.form);
  /** What the warp gives of its cloth, while both are typed. */
  protected readonly gives = computed(() => {
    this.turns();
    const { clothId, lengthM, thrumM } = this.form().getRawValue();
    const versions = this.store.known().clothVersions.filter((one) => one.clothId === clothId);
    const version = versionToEdit(versions, this.clock.tick());
    if (!version || lengthM === null) return '';
    const cloth = clothFromWarp(lengthM - (thrumM ?? 0), version.crimp);
    return isNoFigure(cloth)
      ? ''
      : `Gives ${withUnit(cloth, QUANTITIES.length[this.store.units()])} of cloth.`;
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
    whileShown(this.form, (form) => judgeTogether(form, [form.controls.thrumM]));
  }

  protected async save(): Promise<void> {
    const id = this.beam()?.id;
    const ids = await this.saver.save(
      this.form(),
      id === undefined ? 'POST' : 'PATCH',
      id === undefined ? '/beams' : `/beams/${id}`,
      () => beamOf(this.form()),
    );
    if (ids) await this.router.navigate(['/set-up/beams'], { queryParams: { at: id ?? ids[0] } });
  }

  /** Asks twice, in place: a beam that was never used leaves no trace but the change record's. */
  protected async remove(id: string): Promise<void> {
    if (!this.sure()) {
      this.sure.set(true);
      return;
    }
    const outcome = outcomeOf(await this.store.change('DELETE', `/beams/${id}`));
    if (outcome.ok) {
      this.form().markAsPristine();
      await this.router.navigate(['/set-up/beams']);
    } else this.saver.failure.set(outcome.sentence);
  }
}
