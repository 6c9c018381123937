import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  afterRenderEffect,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { efficiency } from '@shared/figures/efficiency';
import { formatCount, formatPercent } from '@shared/figures/format';
import { isNoFigure } from '@shared/figures/no-figure';
import { formatDay } from '../../../core/dates';
import { OfflineBook } from '../../../offline/offline-book';
import { clockTime } from '../../../ui/clock-time';
import { EmptyState } from '../../../ui/empty-state';
import { ErrorState } from '../../../ui/error-state';
import { CARD_FIELDS, type CardField } from './card';
import { cellAfter, type Cell } from './grid-keys';
import { PaperStore, type PaperRow } from './paper-store';
import { rowNews } from './row-news';

const HEADINGS: Readonly<Record<CardField, string>> = {
  start: 'Start',
  end: 'End',
  picks: 'Picks',
  warp: 'Warp',
  weft: 'Weft',
  perns: 'Perns',
  others: 'Other stops',
  weaver: 'Weaver',
};
const SPOKEN: Readonly<Record<CardField, string>> = {
  start: 'start reading',
  end: 'end reading',
  picks: 'picks',
  warp: 'warp breaks',
  weft: 'weft breaks',
  perns: 'perns',
  others: 'other stops: cause, then minutes',
  weaver: 'weaver: works number or name',
};

