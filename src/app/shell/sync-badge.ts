import { ChangeDetectionStrategy, Component, computed, inject, output } from '@angular/core';
import { Clock } from '../core/clock';
import { OfflineBook } from '../offline/offline-book';
import { syncWords } from './sync-words';

/** How what was logged stands with the book; a tap opens the list. */
@Component({
  selector: 'app-sync-badge',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <button type="button" [class]="words().tone" aria-haspopup="dialog" (click)="opened.emit()">
      <b [class.full]="words().brief">{{ words().first }}</b>
      @if (words().brief) {
        <b class="brief">{{ words().brief }}</b>
      }
      @if (words().rest) {
        <span class="rest"><span class="visually-hidden">, </span>{{ words().rest }}</span>
      }
      @if (words().short) {
        <span class="short"
          ><span class="visually-hidden">, book last reached </span>{{ words().short }}</span
        >
      }
    </button>
    <span class="visually-hidden" role="status">{{ spoken() }}</span>
  `,
  styles: `
    button {
      display: inline-flex;
      align-items: center;
      gap: 8px;
      min-height: 48px;
      padding: 0 16px;
      border: 1px solid var(--line-strong);
      border-radius: 24px;
      background: var(--raised);
      color: var(--ink);
      font: 400 1rem var(--text-family);
      white-space: nowrap;
      cursor: pointer;
    }
    .look {
      border-color: var(--weld);
      color: var(--weld);
    }
    .now {
      border-color: var(--madder);
      color: var(--madder);
    }
    .brief {
      display: none;
    }
    .short {
      display: none;
      font-variant-numeric: tabular-nums;
    }
    .calm .rest {
      color: var(--ink-2);
      font-variant-numeric: tabular-nums;
    }
    @media (max-width: 560px) {
      button {
        padding: 0 12px;
        font-size: 0.9375rem;
      }
      .full {
        display: none;
      }
      .brief {
        display: inline;
      }
      :not(.calm) > .rest {
        display: none;
      }
      :not(.calm) > .short {
        display: inline;
      }
    }
  `,
})
export class SyncBadge {
  readonly opened = output();

  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  protected readonly words = computed(() => syncWords(this.book.syncState(), this.clock.tick()));
  /** Spoken when it changes in kind, not at every count or minute. */
  protected readonly spoken = computed(() => {
    switch (this.book.syncState().kind) {
      case 'offline':
        return 'The book is out of reach. What you log is saved on this device.';
      case 'needs-look':
        return 'Something you logged needs a look.';
      case 'in-book':
      case 'waiting':
      case 'sending':
        return '';
    }
  });
}
