import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import type { ShiftList } from '@shared/contract/reports';
import { formatPercent } from '@shared/figures/format';
import { Subject, merge } from 'rxjs';
import { Clock } from '../../core/clock';
import { addDays, dateOf, formatDay, formatTime, isDate } from '../../core/dates';
import { reportLoad } from '../../core/report-load';
import { ReportsClient } from '../../core/reports-client';
import { SessionStore } from '../../core/session-store';
import { BookReach } from '../../offline/book-reach';
import { OfflineBook } from '../../offline/offline-book';
import { coverageWords } from '../../ui/coverage-words';
import { EmptyState } from '../../ui/empty-state';
import { noShedWords } from '../../ui/no-shed-words';
import { ReportTrouble } from '../../ui/report-trouble';
import { cell, type Cell } from '@shared/sheet/sheet-rows';

/** Days on one page of the book. */
const DAYS = 7;

interface ShiftRow {
  readonly key: string;
  readonly name: string;
  readonly hours: string;
  readonly state: 'in progress' | 'not begun' | 'open' | 'closed';
  readonly efficiency: Cell | null;
  /** "from 5 of 24 looms"; empty: from all. */
  readonly coverage: string;
  readonly look: string;
  readonly held: string;
}

/** The shift book: a week of shifts a page, the one in progress first to hand. */
@Component({
  selector: 'app-shift-book-page',
  imports: [EmptyState, MatButton, MatIcon, ReportTrouble, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './shift-book-page.html',
  styleUrl: './shift-book-page.scss',
  host: { class: 'page' },
})
export class ShiftBookPage {
  /** Last day of the page, from the address; today unless said. */
  readonly date = input<string>();

  private readonly reports = inject(ReportsClient);
  private readonly reach = inject(BookReach);
  protected readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  private readonly clock = inject(Clock);
  private readonly book = inject(OfflineBook);
  protected readonly again = new Subject<void>();
  private readonly timeZone = computed(() => this.book.reference().mill.timeZone);

  protected readonly today = computed(() => dateOf(this.clock.tick(), this.timeZone()));
  protected readonly last = computed(() => {
    const date = this.date();
    return date && isDate(date) ? date : this.today();
  });
  protected readonly first = computed(() => addDays(this.last(), 1 - DAYS));
  protected readonly earlier = computed(() => addDays(this.last(), -DAYS));
  protected readonly later = computed(() => addDays(this.last(), DAYS));
  protected readonly isLatest = computed(() => this.last() >= this.today());

  private readonly query = computed(
    () => {
      const shedId = this.book.shedId();
      return shedId ? { shedId, from: this.first(), to: this.last() } : null;
    },
    { equal: (a, b) => a?.shedId === b?.shedId && a?.from === b?.from && a?.to === b?.to },
  );
  protected readonly load = reportLoad(this.query, merge(this.again, this.reach.changed), (query, signal) =>
    this.reports.shifts(query, signal),
  );
  protected readonly lastReached = this.reach.lastReachedWords;
  protected readonly noShed = computed(() => this.book.ready() && this.book.shedId() === null);
  protected readonly noShedWords = computed(() => noShedWords(this.session.may('mill.manage')));

  protected readonly days = computed(() => {
    const byDate = new Map<string, ShiftRow[]>();
    const now = this.clock.tick();
    const shifts = [...(this.load().value?.shifts ?? [])].sort(
      // The latest first; what has not begun stands last in its day.
      (a, b) =>
        b.shift.date.localeCompare(a.shift.date) ||
        Number(a.shift.startsAt > now) - Number(b.shift.startsAt > now) ||
        b.shift.startsAt - a.shift.startsAt,
    );
    for (const one of shifts) {
      const rows = byDate.get(one.shift.date) ?? [];
      rows.push(shiftRow(one, now, this.timeZone()));
      byDate.set(one.shift.date, rows);
    }
    return [...byDate].map(([date, rows]) => ({ date, name: formatDay(date), rows }));
  });
  protected readonly range = computed(() => `${formatDay(this.first())} to ${formatDay(this.last())}`);

  protected async showDate(text: string): Promise<void> {
    if (isDate(text)) await this.router.navigate([], { queryParams: { date: text } });
  }

  protected retry(): void {
    this.book.retryNow();
    this.again.next();
  }
}

function shiftRow(
  { shift, group, flaggedLines, held }: ShiftList['shifts'][number],
  now: number,
  timeZone: string,
): ShiftRow {
  const state =
    shift.state === 'closed'
      ? 'closed'
      : now < shift.startsAt
        ? 'not begun'
        : now < shift.endsAt
          ? 'in progress'
          : 'open';
  return {
    key: shift.key,
    name: shift.name,
    hours: `${formatTime(shift.startsAt, timeZone)} to ${formatTime(shift.endsAt, timeZone)}`,
    state,
    efficiency: group
      ? cell(group.figures.efficiency, formatPercent, group.figures.atMost?.efficiency)
      : null,
    coverage: group ? coverageWords(group, 'looms') : '',
    look:
      flaggedLines === 0
        ? ''
        : flaggedLines === 1
          ? '1 loom line needs a look'
          : `${flaggedLines} loom lines need a look`,
    held: held === 0 ? '' : `${held} held`,
  };
}
