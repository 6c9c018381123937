import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { CallLog } from './call-log';

/** What was just saved (or why not), with ten seconds to take it back. */
@Component({
  selector: 'app-act-bar',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton],
  host: { role: 'status', '[class.shown]': 'log.lastAct() !== null' },
  template: `
    @if (log.lastAct(); as act) {
      <span>{{ act.words }}</span>
      @if (act.undo) {
        <button matButton type="button" (click)="log.undoLast()">Undo</button>
      }
    }
  `,
  styles: `
    :host(.shown) {
      display: flex;
      align-items: center;
      justify-content: space-between;
      gap: var(--gap-2);
      min-height: 56px;
      padding: 4px 8px 4px 16px;
      border-radius: 8px;
      background: var(--ink);
      color: var(--on-ink);
      line-height: 1.25;
      --mat-button-text-label-text-color: var(--on-ink);
      --mat-button-text-state-layer-color: var(--on-ink);
    }
    button {
      min-width: 88px;
      border: 1px solid var(--on-ink-line);
      white-space: nowrap;
    }
  `,
})
export class ActBar {
  protected readonly log = inject(CallLog);
}
