import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  untracked,
} from '@angular/core';
import { FormControl, ReactiveFormsModule, type ValidatorFn } from '@angular/forms';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { problemOfField } from './field';
import { matcherOf, speaks, turnsOf } from './field-state';
import { QUANTITIES, numberProblem, plain, readQuantity, textOf, type Quantity } from './quantity';
import { SetUpStore } from './set-up-store';

/**
 * A number of a form. The control holds the stored value (cm, m, per cm, g, a share …), the field shows and reads the
 * mill's units; a value that nobody edits stays the very one that is stored. A decimal comma is as good as a point.
 */
@Component({
  selector: 'app-number-field',
  imports: [MatFormFieldModule, MatInput, ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      <input
        matInput
        type="text"
        class="num"
        inputmode="decimal"
        autocomplete="off"
        [formControl]="text"
        [errorStateMatcher]="matcher"
        [placeholder]="placeholder()"
        (input)="take()"
        (blur)="leave()"
      />
      @if (shown().unit) {
        <span matTextSuffix class="muted">{{ shown().unit }}</span>
      }
      @if (hint()) {
        <mat-hint>{{ hint() }}</mat-hint>
      }
      <mat-error>{{ problem() }}</mat-error>
    </mat-form-field>
  `,
  styles: `
    :host {
      display: block;
    }
    [matTextSuffix] {
      padding-left: 6px;
      white-space: nowrap;
    }
  `,
})
export class NumberField {
  private readonly store = inject(SetUpStore);

  readonly control = input.required<FormControl<number | null>>();
  readonly label = input.required<string>();
  /** A measure that the mill's units change. */
  readonly of = input<keyof typeof QUANTITIES | null>(null);
  /** Any other way to show it, e.g. PERCENT. */
  readonly quantity = input<Quantity | null>(null);
  /** The unit of a number that no system changes. */
  readonly unit = input('');
  readonly hint = input('');
  readonly placeholder = input('');

  protected readonly text = new FormControl('', { nonNullable: true });
  private readonly turns = turnsOf(this.control);
  protected readonly matcher = matcherOf(() => this.control());
  protected readonly shown = computed<Quantity>(() => {
    const of = this.of();
    return this.quantity() ?? (of ? QUANTITIES[of][this.store.units()] : plain(this.unit()));
  });
  protected readonly problem = computed(() => {
    this.turns();
    // Empty until it is said: only then does the view notice that somebody asked to save.
    return speaks(this.control()) ? problemOfField(this.control(), this.label(), this.shown()) : '';
  });
  /** The value that the text stands for: as long as the text is its text, the value is not touched. */
  private kept: number | null = null;

  private readonly isNumber: ValidatorFn = () => {
    const typed = this.text.value.trim();
    const problem = typed === '' ? '' : numberProblem(typed);
    return problem ? { typed: problem } : null;
  };

  constructor() {
    effect((onCleanup) => {
      const control = this.control();
      const quantity = this.shown();
      control.addValidators(this.isNumber);
      untracked(() => this.show(control.value, quantity));
      const changes = control.valueChanges.subscribe((value) => {
        if (value !== readQuantity(this.text.value, quantity, this.kept)) this.show(value, quantity);
      });
      onCleanup(() => {
        changes.unsubscribe();
        control.removeValidators(this.isNumber);
      });
    });
  }

  protected take(): void {
    const control = this.control();
    control.markAsDirty();
    control.setValue(readQuantity(this.text.value, this.shown(), this.kept));
  }

  protected leave(): void {
    this.control().markAsTouched();
  }

  private show(value: number | null, quantity: Quantity): void {
    this.kept = value;
    this.text.setValue(value === null ? '' : textOf(value, quantity));
  }
}
