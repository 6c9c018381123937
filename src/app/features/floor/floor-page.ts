import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatProgressBar } from '@angular/material/progress-bar';
import { Router, RouterLink } from '@angular/router';
import { formatMinutes } from '@shared/figures/format';
import { isNoFigure, type Figure } from '@shared/figures/no-figure';
import { Clock } from '../../core/clock';
import { dateOf, formatDay, formatMoment } from '../../core/dates';
import { SessionStore } from '../../core/session-store';
import { OfflineBook } from '../../offline/offline-book';
import { clockTime } from '../../ui/clock-time';
import { EmptyState } from '../../ui/empty-state';
import { ErrorState } from '../../ui/error-state';
import { FigureView } from '../../ui/figure-view';
import { hostWidth } from '../../ui/host-width';
import { FILTER_WORDS, NOTHING_FOUND, isFilter, type FloorFilter } from './floor-filters';
import { FloorStore } from './floor-store';
import { FloorTile } from './floor-tile';
import { picksInShort } from './floor-totals';
import { LoomSheet } from './loom-sheet';
import { MarkLegend } from './mark-legend';
import { ShedStopBar } from './shed-stop-bar';

/** Narrower than this the floor is a list. */
const LIST_WIDTH = 600;
/** The narrowest tile with its gap, and the page's own edges. */
const TILE = 120;
const GAP = 8;
const EDGES = 56;

/** The shed as it stands: row by row, alleys between, live. */
@Component({
  selector: 'app-floor-page',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [
    EmptyState,
    ErrorState,
    FigureView,
    FloorTile,
    LoomSheet,
    MarkLegend,
    MatButton,
    MatProgressBar,
    RouterLink,
    ShedStopBar,
  ],
  providers: [FloorStore],
  templateUrl: './floor-page.html',
  styleUrl: './floor-page.scss',
  host: { class: 'page' },
})
export class FloorPage {
  /** From the address: the loom whose line is open. */
  readonly loom = input<string>();

  private readonly router = inject(Router);
  private readonly clock = inject(Clock);
  private readonly width = hostWidth(1_180);
  protected readonly book = inject(OfflineBook);
  protected readonly session = inject(SessionStore);
  protected readonly store = inject(FloorStore);
  protected readonly filterWords = FILTER_WORDS;

  /** What there is to show. */
  protected readonly state = computed(() => {
    const { kind, lastReachedAt, online, sentence } = this.book.syncState();
    if (!this.session.may('floor.read')) return 'not-permitted';
    if (this.book.trouble() !== null) return 'no-storage';
    if (!this.book.ready()) return 'loading';
    if (this.store.catchingUp()) return kind === 'offline' ? 'never-reached' : 'loading';
    if (this.book.looms().length === 0) {
      if (sentence) return 'refused';
      if (kind === 'offline') return 'never-reached';
      return lastReachedAt !== null && online ? 'no-looms' : 'loading';
    }
    return this.store.shift() ? 'floor' : 'no-shift';
  });
  protected readonly refusal = computed(() => this.book.syncState().sentence ?? '');
  protected readonly inList = computed(() => this.width() < LIST_WIDTH);
  private readonly fits = computed(() => Math.floor((this.width() - EDGES + GAP) / TILE));
  /** As many columns as the longest row has places, where they fit: then each loom stands in its place. */
  protected readonly places = computed(() => Math.max(...this.store.plan().map((row) => row.places), 1));
  protected readonly asTheyStand = computed(
    () => !this.inList() && this.store.filter() === 'all' && this.places() <= this.fits(),
  );
  protected readonly sheds = computed(() => {
    const own = this.session.person()?.shedIds ?? [];
    if (this.session.isTablet()) return [];
    return this.book.reference().sheds.filter((shed) => own.length === 0 || own.includes(shed.id));
  });
  protected readonly shiftWords = computed(() => {
    const shift = this.store.shift();
    if (!shift) return '';
    const minutes = Math.floor((this.store.asOf() - shift.startsAt) / 60_000);
    return `${shift.name}, ${formatDay(shift.date)}, ${formatMinutes(minutes)} in`;
  });
  protected readonly since = computed(() => {
    const at = this.store.knownUntil();
    if (at === null) return '';
    const now = this.clock.tick();
    return dateOf(at) === dateOf(now) ? clockTime(at, this.store.timeZone()) : formatMoment(at, now);
  });
  protected readonly nextWords = computed(() => {
    const next = this.store.nextShift();
    return next
      ? `The next one, ${next.name}, begins ${formatDay(next.date)} at ${clockTime(next.startsAt, this.store.timeZone())}. If looms run now, the foreman opens an extra shift.`
      : 'This device knows of no next shift.';
  });
  protected readonly picks = computed(() => short(this.store.totals().picks));
  protected readonly plannedWords = computed(() => {
    const { planned } = this.store.totals();
    return planned === 0 ? '' : planned === 1 ? ', 1 planned stand' : `, ${planned} planned stands`;
  });
  protected readonly calls = computed(() => {
    const { callsWaiting, longestCall } = this.store.totals();
    const words = callsWaiting === 1 ? 'call waiting' : 'calls waiting';
    if (longestCall === null) return words;
    const minutes = Math.max(0, Math.floor((this.store.asOf() - longestCall) / 60_000));
    return `${words}, ${callsWaiting === 1 ? 'for' : 'longest'} ${formatMinutes(minutes)}`;
  });
  protected readonly nothing = computed(() => {
    const shift = this.store.shift();
    const filter = this.store.filter();
    if (filter === 'quiet' && shift && this.store.asOf() - shift.startsAt < 2 * 3_600_000)
      return 'The shift is not two hours old yet.';
    return NOTHING_FOUND[filter];
  });
  /** The open loom, wherever the filter is. */
  protected readonly openLoom = computed(() => {
    const id = this.loom();
    const place = this.order().findIndex((one) => one.id === id);
    const looms = this.order();
    const loom = looms[place];
    return loom ? { loom, before: looms[place - 1] ?? null, after: looms[place + 1] ?? null } : null;
  });
  private readonly order = computed(() => this.store.plan().flatMap((row) => row.looms));

  protected choose(filter: FloorFilter): void {
    if (isFilter(filter)) this.store.filter.set(filter);
  }

  protected chooseShed(event: Event): void {
    if (event.target instanceof HTMLSelectElement) this.book.chooseShed(event.target.value);
  }

  /** In the address, so that the browser's own way back closes it. From loom to loom it stays one step back. */
  protected open(id: string | null): Promise<boolean> {
    return this.router.navigate([], {
      queryParams: { loom: id },
      queryParamsHandling: 'merge',
      replaceUrl: this.loom() !== undefined,
    });
  }
}

function short(picks: Figure): { readonly text: string; readonly figure: Figure } {
  return { text: isNoFigure(picks) ? '' : picksInShort(picks), figure: picks };
}
