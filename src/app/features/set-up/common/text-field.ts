import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { ReactiveFormsModule, type FormControl } from '@angular/forms';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { problemOfField } from './field';
import { matcherOf, turnsOf } from './field-state';

/** A line of text of a form, with the sentence that says what is wrong with it as it is typed. */
@Component({
  selector: 'app-text-field',
  imports: [MatFormFieldModule, MatInput, ReactiveFormsModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      <input
        matInput
        [type]="type()"
        [formControl]="control()"
        [errorStateMatcher]="matcher"
        [attr.autocomplete]="autocomplete()"
        [placeholder]="placeholder()"
      />
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
export class TextField {
  readonly control = input.required<FormControl<string>>();
  readonly label = input.required<string>();
  readonly hint = input('');
  readonly placeholder = input('');
  readonly type = input<'text' | 'email' | 'password' | 'date' | 'search'>('text');
  readonly autocomplete = input('off');

  private readonly turns = turnsOf(this.control);
  protected readonly matcher = matcherOf(() => this.control());
  protected readonly problem = computed(() => {
    this.turns();
    return problemOfField(this.control(), this.label());
  });
}