/** Types a shift's cards into the book: a row a loom, by keyboard alone, checked as it is typed. */
@Component({
  selector: 'app-paper-page',
  imports: [EmptyState, ErrorState, MatButton, MatIcon, RouterLink],
  providers: [PaperStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './paper-page.html',
  styleUrls: ['../back-link.scss', './paper-page.scss'],
  host: { class: 'page', '(keydown.control.enter)': 'putIn(); $event.preventDefault()' },
})
export class PaperPage {
  /** The shift's key, from the address. */
  readonly key = input.required<string>();

  protected readonly book = inject(OfflineBook);
  protected readonly store = inject(PaperStore);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly grid = viewChild<ElementRef<HTMLElement>>('grid');
  private begun = '';

  /** What was in the cell when it got the focus: Escape brings it back. */
  private before = '';
  /** Whether picks are typed instead of readings. */
  protected readonly byPicks = signal(false);
  protected readonly columns = computed<readonly CardField[]>(() =>
    CARD_FIELDS.filter((field) =>
      field === 'picks' ? this.byPicks() : !this.byPicks() || (field !== 'start' && field !== 'end'),
    ),
  );
  protected readonly headings = HEADINGS;
  protected readonly asked = signal(false);
  protected readonly said = signal('');
  protected readonly news = rowNews;

  protected readonly shiftWords = computed(() => {
    const shift = this.store.shift();
    if (!shift) return '';
    const zone = this.book.reference().mill.timeZone;
    const shed = this.book.reference().sheds.find(({ id }) => id === shift.shedId)?.name ?? '';
    const hours = `${clockTime(shift.startsAt, zone)} to ${clockTime(shift.endsAt, zone)}`;
    return `${shed} · ${shift.name}, ${formatDay(shift.date)}, ${hours}`;
  });
  protected readonly closed = computed(() => this.store.shift()?.state === 'closed');
  protected readonly waits = computed(() => this.store.rows().filter((row) => row.changed));
  /** Changed rows that cannot go in as they are. */
  protected readonly stuck = computed(() =>
    this.waits().filter((row) => row.check.said === null && !(row.check.blank && row.inBook)),
  );
  protected readonly inBook = computed(() => this.store.rows().filter((row) => row.inBook).length);
  protected readonly total = computed(() => {
    const whole = this.store
      .rows()
      .filter(({ check, place }) => check.efficiency !== null && check.picks !== null && place.ppm !== null);
    const picks = whole.reduce((sum, { check }) => sum + (check.picks ?? 0), 0);
    const possible = whole.reduce((sum, { place }) => sum + (place.ppm ?? 0) * place.minutes, 0);
    const share = efficiency(picks, possible);
    return whole.length === 0 || isNoFigure(share)
      ? null
      : { looms: whole.length, picks: formatCount(picks), efficiency: formatPercent(share) };
  });
  protected readonly notKnown = computed(() => {
    const key = this.key();
    const shed = this.book.reference().sheds.find(({ id }) => key.startsWith(`${id}:`));
    return shed && shed.id !== this.book.shedId() ? shed : null;
  });

  constructor() {
    effect(() => {
      const key = this.key();
      untracked(() => void this.store.open(key));
    });
    // An office browser shows one shed at a time: this shift's.
    effect(() => {
      const shed = this.notKnown();
      if (shed) untracked(() => this.book.chooseShed(shed.id));
    });
    // Whoever comes with a pile of cards begins to type.
    afterRenderEffect(() => {
      const grid = this.grid();
      const key = this.key();
      if (!grid || !this.store.ready() || this.begun === key) return;
      this.begun = key;
      const first = this.store.rows().findIndex((row) => row.check.blank);
      const row = Math.max(0, first);
      this.focus({ row, column: this.firstColumn(row) });
    });
  }

  protected figure(row: PaperRow): { readonly picks: string; readonly efficiency: string } {
    const { picks, efficiency: share } = row.check;
    return {
      picks: picks === null ? '' : formatCount(picks),
      efficiency: share === null ? '' : formatPercent(share),
    };
  }

  protected problemsOf(row: PaperRow): readonly string[] {
    return this.columns().flatMap((field) => {
      const problem = row.check.problems[field];
      return problem ? [`${HEADINGS[field]}: ${problem}`] : [];
    });
  }

  /** Whether the row has anything beneath it. */
  protected saidOf({ check, changed }: PaperRow): boolean {
    const asks = check.question !== '' && changed;
    return asks || Object.keys(check.problems).length > 0 || Boolean(check.othersWords || check.weaverName);
  }

  protected label(row: PaperRow, field: CardField): string {
    return `Loom ${row.place.loomNumber}, ${SPOKEN[field]}`;
  }

  /** What stands in an empty cell in grey: what the book has already. */
  protected ghost(row: PaperRow, field: CardField): string {
    const { startInBook, endInBook, clock } = row.place;
    if (field === 'start' && startInBook === null && clock?.kind === 'zeroed-each-shift') return '0';
    const known = field === 'start' ? startInBook : field === 'end' ? endInBook : null;
    return known === null ? '' : String(known);
  }

  protected enter(cell: HTMLInputElement): void {
    this.before = cell.value;
    cell.select();
  }

  protected type(row: PaperRow, field: CardField, cell: HTMLInputElement): void {
    // "." on the number pad: the weaver of the card above.
    if (field === 'weaver' && cell.value === '.') cell.value = this.above(row)?.text.weaver ?? '';
    this.store.type(row, field, cell.value);
  }

  protected move(event: KeyboardEvent, row: PaperRow, at: Cell, cell: HTMLInputElement): void {
    if (event.key === 'Escape') {
      cell.value = this.before;
      const field = this.columns()[at.column];
      if (field) this.store.type(row, field, this.before);
      return cell.select();
    }
    if (event.altKey || event.metaKey || (event.ctrlKey && event.key === 'Enter')) return;
    const whole = cell.selectionStart === 0 && cell.selectionEnd === cell.value.length;
    const caret = {
      atStart: whole || cell.selectionEnd === 0,
      atEnd: whole || cell.selectionStart === cell.value.length,
    };
    const to = cellAfter(event, at, caret, {
      rows: this.store.rows().length,
      columns: this.columns().length,
      first: (place) => this.firstColumn(place),
    });
    if (!to && event.key !== 'Enter' && event.key !== '+') return;
    event.preventDefault();
    if (to) this.focus(to);
  }

  protected async putIn(): Promise<void> {
    this.asked.set(true);
    const count = await this.store.putIn();
    const stuck = this.stuck();
    const cards = count === 1 ? '1 card is' : `${count} cards are`;
    const looms = stuck.map(({ place }) => place.loomNumber).join(', ');
    const left =
      stuck.length === 0
        ? ''
        : `${stuck.length === 1 ? 'Loom' : 'Looms'} ${looms}: not put in, the sentence in the row says why.`;
    this.said.set(
      [
        count > 0 ? `${cards} saved. They are in the book as soon as it is reached.` : '',
        left,
        count === 0 && !left && !this.store.failure() ? 'There is nothing new to put in.' : '',
      ]
        .filter(Boolean)
        .join(' '),
    );
    const [first] = stuck;
    if (first) this.focusRow(first);
  }

  protected async takeBack(): Promise<void> {
    await this.store.takeBack();
    if (!this.store.failure())
      this.said.set('Taken back. The cards stand here as they were typed: mend them and put them in again.');
  }

  /** To what is wrong in the row: the cell, or the question's tick. */
  private focusRow(row: PaperRow): void {
    const place = this.store.rows().findIndex((one) => one.place.loomId === row.place.loomId);
    const column = this.columns().findIndex((field) => row.check.problems[field] !== undefined);
    if (column >= 0) return this.focus({ row: place, column });
    this.host.nativeElement.querySelector<HTMLInputElement>(`#keep-${place}`)?.focus();
  }

  private focus({ row, column }: Cell): void {
    const cell = this.grid()?.nativeElement.querySelector<HTMLInputElement>(`#cell-${row}-${column}`);
    cell?.focus();
    cell?.scrollIntoView({ block: 'nearest' });
  }

  /** Where typing begins in a row: at the end reading, where the start is known. */
  private firstColumn(row: number): number {
    const place = this.store.rows()[row]?.place;
    const known = place && (place.startInBook !== null || place.clock?.kind === 'zeroed-each-shift');
    return known && this.columns()[0] === 'start' ? 1 : 0;
  }

  private above(row: PaperRow): PaperRow | undefined {
    const rows = this.store.rows();
    return rows[rows.findIndex((one) => one.place.loomId === row.place.loomId) - 1];
  }
}
