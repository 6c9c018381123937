import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { LIMITS } from '@shared/contract/limits';
import type { TabletCode } from '@shared/contract/one-time';
import { SquareCode } from './square-code';

/** A code that makes another browser a tablet: to type, or for its camera. */
@Component({
  selector: 'app-tablet-code-card',
  imports: [MatButton, SquareCode],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-square-code [words]="code().url" label="Square code with the address and the code" />
    <div class="words">
      <p>
        On the tablet: point its camera at the square code, or open <strong>{{ address() }}</strong> and type
      </p>
      <p class="num code">{{ code().code }}</p>
      <p role="status">
        @if (minutes() > 0) {
          It works once, for {{ minutes() }} min more.
        } @else {
          It has run out. Make another.
        }
      </p>
      @if (isLocal()) {
        <p class="flag look">
          This address opens on this computer alone: open this page by the address that tablets use.
        </p>
      }
      <button matButton="outlined" type="button" (click)="done.emit()">Done</button>
    </div>
  `,
  styles: `
    :host {
      display: grid;
      grid-template-columns: minmax(0, 220px) minmax(0, 1fr);
      gap: 20px;
      align-items: center;
      max-width: 820px;
      padding: 16px;
      border: 1px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--raised);
    }
    @media (max-width: 520px) {
      :host {
        grid-template-columns: minmax(0, 1fr);
      }
      app-square-code {
        max-width: 220px;
      }
    }
    .words {
      display: grid;
      gap: 10px;
      justify-items: start;
    }
    .code {
      font-size: 2rem;
      font-weight: 650;
      letter-spacing: 0.06em;
    }
    strong {
      overflow-wrap: anywhere;
    }
  `,
})
export class TabletCodeCard {
  readonly code = input.required<TabletCode>();
  /** Corrected now, ms. */
  readonly now = input.required<number>();
  readonly done = output<void>();

  protected readonly minutes = computed(() =>
    // What screens show as now lies up to some seconds back.
    Math.min(
      LIMITS.tabletCode / 60_000,
      Math.max(0, Math.ceil((this.code().expiresAt - this.now()) / 60_000)),
    ),
  );
  protected readonly address = computed(() => this.code().url.split('#')[0] ?? '');
  protected readonly isLocal = computed(() => /\/\/(localhost|127\.)/.test(this.address()));
}
