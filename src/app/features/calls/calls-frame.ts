import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatIcon } from '@angular/material/icon';
import { NavigationEnd, Router, RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { filter, map, startWith } from 'rxjs';
import { ActBar } from './act-bar';
import { CallAlarm } from './call-alarm';
import { CallsStore } from './calls-store';

/** Stands around the tackler's screens: where one is, what was just saved, and who calls meanwhile. */
@Component({
  selector: 'app-calls-frame',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ActBar, MatIcon, RouterLink, RouterLinkActive, RouterOutlet],
  providers: [CallAlarm],
  template: `
    <nav aria-label="Calls">
      <a
        routerLink="/calls"
        routerLinkActive
        #list="routerLinkActive"
        [routerLinkActiveOptions]="{ exact: true }"
        [attr.aria-current]="list.isActive ? 'page' : null"
      >
        Calls
        @if (store.waiting().length) {
          <span class="count num"
            >{{ store.waiting().length }}<span class="visually-hidden"> waiting</span></span
          >
        }
      </a>
      <a
        routerLink="/calls/ahead"
        routerLinkActive
        #ahead="routerLinkActive"
        [attr.aria-current]="ahead.isActive ? 'page' : null"
        >Coming up</a
      >
    </nav>
    <app-act-bar />
    @if (!onList() && next(); as call) {
      <a class="calls" routerLink="/calls">
        <mat-icon svgIcon="call" aria-hidden="true" />
        <span
          ><b>Loom {{ call.loom.number }}</b> calls, alley {{ call.loom.alley }}, for
          {{ call.minutes }} min</span
        >
      </a>
    }
    <router-outlet />
  `,
  styles: `
    :host {
      display: grid;
      align-content: start;
      gap: var(--gap-1);
      padding-top: var(--gap-1);
    }
    nav {
      display: flex;
      gap: var(--gap-1);
      padding: 0 var(--gap-2);
    }
    nav a {
      display: inline-flex;
      align-items: center;
      gap: 8px;
      min-height: 48px;
      padding: 0 16px;
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--raised);
      color: var(--ink);
      text-decoration: none;
      font-weight: 600;
    }
    nav a[aria-current='page'] {
      background: var(--ink);
      border-color: var(--ink);
      color: var(--on-ink);
    }
    .count {
      min-width: 24px;
      padding: 0 6px;
      border-radius: 12px;
      background: var(--madder);
      color: var(--on-madder);
      text-align: center;
    }
    app-act-bar,
    .calls {
      margin: 0 var(--gap-2);
    }
    .calls {
      display: flex;
      align-items: center;
      gap: 12px;
      min-height: 48px;
      padding: 6px 16px;
      border-radius: var(--r);
      background: var(--madder-soft);
      color: var(--ink);
      text-decoration: none;
    }
  `,
})
export class CallsFrame {
  protected readonly store = inject(CallsStore);
  private readonly router = inject(Router);
  // Tells from any of the tackler's screens, not from the list alone.
  protected readonly alarm = inject(CallAlarm);
  private readonly path = toSignal(
    this.router.events.pipe(
      filter((event) => event instanceof NavigationEnd),
      map(() => this.router.url),
      startWith(this.router.url),
    ),
    { initialValue: this.router.url },
  );
  protected readonly onList = computed(() => /^\/calls\/?(\?.*)?$/.test(this.path()));
  protected readonly next = computed(() => this.store.waiting()[0] ?? null);
}
