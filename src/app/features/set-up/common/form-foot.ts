import { ChangeDetectionStrategy, Component, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { ErrorState } from '../../../ui/error-state';
import { FormSaver } from './form-saver';

/** The foot of a form: what went wrong with saving, its button, the way back. */
@Component({
  selector: 'app-form-foot',
  imports: [ErrorState, MatButton, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (saver.failure()) {
      <app-error-state [words]="saver.failure()" />
    }
    <div class="acts">
      <button matButton="filled" type="submit" [disabled]="saver.busy()">
        {{ saver.busy() ? 'Saving …' : label() }}
      </button>
      @if (back()) {
        <a matButton="outlined" [routerLink]="back()">{{ backLabel() }}</a>
      }
      <ng-content />
    </div>
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
    }
    .acts {
      display: flex;
      flex-wrap: wrap;
      gap: 8px;
    }
  `,
})
export class FormFoot {
  protected readonly saver = inject(FormSaver);
  readonly label = input('Save');
  /** Where to go without saving; empty: there is no button for it. */
  readonly back = input('');
  readonly backLabel = input('Leave it');
}
