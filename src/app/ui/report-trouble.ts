import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { EmptyState } from './empty-state';
import { ErrorState } from './error-state';

/** Why a report cannot be shown, or not anew: the server out of reach, no permission, or a failure. */
@Component({
  selector: 'app-report-trouble',
  imports: [EmptyState, ErrorState],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @switch (state()) {
      @case ('offline') {
        <app-error-state
          [heading]="kept() ? 'Shown as last fetched' : 'This page needs the book’s server'"
          [words]="
            (lastReached() ? 'The book was last reached ' + lastReached() + '. ' : '') +
            'What was logged is safe on its devices; this page comes back with the network.'
          "
          [canRetry]="true"
          (retry)="retry.emit()"
        />
      }
      @case ('not-permitted') {
        <app-empty-state heading="Not for your role" [words]="sentence()" />
      }
      @case ('not-found') {
        <app-empty-state heading="There is nothing here" [words]="sentence()"><ng-content /></app-empty-state>
      }
      @case ('failed') {
        <app-error-state
          [heading]="kept() ? 'Shown as last fetched' : 'This page could not be made'"
          [words]="sentence()"
          [canRetry]="true"
          (retry)="retry.emit()"
        />
      }
    }
  `,
  // Nothing wrong: no box, and no gap around one.
  styles: `
    :host {
      display: contents;
    }
  `,
})
export class ReportTrouble {
  readonly state = input.required<
    'loading' | 'ready' | 'offline' | 'not-permitted' | 'not-found' | 'failed'
  >();
  readonly sentence = input('');
  /** An earlier answer still stands on the page. */
  readonly kept = input(false);
  /** "10:12"; empty: not known. */
  readonly lastReached = input('');
  readonly retry = output();
}
