import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router, RouterLink } from '@angular/router';
import { Subject, merge } from 'rxjs';
import { Clock } from '../../core/clock';
import { addDays, dateOf, formatDate } from '../../core/dates';
import { reportLoad } from '../../core/report-load';
import { ReportsClient } from '../../core/reports-client';
import { SessionStore } from '../../core/session-store';
import { BookReach } from '../../offline/book-reach';
import { OfflineBook } from '../../offline/offline-book';
import type { ChartSeries } from '../../ui/chart/chart-series';
import { LineChart } from '../../ui/chart/line-chart';
import { EmptyState } from '../../ui/empty-state';
import { hostWidth } from '../../ui/host-width';
import { noShedWords } from '../../ui/no-shed-words';
import { ReportTrouble } from '../../ui/report-trouble';
import { WeeksCards } from './weeks-cards';
import { METRICS, METRIC_IDS } from './weeks-metrics';
import { sortRows, weeksTable, type WeeksRow } from './weeks-rows';
import { WeeksTableView } from './weeks-table-view';
import { MOST_MARKED, RUNS, sameQuery, weeksQueryOf, weeksViewOf } from './weeks-view';
import { chartSummary, leftOutSentence, shedSentence } from './weeks-words';

/** Narrower than this the weeks are cards. */
const TABLE_WIDTH = 640;

/** Looms, or rows of looms, week over week. The address holds the view, so that it can be sent to somebody. */
@Component({
  selector: 'app-weeks-page',
  imports: [EmptyState, LineChart, MatButton, MatIcon, ReportTrouble, RouterLink, WeeksCards, WeeksTableView],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './weeks-page.html',
  styleUrl: './weeks-page.scss',
  host: { class: 'page' },
})
export class WeeksPage {
  // From the address.
  readonly metric = input<string>();
  readonly by = input<string>();
  readonly weeks = input<string>();
  readonly to = input<string>();
  readonly mark = input<string>();
  readonly sort = input<string>();
  readonly dir = input<string>();

  private readonly reports = inject(ReportsClient);
  private readonly reach = inject(BookReach);
  protected readonly session = inject(SessionStore);
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);
  private readonly width = hostWidth(TABLE_WIDTH);
  protected readonly again = new Subject<void>();

  protected readonly metrics = METRIC_IDS.map((id) => METRICS[id]);
  protected readonly runs = RUNS;
  protected readonly mostMarked = MOST_MARKED;
  private readonly today = computed(() => dateOf(this.clock.tick(), this.book.reference().mill.timeZone));
  protected readonly view = computed(() =>
    weeksViewOf(
      {
        metric: this.metric(),
        by: this.by(),
        weeks: this.weeks(),
        to: this.to(),
        mark: this.mark(),
        sort: this.sort(),
        dir: this.dir(),
      },
      this.today(),
    ),
  );
  private readonly query = computed(() => weeksQueryOf(this.view(), this.book.shedId()), {
    equal: sameQuery,
  });
  protected readonly load = reportLoad(this.query, merge(this.again, this.reach.changed), (query, signal) =>
    this.reports.weeks(query, signal),
  );
  protected readonly lastReached = this.reach.lastReachedWords;
  protected readonly chosenMetric = computed(() => METRICS[this.view().metric]);
  protected readonly table = computed(() => {
    const weeks = this.load().value;
    return weeks && weeksTable(weeks, this.chosenMetric(), this.today());
  });
  protected readonly rows = computed(() => {
    const table = this.table();
    return table ? sortRows(table, this.view()) : [];
  });
  protected readonly hasFigures = computed(
    () => this.table()?.total.cells.some((cell) => cell.value !== null) ?? false,
  );
  /** What the person marked; until then the first row in the order that they see. */
  protected readonly marked = computed(() => {
    const chosen = this.view().marked;
    if (chosen) return chosen.filter((key) => this.rows().some((row) => row.key === key));
    return this.rows()
      .filter((row) => row.cells.some((cell) => cell.value !== null))
      .slice(0, 1)
      .map((row) => row.key);
  });
  protected readonly asTable = computed(() => this.width() >= TABLE_WIDTH);
  protected readonly sentence = computed(() => {
    const table = this.table();
    return table ? shedSentence(table, this.chosenMetric()) : '';
  });
  protected readonly leftOut = computed(() => {
    const table = this.table();
    const weeks = this.load().value;
    return table && weeks ? leftOutSentence(table, weeks) : '';
  });
  protected readonly range = computed(
    () => `${formatDate(this.view().from)} to ${formatDate(addDays(this.view().to, 6))}`,
  );
  protected readonly earlier = computed(() => addDays(this.view().from, -7));
  protected readonly later = computed(() => addDays(this.view().to, 7 * this.view().run));
  protected readonly isLatest = computed(() => addDays(this.view().to, 7) > this.today());
  protected readonly noShed = computed(() => this.book.ready() && this.book.shedId() === null);
  protected readonly noShedWords = computed(() => noShedWords(this.session.may('mill.manage')));

  protected readonly chartLabels = computed(
    () => this.table()?.columns.map(({ label, soFar }) => (soFar ? [label, 'so far'] : label)) ?? [],
  );
  private readonly chartRows = computed(() => {
    const byKey = new Map(this.rows().map((row) => [row.key, row]));
    return this.marked()
      .map((key) => byKey.get(key))
      .filter((row) => row !== undefined);
  });
  protected readonly series = computed((): ChartSeries[] => {
    const table = this.table();
    if (!table) return [];
    const marked = this.chartRows();
    return [
      seriesOf(table.total, 'The shed', 'main'),
      ...marked.map((row) => seriesOf(row, this.rowName(row), 'marked')),
      ...this.rows()
        .filter((row) => !marked.includes(row))
        .map((row) => seriesOf(row, this.rowName(row), 'other')),
    ];
  });
  protected readonly summary = computed(() => {
    const table = this.table();
    if (!table) return '';
    const named = this.chartRows().map((row) => ({ ...row, label: this.rowName(row) }));
    return chartSummary([table.total, ...named], table, this.chosenMetric());
  });

  protected rowName(row: Pick<WeeksRow, 'label'>): string {
    return `${this.view().by === 'row' ? 'Row' : 'Loom'} ${row.label}`;
  }

  protected async sortBy(column: string): Promise<void> {
    const { sort, descending } = this.view();
    const down = sort === column ? !descending : column !== 'label' && column !== 'cloth';
    await this.show({ sort: column, dir: down ? 'down' : null });
  }

  protected async toggleMark(key: string): Promise<void> {
    const marked = this.marked();
    const next = marked.includes(key)
      ? marked.filter((one) => one !== key)
      : [...marked, key].slice(-MOST_MARKED);
    await this.show({ mark: next.join(',') });
  }

  protected retry(): void {
    this.book.retryNow();
    this.again.next();
  }

  private async show(queryParams: Record<string, string | null>): Promise<void> {
    await this.router.navigate([], { queryParams, queryParamsHandling: 'merge', replaceUrl: true });
  }
}

function seriesOf(row: WeeksRow, label: string, role: ChartSeries['role']): ChartSeries {
  const isRate = row.cells.some((cell) => cell.low !== null);
  return {
    key: row.key,
    label,
    role,
    values: row.cells.map((cell) => cell.value),
    ...(isRate && { low: row.cells.map((cell) => cell.low), high: row.cells.map((cell) => cell.high) }),
  };
}
