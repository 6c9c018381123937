import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { ChoiceField } from '../common/choice-field';
import { turnsOf } from '../common/field-state';
import { NumberField } from '../common/number-field';
import { CLOCK_KIND_WORDS, type FactsForm } from './loom-facts';

/** The fields of a loom's facts: speed, reed space, pick clock, shuttles, battery. */
@Component({
  selector: 'app-facts-fields',
  imports: [ChoiceField, NumberField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <div class="fields">
      <app-number-field
        label="Speed"
        unit="picks/min"
        [control]="form().controls.ppm"
        [hint]="differs('ppm')"
      />
      <app-number-field
        label="Reed space"
        of="width"
        [control]="form().controls.reedSpaceCm"
        [hint]="differs('reedSpaceCm')"
      />
      <app-number-field label="Shuttles" [control]="form().controls.shuttles" [hint]="differs('shuttles')" />
      <app-choice-field
        label="Battery of perns"
        [unchosen]="partial() && form().controls.battery.value === '' ? 'As it is: they differ' : ''"
        [control]="form().controls.battery"
        [choices]="batteries"
      />
      <app-choice-field
        class="wide"
        label="Pick clock"
        [unchosen]="
          partial() && form().controls.clock.controls.kind.value === '' ? 'As it is: they differ' : ''
        "
        [control]="form().controls.clock.controls.kind"
        [choices]="kinds"
      />
      <app-number-field
        label="One step of the clock"
        unit="picks"
        hint="1, 100 or 1,000 are usual."
        [control]="form().controls.clock.controls.unit"
      />
      <app-number-field label="Digits of the clock" [control]="form().controls.clock.controls.digits" />
    </div>
    @if (narrow()) {
      <p class="problem" role="alert">{{ narrow() }}</p>
    }
  `,
  styleUrl: '../common/form.scss',
})
export class FactsFields {
  readonly form = input.required<FactsForm>();
  /** For several looms: what is left empty stays as it was. */
  readonly partial = input(false);

  private readonly turns = turnsOf(this.form);
  protected readonly kinds = Object.entries(CLOCK_KIND_WORDS).map(([value, words]) => ({
    value: value as keyof typeof CLOCK_KIND_WORDS | '',
    words,
  }));
  protected readonly batteries: { value: 'yes' | 'no' | ''; words: string }[] = [
    { value: 'no', words: 'No, changed by hand' },
    { value: 'yes', words: 'Yes, automatic' },
  ];
  protected readonly narrow = computed(() => {
    this.turns();
    const words: unknown = this.form().errors?.['narrow'];
    return typeof words === 'string' ? words : '';
  });

  protected differs(fact: 'ppm' | 'reedSpaceCm' | 'shuttles'): string {
    this.turns();
    return this.partial() && this.form().controls[fact].value === null
      ? 'They differ; empty leaves each as it is.'
      : '';
  }
}
