import { ChangeDetectionStrategy, Component, afterNextRender, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { MatProgressBar } from '@angular/material/progress-bar';
import { Router, RouterLink } from '@angular/router';
import { Clock } from '../../core/clock';
import { dateOf, formatMoment } from '../../core/dates';
import { OfflineBook } from '../../offline/offline-book';
import { CAUTION } from '../../ui/caution';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { CallCard } from './call-card';
import { CallFlash } from './call-flash';
import { CallLog, type CallStep } from './call-log';
import { CallSound } from './call-sound';
import { CallsStore, type CallRow } from './calls-store';
import { PushWord } from './push-word';

/** Who waits for the tackler, the longest first. */
@Component({
  selector: 'app-calls-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [CallCard, CallFlash, EmptyState, ErrorState, MatButton, MatIcon, MatProgressBar, RouterLink],
  templateUrl: './calls-page.html',
  styleUrl: './calls-page.scss',
  host: { class: 'page' },
})
export class CallsPage {
  private readonly router = inject(Router);
  private readonly clock = inject(Clock);
  private readonly log = inject(CallLog);
  protected readonly book = inject(OfflineBook);
  protected readonly store = inject(CallsStore);
  protected readonly sound = inject(CallSound);
  protected readonly push = inject(PushWord);
  protected readonly caution = CAUTION;

  protected readonly state = computed(() => {
    if (this.book.trouble() !== null) return 'no-storage';
    if (!this.book.ready() || this.store.catchingUp()) return 'loading';
    if (this.book.looms().length > 0) return 'calls';
    // A device that has not heard from the book yet does not know that there are none.
    const { kind, lastReachedAt } = this.book.syncState();
    return lastReachedAt === null && kind !== 'offline' ? 'loading' : 'no-looms';
  });
  /** Since when the list is not the newest; empty: it is. */
  protected readonly since = computed(() => {
    const at = this.store.knownUntil();
    if (this.store.live()) return '';
    if (at === null) return 'This device has not reached the book yet.';
    const now = this.clock.tick();
    const moment = dateOf(at) === dateOf(now) ? clockTime(at, this.store.timeZone()) : formatMoment(at, now);
    return `As this device knew it at ${moment}. Calls from other tablets since then are not here.`;
  });
  protected readonly unwritten = computed(() =>
    this.store.unwritten().map((row) => ({ ...row, time: clockTime(row.attendedAt, this.store.timeZone()) })),
  );
  protected readonly pushWords = computed(() => {
    switch (this.push.state()) {
      case 'on':
        return 'This device is told of calls when the page is closed, too.';
      case 'off':
        return 'Calls show here while this page is open.';
      case 'denied':
        return 'This browser was told to show no notices. Calls show here while this page is open.';
      case 'unsupported':
        return 'This browser takes no notices. Calls show here while this page is open.';
    }
  });

  constructor() {
    afterNextRender(() => void this.push.renew());
  }

  protected async say(row: CallRow, step: CallStep): Promise<void> {
    const saved = await this.log.say(row, step);
    if (saved && step === 'done')
      await this.router.navigate(['/calls/loom', row.loom.id, 'repair'], { queryParams: { call: row.id } });
  }
}
