import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  linkedSignal,
  viewChildren,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { RouterLink } from '@angular/router';
import { SessionStore } from '../../core/session-store';
import { formatMinutes, formatPercent } from '@shared/figures/format';
import { isNoFigure } from '@shared/figures/no-figure';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { mediaMatches } from '../../ui/media-matches';
import { ReadingBar } from '../../ui/reading-bar';
import { LoggedBar } from './logged-bar';
import { LoomCard } from './loom-card';
import type { LoomView } from './loom-view';
import { LoomsideStore } from './loomside-store';
import { StopAsker } from './stop-asker';
import { StopLog } from './stop-log';
import { StopSheetOpener } from './stop-sheet-opener';
import { Swipe } from './swipe';

/** My looms: a card each on a tablet, one at a time on a phone. */
@Component({
  selector: 'app-loomside-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [EmptyState, LoggedBar, LoomCard, MatButton, MatIcon, ReadingBar, RouterLink, Swipe],
  templateUrl: './loomside-page.html',
  styleUrl: './loomside-page.scss',
  providers: [StopAsker, StopSheetOpener],
})
export class LoomsidePage {
  protected readonly ask = inject(StopAsker);
  protected readonly store = inject(LoomsideStore);
  protected readonly log = inject(StopLog);

  constructor() {
    // What is usual is fetched while there is a network: the shift's page shows it without. Not before the looms.
    const injector = inject(Injector);
    afterNextRender(() => {
      void import('../../offline/usual-store').then(({ UsualStore }) => injector.get(UsualStore));
    });
  }

  protected readonly phone = mediaMatches('(max-width: 599.98px)');
  private readonly chips = viewChildren<string, ElementRef<HTMLElement>>('chip', { read: ElementRef });
  protected readonly set = this.store.set;
  protected readonly columns = computed(() => (this.set().length > 8 ? 3 : 2));
  protected readonly dense = computed(() => this.set().length > 6);
  /** The loom a phone shows; stays when the set changes, as long as it is in it. */
  protected readonly shownId = linkedSignal<readonly LoomView[], string | null>({
    source: () => this.set(),
    computation: (set, before) =>
      set.find((view) => view.loom.id === before?.value)?.loom.id ?? set[0]?.loom.id ?? null,
  });
  protected readonly shown = computed(
    () => this.set().find((view) => view.loom.id === this.shownId()) ?? null,
  );
  protected readonly shiftWords = computed(() => {
    const shift = this.store.shift();
    if (!shift) return '';
    const zone = this.store.timeZone();
    return `${clockTime(shift.startsAt, zone)} to ${clockTime(shift.endsAt, zone)}`;
  });
  /** A manager is shown where shifts come from. */
  private readonly session = inject(SessionStore);
  protected readonly setsUp = computed(() => this.session.may('mill.manage'));
  protected readonly nextWords = computed(() => {
    const next = this.store.nextShift();
    return next
      ? `The next one, ${next.name}, begins at ${clockTime(next.startsAt, this.store.timeZone())}. If looms run now, the foreman opens an extra shift.`
      : 'This device knows of no next shift: reach the book once, or ask the foreman.';
  });
  protected readonly numbersToRead = computed(() =>
    this.store
      .stillToRead()
      .map((view) => view.loom.number)
      .join(', '),
  );

  /** The loom beside the one a phone shows; the walk is a round. */
  protected step(by: 1 | -1): void {
    const set = this.set();
    const at = set.findIndex((view) => view.loom.id === this.shownId());
    const next = set[(at + by + set.length) % set.length];
    if (next) this.shownId.set(next.loom.id);
  }

  /** Arrow keys on the chips, as on any row of tabs. */
  protected stepByKey(event: KeyboardEvent): void {
    const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0;
    if (by === 0) return;
    event.preventDefault();
    this.step(by);
    this.chips()[this.set().findIndex((view) => view.loom.id === this.shownId())]?.nativeElement.focus();
  }

  protected chipWords(view: LoomView): string {
    if (view.standing) return formatMinutes(Math.floor(view.standing.minutes));
    return isNoFigure(view.efficiency) ? '–' : formatPercent(view.efficiency);
  }
}
