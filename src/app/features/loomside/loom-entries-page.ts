import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import type { OwnEntry } from '../../offline/book-view';
import { NOT_SAVED, NotSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';
import { describeEntry } from '../../offline/outbox-items';
import { ClothStrip } from '../../ui/cloth-strip';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { LoomsideStore } from './loomside-store';

const REASONS = ['Tapped by mistake', 'Wrong loom', 'Logged twice', 'Wrong cause'] as const;

const STATE_WORDS: Readonly<Record<OwnEntry['state'], string>> = {
  waiting: 'saved here, not sent',
  later: 'saved here, the server is too old for it',
  stored: 'in the book',
  held: 'held: the foreman decides',
  refused: 'refused: it needs a look',
};

/** What I logged on one loom in this shift, newest first, and the way to take it back with a reason. */
@Component({
  selector: 'app-loom-entries-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ClothStrip, EmptyState, ErrorState, MatButton, RouterLink],
  templateUrl: './loom-entries-page.html',
  styleUrls: ['./pass.scss', './loom-entries-page.scss'],
})
export class LoomEntriesPage {
  /** From the address. */
  readonly loomId = input.required<string>();

  private readonly book = inject(OfflineBook);
  protected readonly store = inject(LoomsideStore);

  protected readonly reasons = REASONS;
  protected readonly reasonLength = LIMITS.reasonLength;
  protected readonly failure = signal('');
  /** The entry that is asked about. */
  protected readonly asked = signal<string | null>(null);

  protected readonly loom = computed(() => this.store.loomById(this.loomId()));
  protected readonly view = computed(() => {
    const loom = this.loom();
    const shift = this.store.shift();
    return loom && shift ? this.store.viewOf(loom, shift) : null;
  });
  protected readonly entries = computed(() =>
    this.book.recentOf(this.loomId()).map((own) => ({
      id: own.id,
      what: describeEntry(own.entry, this.book.reference()).replace(/^Loom \d+: /, ''),
      time: clockTime(own.at, this.store.timeZone()),
      until: own.until === null ? '' : clockTime(own.until, this.store.timeZone()),
      state: STATE_WORDS[own.state],
      unsure: own.state !== 'stored',
      voided: own.voided,
      mayUndo: !own.voided && own.state !== 'refused',
    })),
  );

  protected ask(id: string): void {
    this.asked.set(id);
    this.failure.set('');
  }

  protected async takeBack(id: string, reason: string): Promise<void> {
    const said = reason.trim();
    if (!said) {
      this.failure.set('Say why in a word or two: the book keeps what was taken back, and why.');
      return;
    }
    try {
      await this.book.undo(id, said);
      this.asked.set(null);
      this.failure.set('');
    } catch (error) {
      this.failure.set(error instanceof NotSaved ? error.sentence : NOT_SAVED['storage-closed']);
    }
  }
}
