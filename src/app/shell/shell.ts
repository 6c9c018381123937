import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { NavigationEnd, Router, RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { distinctUntilChanged, filter, map, skip } from 'rxjs';
import { Clock } from '../core/clock';
import { formatTime } from '../core/dates';
import { SessionStore } from '../core/session-store';
import { OfflineBook } from '../offline/offline-book';
import { ScreenLock } from '../features/sign-in/screen-lock';
import { ScreenLockPanel } from '../features/sign-in/screen-lock-panel';
import { AppUpdate } from './app-update';
import { navigationFor } from './navigation';
import { Panel } from './panel';
import { PersonPanel } from './person-panel';
import { ProductMark } from './product-mark';
import { SyncBadge } from './sync-badge';
import { SyncPanel } from './sync-panel';

/** What stands around every page: where one is, how sync stands, who is here, where one can go. */
@Component({
  selector: 'app-shell',
  imports: [
    MatButton,
    MatIcon,
    Panel,
    PersonPanel,
    ProductMark,
    RouterLink,
    RouterLinkActive,
    RouterOutlet,
    ScreenLockPanel,
    SyncBadge,
    SyncPanel,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './shell.html',
  styleUrl: './shell.scss',
  host: { '[class.with-navigation]': 'navigation().length > 1' },
})
export class Shell {
  protected readonly session = inject(SessionStore);
  protected readonly lock = inject(ScreenLock);
  protected readonly update = inject(AppUpdate);
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly main = viewChild.required<ElementRef<HTMLElement>>('main');

  protected readonly syncOpen = signal(false);
  protected readonly personOpen = signal(false);
  protected readonly updateOpen = signal(false);

  protected readonly navigation = computed(() =>
    navigationFor(this.session.permissions(), this.session.person()?.roles ?? []),
  );
  /** A desk at which nobody signed in has nothing to send: no badge there. */
  protected readonly showsSync = computed(
    () =>
      this.session.somebody() ||
      this.session.isTablet() ||
      this.book.syncState().waiting + this.book.syncState().needsLook > 0,
  );
  protected readonly place = computed(
    () => this.book.reference().sheds.find((shed) => shed.id === this.book.shedId())?.name ?? '',
  );
  protected readonly shift = computed(() => {
    const shift = this.book.currentShift();
    if (!shift || !this.session.somebody()) return '';
    const minutes = Math.max(0, Math.floor((this.clock.tick() - shift.startsAt) / 60_000));
    const { timeZone } = this.book.reference().mill;
    const hours = `${formatTime(shift.startsAt, timeZone)} to ${formatTime(shift.endsAt, timeZone)}`;
    return `${shift.name}, ${hours} · ${Math.floor(minutes / 60)} h ${minutes % 60} min in`;
  });
  protected readonly initials = computed(() =>
    (this.session.person()?.name ?? '')
      .split(/\s+/)
      .map((part) => part.charAt(0))
      .slice(0, 2)
      .join('')
      .toUpperCase(),
  );

  constructor() {
    // Pages that ask nobody who they are (no such page) still stand in a header that knows.
    void this.session.start();
    inject(Router)
      .events.pipe(
        filter((event) => event instanceof NavigationEnd),
        map((event) => event.urlAfterRedirects.split('?')[0]),
        distinctUntilChanged(),
        skip(1),
        takeUntilDestroyed(),
      )
      // Whoever does not see the page hears where they are.
      .subscribe(() => this.main().nativeElement.focus({ preventScroll: true }));
  }

  protected skipToPage(): void {
    this.main().nativeElement.focus();
  }
}
