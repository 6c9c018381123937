import { ChangeDetectionStrategy, Component, computed, inject, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatIcon } from '@angular/material/icon';
import { Router } from '@angular/router';
import { SessionStore } from '../core/session-store';
import { OfflineBook } from '../offline/offline-book';
import { THEMES, Theme, type ThemeChoice } from './theme';

const THEME_WORDS: Readonly<Record<ThemeChoice, string>> = {
  device: 'As the device',
  light: 'Day',
  dark: 'Night',
};

/** Who is signed in, the shed, the theme; change person or sign out. Queues stay on the device. */
@Component({
  selector: 'app-person-panel',
  imports: [MatButton, MatIcon],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @if (session.person(); as person) {
      <p>
        <b>{{ person.name }}</b><br /><span class="muted">{{ roles() }}</span>
      </p>
    }
    @if (session.state() === 'unlocked-offline') {
      <p class="small">
        Unlocked without network. You may log; the PIN is checked when the book can be reached.
      </p>
    }
    @if (sheds().length > 1) {
      <fieldset>
        <legend>Shed</legend>
        @for (shed of sheds(); track shed.id) {
          <label>
            <input
              type="radio"
              name="shed"
              [checked]="shed.id === book.shedId()"
              (change)="book.chooseShed(shed.id)"
            />
            {{ shed.name }}
          </label>
        }
      </fieldset>
    }
    <fieldset>
      <legend>Colours</legend>
      @for (theme of themes; track theme) {
        <label>
          <input
            type="radio"
            name="theme"
            [checked]="theme === look.choice()"
            (change)="look.choose(theme)"
          />
          {{ themeWords[theme] }}
        </label>
      }
    </fieldset>
    @if (session.somebody()) {
      @if (waiting() > 0) {
        <p class="small muted">
          {{ waiting() }} not sent yet: they stay on this device under your name and are sent later.
        </p>
      }
      <button matButton="outlined" type="button" (click)="leave()">
        <mat-icon [svgIcon]="session.isTablet() ? 'person' : 'leave'" aria-hidden="true" />
        {{ session.isTablet() ? 'Change person' : 'Sign out' }}
      </button>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-2);
    }
    fieldset {
      display: grid;
      grid-template-columns: repeat(3, 1fr);
      gap: var(--gap-1);
      margin: 0;
      padding: 0;
      border: 0;
    }
    legend {
      padding: 0 0 6px;
      font-weight: 600;
    }
    label {
      display: flex;
      align-items: center;
      gap: 8px;
      min-height: var(--touch);
      padding: 0 10px;
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      font-size: 0.9375rem;
      cursor: pointer;
    }
    label:has(:checked) {
      border-color: var(--flax);
      background: var(--flax-soft);
    }
    label:has(:focus-visible) {
      outline: 3px solid var(--flax);
      outline-offset: 2px;
    }
    input {
      accent-color: var(--flax);
    }
  `,
})
export class PersonPanel {
  /** The panel has done what it was opened for. */
  readonly done = output();

  private readonly router = inject(Router);
  protected readonly session = inject(SessionStore);
  protected readonly book = inject(OfflineBook);
  protected readonly look = inject(Theme);
  protected readonly themes = THEMES;
  protected readonly themeWords = THEME_WORDS;

  protected readonly roles = computed(() => this.session.person()?.roles.join(', ') ?? '');
  protected readonly waiting = computed(() => this.book.syncState().waiting);
  protected readonly sheds = computed(() => {
    const own = this.session.person()?.shedIds ?? [];
    if (this.session.isTablet()) return [];
    return this.book.reference().sheds.filter((shed) => own.length === 0 || own.includes(shed.id));
  });

  protected async leave(): Promise<void> {
    this.done.emit();
    await this.session.signOut();
    await this.router.navigateByUrl('/sign-in');
  }
}
