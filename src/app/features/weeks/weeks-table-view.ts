import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  afterRenderEffect,
  computed,
  input,
  output,
  viewChild,
} from '@angular/core';
import { MatIcon } from '@angular/material/icon';
import { markedStyle } from '../../ui/chart/chart-series';
import { LineSwatch } from '../../ui/chart/line-swatch';
import type { Metric } from './weeks-metrics';
import type { WeeksRow, WeeksTable } from './weeks-rows';
import type { WeeksView } from './weeks-view';

/** The weeks as a table: sorted by any column, rows marked for the chart by their name. */
@Component({
  selector: 'app-weeks-table-view',
  imports: [LineSwatch, MatIcon],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './weeks-table-view.html',
  styleUrl: './weeks-table-view.scss',
})
export class WeeksTableView {
  readonly table = input.required<WeeksTable>();
  /** In the order of the view. */
  readonly rows = input.required<readonly WeeksRow[]>();
  readonly metric = input.required<Metric>();
  readonly view = input.required<WeeksView>();
  readonly marked = input.required<readonly string[]>();
  readonly sorted = output<string>();
  readonly toggled = output<string>();

  private readonly scroller = viewChild.required<ElementRef<HTMLElement>>('scroller');
  private readonly span = computed(() =>
    this.table()
      .columns.map(({ monday }) => monday)
      .join(),
  );

  private readonly by = computed(() => this.view().by);

  constructor() {
    // Where the weeks do not all fit, the newest and the change are what a manager came for.
    afterRenderEffect({
      write: () => {
        this.span();
        this.metric();
        this.by();
        const { nativeElement } = this.scroller();
        nativeElement.scrollLeft = nativeElement.scrollWidth;
      },
    });
  }

  protected readonly word = computed(() => (this.view().by === 'row' ? 'Row' : 'Loom'));
  protected readonly changeHead = computed(() => {
    const { columns, lastWhole } = this.table();
    const [now, before] = [columns[lastWhole], columns[lastWhole - 1]];
    return now && before ? `${before.label} → ${now.label}` : 'change';
  });

  protected ariaSort(column: string): 'ascending' | 'descending' | 'none' {
    const { sort, descending } = this.view();
    return sort === column ? (descending ? 'descending' : 'ascending') : 'none';
  }

  protected styleOf(key: string) {
    const place = this.marked().indexOf(key);
    return place < 0 ? null : markedStyle(place);
  }
}
