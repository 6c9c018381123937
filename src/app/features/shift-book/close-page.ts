import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import { Subject, merge } from 'rxjs';
import { reportLoad } from '../../core/report-load';
import { ReportsClient } from '../../core/reports-client';
import { BookReach } from '../../offline/book-reach';
import { OfflineBook } from '../../offline/offline-book';
import { ReportTrouble } from '../../ui/report-trouble';
import { closeChecks } from './close-checks';
import { sayBy } from './say';
import { ShiftHeading } from './shift-heading';
import { ShiftRecordsClient } from './shift-records-client';
import { ShiftWriter } from './shift-writer';
import { SignedList } from './signed-list';

/** Closes a shift by a check list, opens it again with a reason, and shows what was signed, every version. */
@Component({
  selector: 'app-close-page',
  imports: [MatButton, MatIcon, ReportTrouble, RouterLink, ShiftHeading, SignedList],
  providers: [ShiftWriter],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './close-page.html',
  styleUrls: ['./back-link.scss', './form.scss', './close-page.scss'],
  host: { class: 'page' },
})
export class ClosePage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();

  private readonly reports = inject(ReportsClient);
  private readonly records = inject(ShiftRecordsClient);
  private readonly book = inject(OfflineBook);
  private readonly reach = inject(BookReach);
  protected readonly writer = inject(ShiftWriter);
  protected readonly again = new Subject<void>();
  private readonly news = merge(this.again, this.reach.changed);
  protected readonly reasonLength = LIMITS.reasonLength;
  protected readonly noteLength = LIMITS.textLength;

  protected readonly sheetLoad = reportLoad(this.key, this.news, (key, signal) =>
    this.reports.sheet(key, signal),
  );
  private readonly heldLoad = reportLoad(this.key, this.news, (key, signal) =>
    this.records.held(key, signal),
  );
  private readonly signedLoad = reportLoad(this.key, this.news, (key, signal) =>
    this.records.signed(key, signal),
  );
  protected readonly sheet = computed(() => this.sheetLoad().value);
  protected readonly signed = computed(() => this.signedLoad().value);
  protected readonly lastReached = this.reach.lastReachedWords;
  protected readonly say = computed(() => sayBy(this.book.reference(), this.book.people()));

  protected readonly note = signal('');
  protected readonly reason = signal('');
  /** The deliberate tick: closed with what is left. */
  protected readonly asIs = signal(false);
  protected readonly asked = signal(false);

  protected readonly checks = computed(() => {
    const [sheet, held] = [this.sheet(), this.heldLoad().value];
    return sheet && held ? closeChecks(sheet, held) : null;
  });
  protected readonly blocked = computed(() => (this.checks() ?? []).some((check) => check.blocks));
  protected readonly isClosed = computed(() => this.sheet()?.shift.state === 'closed');
  protected readonly heading = computed(() => {
    if (this.isClosed()) return 'The shift is closed';
    const left = this.checks()?.length ?? 0;
    return left === 0 ? 'Nothing is left: close the shift' : 'Before you close the shift';
  });
  protected readonly closeProblem = computed(() => {
    if (this.blocked()) return 'Decide about what is held first.';
    const left = this.checks()?.length ?? 0;
    return left > 0 && !this.asIs() ? 'Tick that the shift is closed with what is left.' : '';
  });
  protected readonly reopenProblem = computed(() =>
    this.reason().trim() ? '' : 'Say why in a word or two: the book keeps it.',
  );

  protected async close(): Promise<void> {
    this.asked.set(true);
    const shift = this.sheet()?.shift;
    if (this.closeProblem() || !shift) return;
    const note = this.note().trim();
    const place = { shiftKey: shift.key, shedId: shift.shedId };
    if (await this.writer.save([{ kind: 'close', ...place, ...(note && { note }) }])) this.forget();
  }

  protected async reopen(): Promise<void> {
    this.asked.set(true);
    const shift = this.sheet()?.shift;
    if (this.reopenProblem() || !shift) return;
    const place = { shiftKey: shift.key, shedId: shift.shedId };
    if (await this.writer.save([{ kind: 'reopen', ...place, reason: this.reason().trim() }])) this.forget();
  }

  private forget(): void {
    this.asked.set(false);
    this.asIs.set(false);
    this.note.set('');
    this.reason.set('');
  }
}
