import { CdkVirtualScrollViewport, ScrollingModule } from '@angular/cdk/scrolling';
import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  model,
  output,
  signal,
  viewChild,
} from '@angular/core';
import { MatIcon } from '@angular/material/icon';
import { hostWidth } from '../../../ui/host-width';

/** A column: its head, the text of a row, and what it is sorted by where that is not its text. */
export interface Column<R> {
  readonly key: string;
  readonly head: string;
  readonly text: (row: R) => string;
  readonly sort?: (row: R) => number | string;
  /** Figures stand to the right. */
  readonly figure?: boolean;
  /** Its share of the width, 1 unless said. */
  readonly share?: number;
}

export interface Row {
  readonly id: string;
}

const ROW_HEIGHT = 48;
const CARD_LINE = 26;
/** Below this width of its own a row is a card. */
const CARDS_BELOW = 620;

/**
 * A list that sorts, filters and stays quick at 500 rows. Each row opens by its first cell's button; arrow keys, Home
 * and End go through the rows. In a narrow place each row is a card.
 */
@Component({
  selector: 'app-list-table',
  imports: [MatIcon, ScrollingModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './list-table.html',
  styleUrl: './list-table.scss',
})
export class ListTable<R extends Row> {
  readonly rows = input.required<readonly R[]>();
  readonly columns = input.required<readonly Column<R>[]>();
  /** What the list is of, e.g. "looms": for the filter and for who does not see it. */
  readonly what = input.required<string>();
  /** Rows can be ticked. */
  readonly selectable = input(false);
  readonly selected = model<ReadonlySet<string>>(new Set());
  /** The row that is open beside or below the list. */
  readonly current = input<string | null>(null);
  readonly opened = output<R>();

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly viewport = viewChild(CdkVirtualScrollViewport);
  private readonly width = hostWidth(CARDS_BELOW);
  protected readonly filter = signal('');
  private readonly order = signal<{ key: string; down: boolean } | null>(null);

  protected readonly cards = computed(() => this.width() < CARDS_BELOW);
  protected readonly first = computed(() => this.columns()[0]);
  protected readonly rest = computed(() => this.columns().slice(1));
  protected readonly template = computed(
    () =>
      (this.selectable() ? '48px ' : '') +
      this.columns()
        .map((column) => `minmax(0, ${column.share ?? 1}fr)`)
        .join(' '),
  );
  protected readonly itemSize = computed(() =>
    this.cards() ? 60 + CARD_LINE * this.rest().length : ROW_HEIGHT,
  );
  protected readonly shown = computed(() => {
    const wanted = this.filter().trim().toLowerCase();
    const columns = this.columns();
    const rows = wanted
      ? this.rows().filter((row) => columns.some((one) => one.text(row).toLowerCase().includes(wanted)))
      : this.rows();
    return sorted(rows, columns, this.order());
  });
  /** As high as its rows, at most most of the screen. */
  protected readonly height = computed(
    () => `min(${Math.max(1, this.shown().length) * this.itemSize() + 2}px, max(56dvh, 320px))`,
  );
  protected readonly count = computed(() => {
    const [shown, all] = [this.shown().length, this.rows().length];
    const what = all === 1 ? oneOf(this.what()) : this.what();
    return shown === all ? `${all} ${what}` : `${shown} of ${all} ${what}`;
  });
  protected readonly allTicked = computed(() => {
    const ticked = this.selected();
    return this.shown().length > 0 && this.shown().every((row) => ticked.has(row.id));
  });

  protected readonly trackRow = (_: number, row: R) => row.id;

  protected sortedBy(column: Column<R>): 'ascending' | 'descending' | 'none' {
    const order = this.order();
    if (order?.key !== column.key) return 'none';
    return order.down ? 'descending' : 'ascending';
  }

  protected sortBy(column: Column<R>): void {
    this.order.update((order) =>
      order?.key === column.key ? { key: column.key, down: !order.down } : { key: column.key, down: false },
    );
  }

  protected tick(row: R): void {
    const ticked = new Set(this.selected());
    if (!ticked.delete(row.id)) ticked.add(row.id);
    this.selected.set(ticked);
  }

  protected tickAll(): void {
    const ticked = new Set(this.selected());
    const all = this.allTicked();
    for (const row of this.shown())
      if (all) ticked.delete(row.id);
      else ticked.add(row.id);
    this.selected.set(ticked);
  }

  /** Arrow keys from row to row; a row that is not drawn yet is scrolled to first. */
  protected walk(event: KeyboardEvent, index: number): void {
    const last = this.shown().length - 1;
    const to: Readonly<Record<string, number>> = {
      ArrowDown: index + 1,
      ArrowUp: index - 1,
      Home: 0,
      End: last,
      PageDown: index + 8,
      PageUp: index - 8,
    };
    const wanted = to[event.key];
    if (wanted === undefined || event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    const goal = Math.min(last, Math.max(0, wanted));
    if (!this.focusRow(goal)) {
      this.viewport()?.scrollToIndex(goal);
      requestAnimationFrame(() => requestAnimationFrame(() => this.focusRow(goal)));
    }
  }

  private focusRow(index: number): boolean {
    const button = this.host.nativeElement.querySelector<HTMLElement>(`[data-row="${index}"]`);
    button?.focus();
    return button !== null;
  }
}

/** "looms": "loom". */
function oneOf(what: string): string {
  return what === 'people' ? 'person' : what.replace(/s$/, '');
}

function sorted<R extends Row>(
  rows: readonly R[],
  columns: readonly Column<R>[],
  order: { key: string; down: boolean } | null,
): readonly R[] {
  const column = columns.find((one) => one.key === order?.key);
  if (!column || !order) return rows;
  const by = column.sort ?? column.text;
  const factor = order.down ? -1 : 1;
  return [...rows].sort((a, b) => {
    const [one, other] = [by(a), by(b)];
    if (typeof one === 'number' && typeof other === 'number') return (one - other) * factor;
    return String(one).localeCompare(String(other), 'en', { numeric: true }) * factor;
  });
}
