import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  model,
  output,
} from '@angular/core';
import type { CalendarDay, Pattern } from '@shared/contract/set-up';
import { WEEKDAYS, WEEKDAY_NAMES } from '../shifts/pattern-words';
import { KIND_WORDS, dateByKey, monthWeeks, spokenDay } from './month';

/**
 * A month as a grid of days. One day is in the tab order; arrow keys go from day to day, Home and End to the week's
 * ends, Page Up and Page Down to the months beside it; Enter opens the day.
 */
@Component({
  selector: 'app-month-grid',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './month-grid.html',
  styleUrl: './month-grid.scss',
})
export class MonthGrid {
  /** YYYY-MM. */
  readonly month = input.required<string>();
  readonly shedId = input.required<string>();
  readonly patterns = input.required<readonly Pattern[]>();
  readonly days = input.required<readonly CalendarDay[]>();
  readonly today = input.required<string>();
  /** The date that the keyboard stands on. */
  readonly date = model.required<string>();
  readonly chosen = output<string>();

  private readonly injector = inject(Injector);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  protected readonly kindWords = KIND_WORDS;
  protected readonly weekdays = WEEKDAYS.map((short, at) => ({ short, name: WEEKDAY_NAMES[at] ?? short }));
  protected readonly weeks = computed(() =>
    monthWeeks(this.month(), this.shedId(), this.patterns(), this.days()).map((week) => ({
      key: week[0]?.date ?? '',
      days: week.map((day) => ({ ...day, spoken: spokenDay(day) })),
    })),
  );

  protected walk(event: KeyboardEvent, date: string): void {
    const to = event.altKey || event.ctrlKey || event.metaKey ? null : dateByKey(event.key, date);
    if (to === null) return;
    event.preventDefault();
    this.date.set(to);
    afterNextRender(
      () => this.host.nativeElement.querySelector<HTMLElement>(`[data-date="${to}"]`)?.focus(),
      { injector: this.injector },
    );
  }
}
