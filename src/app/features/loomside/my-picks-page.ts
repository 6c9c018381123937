import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { Shift } from '@shared/contract/reference';
import { Clock } from '../../core/clock';
import { formatDate } from '../../core/dates';
import { SessionStore } from '../../core/session-store';
import { OfflineBook } from '../../offline/offline-book';
import { EmptyState } from '../../ui/empty-state';
import { ReadingBar } from '../../ui/reading-bar';
import { LoomsideStore } from './loomside-store';
import { PayWords } from './pay-words';

/** So far back this device answers for somebody's picks. */
const BACK = 14 * 86_400_000;

/** My picks for pay, shift by shift, the newest first, as far as this device knows the shifts. */
@Component({
  selector: 'app-my-picks-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, MatButton, ReadingBar, PayWords, RouterLink],
  template: `
    <a matButton="outlined" class="back" routerLink="/loomside">Back to my looms</a>
    <header>
      <h1>My picks for pay</h1>
      <p class="muted">
        The last 14 days, as this device knows them. What you confirm or query stands beside the loom’s line
        for the foreman; it changes no figure.
      </p>
    </header>
    @if (!store.ready()) {
      <app-reading-bar />
    } @else {
      @for (shift of shifts(); track shift.key) {
        <section>
          <h2>{{ words(shift) }}</h2>
          <app-pay-words [shift]="shift" />
        </section>
      } @empty {
        <app-empty-state
          heading="No shift of yours is known here"
          words="This device knows the shifts that were logged on it, and what the book has sent it since."
        />
      }
    }
  `,
  styleUrl: './pass.scss',
})
export class MyPicksPage {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  protected readonly store = inject(LoomsideStore);

  protected readonly shifts = computed<readonly Shift[]>(() => {
    const now = this.clock.tick();
    const me = this.session.person()?.id ?? null;
    return this.book
      .shifts()
      .filter((shift) => shift.startsAt <= now && shift.endsAt > now - BACK)
      .filter((shift) => this.book.setOf(me, shift).length > 0)
      .reverse();
  });

  protected words(shift: Shift): string {
    const closed = shift.state === 'closed' ? ', closed' : '';
    return `${formatDate(shift.date)}, ${shift.name}${closed}`;
  }
}
