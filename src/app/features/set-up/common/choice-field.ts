import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { ReactiveFormsModule, type FormControl } from '@angular/forms';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { problemOfField } from './field';
import { matcherOf, turnsOf } from './field-state';

export interface Choice<T> {
  readonly value: T;
  readonly words: string;
}

/** One of several, by the browser's own list: at home on a phone and on the keyboard. */
@Component({
  selector: 'app-choice-field',
  imports: [MatFormFieldModule, MatInput, ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      <select matNativeControl [formControl]="control()" [errorStateMatcher]="matcher">
        @if (unchosen()) {
          <option [ngValue]="''">{{ unchosen() }}</option>
        }
        @for (choice of choices(); track choice.value) {
          <option [ngValue]="choice.value">{{ choice.words }}</option>
        }
      </select>
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
  `,
})
export class ChoiceField<T extends string | number | boolean | null> {
  readonly control = input.required<FormControl<T>>();
  readonly label = input.required<string>();
  readonly choices = input.required<readonly Choice<T>[]>();
  readonly hint = input('');
  /** What stands for no choice yet (value ''); empty: there is always one. */
  readonly unchosen = input('');

  private readonly turns = turnsOf(this.control);
  protected readonly matcher = matcherOf(() => this.control());
  protected readonly problem = computed(() => {
    this.turns();
    return problemOfField(this.control(), this.label());
  });
}
