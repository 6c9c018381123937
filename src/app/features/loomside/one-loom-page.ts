import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { SessionStore } from '../../core/session-store';
import { OfflineBook } from '../../offline/offline-book';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { ReadingBar } from '../../ui/reading-bar';
import { LoggedBar } from './logged-bar';
import { LoomCard } from './loom-card';
import { LoomsideStore } from './loomside-store';
import { Saving } from './saving';
import { StopAsker } from './stop-asker';
import { StopLog } from './stop-log';
import { StopSheetOpener } from './stop-sheet-opener';

/** One loom by the number painted on it: what its label opens. In nobody's set, or another's, it can be taken over. */
@Component({
  selector: 'app-one-loom-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, ErrorState, LoggedBar, LoomCard, MatButton, ReadingBar, RouterLink],
  templateUrl: './one-loom-page.html',
  styleUrls: ['./pass.scss', './one-loom-page.scss'],
  providers: [StopAsker, StopSheetOpener],
})
export class OneLoomPage {
  /** From the address. */
  readonly number = input.required<string>();

  private readonly book = inject(OfflineBook);
  private readonly session = inject(SessionStore);
  protected readonly ask = inject(StopAsker);
  protected readonly log = inject(StopLog);
  protected readonly store = inject(LoomsideStore);
  protected readonly saving = new Saving();

  protected readonly loom = computed(
    () => this.book.looms().find((loom) => String(loom.number) === this.number().trim()) ?? null,
  );
  protected readonly view = computed(() => {
    const loom = this.loom();
    const shift = this.store.shift();
    return loom && shift ? this.store.viewOf(loom, shift) : null;
  });
  protected readonly mine = computed(() => {
    const loom = this.loom();
    return loom !== null && this.book.mySet().some((one) => one.id === loom.id);
  });
  /** A weaver minds looms; a tackler or a foreman only looks in. */
  protected readonly weaves = computed(() => this.session.person()?.roles.includes('weaver') ?? false);
  protected readonly minded = computed(() => {
    const loom = this.loom();
    return loom !== null && this.book.weaverOf(loom.id) !== null;
  });

  protected async takeOver(): Promise<void> {
    const loom = this.loom();
    const shift = this.store.shift();
    const weaverId = this.session.person()?.id;
    if (!loom || !shift || !weaverId || this.saving.busy()) return;
    await this.saving.keep(() =>
      this.book.log({ kind: 'assign', shiftKey: shift.key, weaverId, loomIds: [loom.id] }),
    );
  }
}
