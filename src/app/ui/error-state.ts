import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';

/** What went wrong, what is safe, what to do; with a way to try again where that helps. */
@Component({
  selector: 'app-error-state',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, MatIcon],
  host: { role: 'alert' },
  template: `
    <mat-icon svgIcon="look" aria-hidden="true" />
    <div>
      @if (heading()) {
        <h2>{{ heading() }}</h2>
      }
      <p>{{ words() }}</p>
      @if (canRetry()) {
        <button matButton="outlined" type="button" (click)="retry.emit()">Try again</button>
      }
      <ng-content />
    </div>
  `,
  styles: `
    :host {
      display: grid;
      grid-template-columns: auto 1fr;
      gap: 12px;
      padding: 12px var(--gap-2);
      border-left: 4px solid var(--madder);
      border-radius: var(--r);
      background: var(--madder-soft);
      color: var(--ink);
    }
    mat-icon {
      color: var(--madder);
    }
    button {
      margin-top: var(--gap-1);
    }
  `,
})
export class ErrorState {
  readonly heading = input('');
  readonly words = input.required<string>();
  readonly canRetry = input(false);
  readonly retry = output<void>();
}
