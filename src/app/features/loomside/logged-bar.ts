import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { callWords } from './call-words';
import { LoomsideStore } from './loomside-store';
import { StopLog } from './stop-log';

/**
 * What was just saved, with ten seconds to take it back or to say that the loom still stands. It stands in the page,
 * not over it: it covers no button of the next loom.
 */
@Component({
  selector: 'app-logged-bar',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton],
  host: { role: 'status' },
  template: `
    @if (log.lastAct(); as act) {
      <span
        >{{ act.words }}
        @if (callSays()) {
          <strong>{{ callSays() }}</strong>
        }
      </span>
      <div class="answers">
        @if (act.counted && loom(); as loom) {
          <button matButton type="button" (click)="log.stillStanding(loom)">Still standing</button>
        }
        @if (act.undo) {
          <button matButton type="button" (click)="log.undoLast()">Undo</button>
        }
      </div>
    }
  `,
  styles: `
    :host {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      justify-content: space-between;
      gap: 4px 16px;
      min-height: 52px;
      padding: 2px 4px 2px 16px;
      border-radius: 8px;
      background: var(--ink);
      color: var(--on-ink);
      font-size: 1.0625rem;
      line-height: 1.25;
      --mat-button-text-label-text-color: var(--on-ink);
      --mat-button-text-state-layer-color: var(--on-ink);
    }
    strong {
      display: block;
    }
    .answers {
      display: flex;
      gap: var(--gap-1);
      margin-left: auto;
    }
    button {
      border: 1px solid var(--on-ink-line);
      white-space: nowrap;
    }
    @media (max-width: 599.98px) {
      :host {
        flex-wrap: nowrap;
        gap: 8px;
        min-height: 56px;
        padding-left: 10px;
        font-size: 0.9375rem;
        line-height: 1.15;
        --mat-button-text-horizontal-padding: 10px;
        --mat-button-text-label-text-size: 0.9375rem;
      }
      .answers {
        gap: 4px;
      }
    }
  `,
})
export class LoggedBar {
  private readonly store = inject(LoomsideStore);
  protected readonly log = inject(StopLog);
  /** Whether the call went out is said beside it at once: the card's own mark is under this bar on a phone. */
  protected readonly callSays = computed(() => {
    const callId = this.log.lastAct()?.callId;
    const loom = this.loom();
    const call = callId === undefined || !loom ? null : this.store.openCall(loom);
    return call?.id === callId ? callWords(call, this.store.timeZone()) : '';
  });
  protected readonly loom = computed(() => {
    const id = this.log.lastAct()?.loomId;
    return id === undefined || id === null ? null : this.store.loomById(id);
  });
}
