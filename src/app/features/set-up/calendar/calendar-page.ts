import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  linkedSignal,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import type { CalendarDay } from '@shared/contract/set-up';
import { Clock } from '../../../core/clock';
import { dateOf, formatDay } from '../../../core/dates';
import { EmptyState } from '../../../ui/empty-state';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { Unsaved } from '../common/unsaved';
import { DayPanel } from './day-panel';
import { MonthGrid } from './month-grid';
import { ALL } from './day-form';
import { addMonths, dayWords, monthName } from './month';

/** Holidays, short days and overtime: as a month, and as a list. */
@Component({
  selector: 'app-calendar-page',
  imports: [DayPanel, EmptyState, MatButton, MatIcon, MonthGrid, RoomHeading, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './calendar-page.html',
  styleUrls: ['../common/room.scss', './calendar-page.scss'],
})
export class CalendarPage {
  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  private readonly unsaved = inject(Unsaved);
  private readonly injector = inject(Injector);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  protected readonly today = computed(() => dateOf(this.clock.tick(), this.store.timeZone()));
  protected readonly sheds = computed(() => this.store.known().sheds);
  private readonly shedIds = computed(() => this.sheds().map(({ id }) => id));
  protected readonly shedId = linkedSignal<readonly string[], string>({
    source: this.shedIds,
    computation: (ids, before) => (before && ids.includes(before.value) ? before.value : (ids[0] ?? '')),
    equal: (a, b) => a === b,
  });
  protected readonly patterns = computed(() =>
    this.store.known().patterns.filter(({ shedId }) => shedId === this.shedId()),
  );
  protected readonly days = computed(() =>
    this.store.known().calendar.filter(({ shedId }) => shedId === this.shedId()),
  );
  /** The date that the keyboard stands on. */
  protected readonly date = signal(dateOf(this.clock.correctedNow(), this.store.timeZone()));
  protected readonly month = computed(() => this.date().slice(0, 7));
  protected readonly monthWords = computed(() => monthName(this.month()));
  /** The day whose form is open; a new one has no reason yet. */
  protected readonly open = signal<CalendarDay | null>(null);
  protected readonly saved = signal('');
  protected readonly openKey = computed(() => {
    const day = this.open();
    return day ? `${day.date} ${day.patternId} ${day.kind} ${day.reason}` : '';
  });
  protected readonly list = computed(() =>
    this.days()
      .filter(({ date }) => date >= this.today())
      .map((day) => ({
        day,
        key: `${day.date} ${day.patternId}`,
        date: `${formatDay(day.date)} ${day.date.slice(0, 4)}`,
        words: dayWords(day, this.patterns()),
      })),
  );

  protected turn(months: number): void {
    this.date.set(months === 0 ? this.today() : `${addMonths(this.month(), months)}-01`);
  }

  /** Opens a date: what the calendar says of it, or a new holiday. */
  protected async openDate(date: string): Promise<void> {
    const there = this.days().find((day) => day.date === date);
    await (there ? this.openDay(there) : this.openNew(date));
  }

  protected openNew(date: string): Promise<void> {
    const hours = { startsLocal: null, endsLocal: null };
    return this.openDay({ shedId: this.shedId(), date, patternId: ALL, kind: 'off', ...hours, reason: '' });
  }

  protected async openDay(day: CalendarDay): Promise<void> {
    if (!(await this.unsaved.mayLeave())) return;
    this.saved.set('');
    this.date.set(day.date);
    this.open.set(day);
    afterNextRender(
      () => {
        const panel = this.host.nativeElement.querySelector<HTMLElement>('app-day-panel');
        panel?.scrollIntoView({ block: 'nearest' });
        panel?.querySelector<HTMLElement>('select, input')?.focus({ preventScroll: true });
      },
      { injector: this.injector },
    );
  }

  protected async leave(): Promise<void> {
    if (await this.unsaved.mayLeave()) this.close('');
  }

  protected close(saved: string): void {
    this.open.set(null);
    this.saved.set(saved);
    afterNextRender(
      () => this.host.nativeElement.querySelector<HTMLElement>('[tabindex="0"][data-date]')?.focus(),
      {
        injector: this.injector,
      },
    );
  }
}
