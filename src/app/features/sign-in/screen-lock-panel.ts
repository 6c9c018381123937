import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  afterNextRender,
  computed,
  inject,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router } from '@angular/router';
import { SessionStore } from '../../core/session-store';
import { FloorSignInPanel } from './floor-sign-in-panel';
import { ScreenLock } from './screen-lock';

/**
 * What stands over the page of a locked tablet: the PIN of whoever was there, or anybody's. A modal dialog, so that
 * nothing beneath it can be read, touched or heard.
 */
@Component({
  selector: 'app-screen-lock-panel',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [FloorSignInPanel, MatButton],
  template: `
    <dialog #dialog aria-label="This tablet is locked" (cancel)="$event.preventDefault()" (close)="stay()">
      <div class="inside">
        <header>
          <h1>Locked</h1>
          <p class="muted">
            Nobody touched this tablet for {{ minutes() }}. What {{ name() }} was typing is kept, and what was
            logged is safe.
          </p>
        </header>
        <app-floor-sign-in-panel [first]="person()?.worksNumber ?? ''" (signedIn)="goOn()" />
        <button matButton type="button" (click)="leave()">Sign in with e-mail</button>
      </div>
    </dialog>
  `,
  styles: `
    dialog {
      position: fixed;
      inset: 0;
      width: 100vw;
      height: 100dvh;
      max-width: none;
      max-height: none;
      margin: 0;
      padding: 0;
      overflow: auto;
      border: 0;
      background: var(--ground);
      color: var(--ink);
    }
    .inside {
      display: grid;
      gap: 14px;
      width: min(100%, 412px);
      margin: 0 auto;
      padding: 16px;
    }
    header {
      display: grid;
      gap: 4px;
    }
  `,
})
export class ScreenLockPanel {
  private readonly lock = inject(ScreenLock);
  private readonly router = inject(Router);
  private readonly session = inject(SessionStore);
  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');

  protected readonly person = this.session.person;
  protected readonly name = computed(() => this.person()?.shortName ?? 'who was here');
  protected readonly minutes = computed(() => {
    const minutes = this.lock.minutes();
    return minutes === 1 ? '1 minute' : `${minutes} minutes`;
  });
  /** Who was locked away: another's PIN leads to their own work. */
  private readonly was = this.person()?.id;

  constructor() {
    afterNextRender(() => this.stay());
  }

  /** Escape closes a dialog in some browsers whatever one says; this one stays until a PIN opens it. */
  protected stay(): void {
    const dialog = this.dialog().nativeElement;
    if (this.lock.locked() && !dialog.open) dialog.showModal();
  }

  protected async goOn(): Promise<void> {
    if (this.person()?.id !== this.was) await this.router.navigateByUrl('/');
    this.lock.open();
  }

  protected async leave(): Promise<void> {
    await this.session.signOut();
    await this.router.navigateByUrl('/sign-in');
    this.lock.open();
  }
}
