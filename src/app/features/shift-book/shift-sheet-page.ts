import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { formatCount } from '@shared/figures/format';
import { Subject, merge } from 'rxjs';
import { formatDay, formatMoment, formatTime } from '../../core/dates';
import { reportLoad } from '../../core/report-load';
import { ReportsClient } from '../../core/reports-client';
import { BookReach } from '../../offline/book-reach';
import { OfflineBook } from '../../offline/offline-book';
import { coverageWords } from '../../ui/coverage-words';
import { EmptyState } from '../../ui/empty-state';
import { hostWidth } from '../../ui/host-width';
import { ReportTrouble } from '../../ui/report-trouble';
import { HandoverBanner } from './handover/handover-banner';
import { NotSentNote } from './not-sent-note';
import { SheetCards } from './sheet-cards';
import { SheetPdfClient } from './sheet-pdf-client';
import { SheetTable } from './sheet-table';
import { leftOutWords, sheetRows, totalFigures } from '@shared/sheet/sheet-rows';
import { StripLegend } from './strip-legend';

/** Narrower than this the sheet is cards. */
const TABLE_WIDTH = 940;

/** One shift's sheet: its loom lines, those that need a look first. */
@Component({
  selector: 'app-shift-sheet-page',
  imports: [
    EmptyState,
    HandoverBanner,
    MatButton,
    MatIcon,
    NotSentNote,
    ReportTrouble,
    RouterLink,
    SheetCards,
    SheetTable,
    StripLegend,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './shift-sheet-page.html',
  styleUrls: ['./back-link.scss', './shift-sheet-page.scss'],
  host: { class: 'page' },
})
export class ShiftSheetPage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();
  /** `look`: only lines that need one. From the address. */
  readonly only = input<string>();

  private readonly reports = inject(ReportsClient);
  private readonly reach = inject(BookReach);
  private readonly book = inject(OfflineBook);
  private readonly pdfs = inject(SheetPdfClient);
  private readonly width = hostWidth(TABLE_WIDTH);
  protected readonly again = new Subject<void>();
  private readonly timeZone = computed(() => this.book.reference().mill.timeZone);

  protected readonly load = reportLoad(
    this.key,
    // A closed shift changes too: a late entry, a correction, a reopening.
    merge(this.again, this.reach.changed),
    (key, signal) => this.reports.sheet(key, signal),
  );
  protected readonly sheet = computed(() => this.load().value);
  protected readonly rows = computed(() => {
    const sheet = this.sheet();
    return sheet ? sheetRows(sheet) : [];
  });
  protected readonly looking = computed(() => this.rows().filter((row) => row.needsLook));
  protected readonly onlyLook = computed(() => this.only() === 'look' && this.looking().length > 0);
  protected readonly shown = computed(() => (this.onlyLook() ? this.looking() : this.rows()));
  protected readonly asTable = computed(() => this.width() >= TABLE_WIDTH);
  protected readonly total = computed(() => {
    const sheet = this.sheet();
    return sheet ? totalFigures(sheet) : null;
  });
  /** Beside the shed's efficiency, unless that is the most that it can be. */
  protected readonly coverage = computed(() => {
    const sheet = this.sheet();
    if (!sheet || this.total()?.efficiency.atMost) return '';
    const words = coverageWords(sheet.total, 'looms');
    return words && `, ${words}`;
  });
  protected readonly leftOut = computed(() => {
    const sheet = this.sheet();
    return sheet && !this.runs() ? leftOutWords(sheet.total) : '';
  });
  protected readonly lastReached = this.reach.lastReachedWords;

  protected readonly name = computed(() => {
    const sheet = this.sheet();
    if (!sheet) return '';
    return `${sheet.shift.name}, ${formatDay(sheet.shift.date)}, ${this.hours()}`;
  });
  protected readonly hours = computed(() => {
    const shift = this.sheet()?.shift;
    return shift
      ? `${formatTime(shift.startsAt, this.timeZone())} to ${formatTime(shift.endsAt, this.timeZone())}`
      : '';
  });
  protected readonly runs = computed(() => {
    const sheet = this.sheet();
    return sheet !== null && sheet.asOf < sheet.shift.endsAt;
  });
  protected readonly begun = computed(() => {
    const sheet = this.sheet();
    return sheet !== null && sheet.asOf >= sheet.shift.startsAt;
  });
  protected readonly heading = computed(() => {
    const count = this.looking().length;
    if (this.rows().length === 0) return 'No loom lines yet';
    if (this.runs()) return 'The shift in progress';
    if (count === 0) return 'Every loom line is whole';
    return count === 1 ? '1 loom line needs a look' : `${count} loom lines need a look`;
  });
  protected readonly held = computed(() => {
    const held = this.sheet()?.held ?? 0;
    return held === 0 ? '' : held === 1 ? '1 entry is held' : `${formatCount(held)} entries are held`;
  });
  protected readonly closed = computed(() => {
    const sheet = this.sheet();
    if (!sheet?.closed) return '';
    const again = sheet.closed.version > 1 ? `, signed version ${sheet.closed.version}` : '';
    return `closed ${formatMoment(sheet.closed.at, sheet.asOf, this.timeZone())} by ${sheet.closed.by}${again}`;
  });
  protected readonly asOf = computed(() => {
    const sheet = this.sheet();
    return sheet ? formatMoment(sheet.asOf, sheet.shift.startsAt, this.timeZone()) : '';
  });

  protected readonly fetching = signal(false);
  protected readonly pdfTrouble = signal('');

  protected async savePdf(): Promise<void> {
    this.fetching.set(true);
    const saved = await this.pdfs.save(this.key());
    this.fetching.set(false);
    this.pdfTrouble.set(
      saved
        ? ''
        : 'The PDF was not fetched: the server did not give it. The sheet is safe; print it here, or try again.',
    );
  }

  protected print(): void {
    window.print();
  }
}
