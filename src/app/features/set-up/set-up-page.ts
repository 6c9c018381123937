import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatIcon } from '@angular/material/icon';
import { NavigationEnd, Router, RouterLink, RouterOutlet } from '@angular/router';
import { filter, map, startWith } from 'rxjs';
import { ReportTrouble } from '../../ui/report-trouble';
import { SetUpStore } from './common/set-up-store';
import { RoomList } from './room-list';

/** Set-up's frame: the rooms beside the page on a desk, the way back to them above it on a phone. */
@Component({
  selector: 'app-set-up-page',
  imports: [MatIcon, ReportTrouble, RoomList, RouterLink, RouterOutlet],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './set-up-page.html',
  styleUrl: './set-up-page.scss',
})
export class SetUpPage {
  private readonly router = inject(Router);
  protected readonly store = inject(SetUpStore);
  /** On set-up's own first page there is nothing to go back to. */
  protected readonly inRoom = toSignal(
    this.router.events.pipe(
      filter((event) => event instanceof NavigationEnd),
      startWith(null),
      map(() => this.router.url.split(/[?#]/)[0] !== '/set-up'),
    ),
    { initialValue: false },
  );
}
