import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  effect,
  inject,
  output,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { CAUTION } from '../../ui/caution';
import { CallAlarm } from './call-alarm';
import type { CallRow } from './calls-store';

/** A call that comes while the list is open, over the whole screen: to be seen from where the tablet stands. */
@Component({
  selector: 'app-call-flash',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton],
  template: `
    <dialog #dialog aria-labelledby="call-flash-loom" (close)="closed()">
      @if (alarm.flashing(); as call) {
        @for (time of [alarm.told()]; track time) {
          <div class="inside">
            <p>The tackler is called</p>
            <h2 id="call-flash-loom">Loom {{ call.loom.number }}</h2>
            <p class="alley">Alley {{ call.loom.alley }} · {{ call.minutes }} min</p>
            @if (call.words) {
              <p class="words">“{{ call.words }}”</p>
            }
            <div class="acts">
              <button matButton="filled" type="button" (click)="take(call)">Take it</button>
              <button matButton="outlined" type="button" (click)="alarm.putFlashAway()">See the list</button>
            </div>
            <p class="small">{{ caution }}</p>
          </div>
        }
      }
    </dialog>
  `,
  styles: `
    dialog {
      width: 100vw;
      max-width: 100vw;
      height: 100dvh;
      max-height: 100dvh;
      padding: 0;
      border: 0;
      background: var(--madder);
      color: var(--on-madder);
    }
    .inside {
      display: flex;
      flex-direction: column;
      align-items: center;
      justify-content: center;
      gap: var(--gap-2);
      min-height: 100%;
      padding: var(--gap-3);
      text-align: center;
      animation: call-flash 0.5s steps(2, jump-none) 3;
    }
    h2 {
      font-size: clamp(4rem, 20vw, 9rem);
      line-height: 1;
    }
    .alley {
      font-size: 1.75rem;
    }
    .words {
      font-size: 1.25rem;
      max-width: 40ch;
    }
    .acts {
      display: grid;
      gap: var(--gap-2);
      width: min(100%, 420px);
    }
    button {
      min-height: 72px;
      font-size: 1.25rem;
      --mat-button-filled-container-color: var(--on-madder);
      --mat-button-filled-label-text-color: var(--madder);
      --mat-button-outlined-label-text-color: var(--on-madder);
      --mat-button-outlined-outline-color: var(--on-madder);
    }
    .small {
      max-width: 60ch;
    }
    /* Twice a second at most: no more than three flashes in any second (WCAG 2.3.1). */
    @keyframes call-flash {
      from {
        background: var(--on-madder);
      }
      to {
        background: var(--madder);
      }
    }
    @media (prefers-reduced-motion: reduce) {
      .inside {
        animation: none;
      }
    }
  `,
})
export class CallFlash {
  readonly taken = output<CallRow>();

  protected readonly alarm = inject(CallAlarm);
  protected readonly caution = CAUTION;
  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');

  constructor() {
    effect(() => {
      const call = this.alarm.flashing();
      const dialog = this.dialog().nativeElement;
      untracked(() => {
        if (call && !dialog.open) dialog.showModal();
        else if (!call && dialog.open) dialog.close();
      });
    });
  }

  protected take(call: CallRow): void {
    this.alarm.putFlashAway();
    this.taken.emit(call);
  }

  /** By Escape, say: the calls stay on the list. */
  protected closed(): void {
    if (this.alarm.flashing()) this.alarm.putFlashAway();
  }
}
