import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { OfflineBook } from '../../offline/offline-book';

/** Figures are the book's; what still waits on this device is not in them, and that is said. */
@Component({
  selector: 'app-not-sent-note',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (waiting() > 0) {
      <p class="flag look" role="status">
        {{ waiting() }} not sent: figures here are the book’s as of {{ asOf() }}
      </p>
    }
  `,
  // Nothing waits: no gap around nothing.
  styles: `
    :host:empty {
      display: none;
    }
  `,
})
export class NotSentNote {
  /** "14:02". */
  readonly asOf = input.required<string>();

  private readonly book = inject(OfflineBook);
  protected readonly waiting = computed(() => this.book.syncState().waiting);
}
