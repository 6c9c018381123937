import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { SessionStore } from '../../../core/session-store';
import { OfflineBook } from '../../../offline/offline-book';
import { ShedBook } from '../../../offline/shed-book';
import { shiftBefore } from './handover';

/** On the sheet of a shift that runs: the words of the shift before, until somebody has read them. */
@Component({
  selector: 'app-handover-banner',
  imports: [RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (unread(); as one) {
      <p class="flag look">
        <span
          >{{ one.name }} handed over words that nobody has read yet:
          <a [routerLink]="['/shift-book', one.key, 'handover']">read them</a></span
        >
      </p>
    }
  `,
  styles: `
    :host:not(:has(p)) {
      display: none;
    }
  `,
})
export class HandoverBanner {
  /** The shift whose sheet it stands on. */
  readonly shiftKey = input.required<string>();

  private readonly book = inject(OfflineBook);
  private readonly shed = inject(ShedBook);
  private readonly session = inject(SessionStore);

  protected readonly unread = computed(() => {
    const shift = this.book.shifts().find(({ key }) => key === this.shiftKey());
    const before = shift?.state === 'open' ? shiftBefore(this.book.shifts(), shift) : null;
    if (!before) return null;
    const { notes } = this.shed.eventsOf(before);
    const note = notes.filter(({ entry }) => entry.about === 'handover').at(-1);
    if (!note || note.entry.by === this.session.person()?.id) return null;
    const read = notes.some(({ entry }) => entry.about === 'read' && entry.noteId === note.root.entry.id);
    return read ? null : before;
  });
}
