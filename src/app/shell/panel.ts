import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  effect,
  input,
  model,
  viewChild,
} from '@angular/core';
import { MatIcon } from '@angular/material/icon';

/** A sheet over the page that a person opened from the header, and closes when done. The browser keeps the focus in it. */
@Component({
  selector: 'app-panel',
  imports: [MatIcon],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <dialog #dialog [attr.aria-label]="heading()" (close)="open.set(false)" closedby="any">
      @if (open()) {
        <div class="inside">
          <header>
            <h2>{{ heading() }}</h2>
            <button type="button" class="close" aria-label="Close" (click)="open.set(false)">
              <mat-icon svgIcon="close" aria-hidden="true" />
            </button>
          </header>
          <ng-content />
        </div>
      }
    </dialog>
  `,
  styles: `
    dialog {
      position: fixed;
      inset: 8px 8px auto auto;
      width: min(440px, calc(100vw - 16px));
      max-width: none;
      max-height: calc(100dvh - 16px);
      margin: 0;
      padding: 0;
      overflow: auto;
      border: 1px solid var(--line);
      border-radius: 10px;
      background: var(--raised);
      color: var(--ink);
      box-shadow: var(--shade);
    }
    dialog::backdrop {
      background: var(--scrim);
    }
    .inside {
      display: grid;
      gap: var(--gap-2);
      padding: var(--gap-2);
    }
    header {
      display: flex;
      justify-content: space-between;
      align-items: center;
      gap: var(--gap-2);
    }
    .close {
      display: grid;
      place-items: center;
      width: var(--touch);
      height: var(--touch);
      margin: -8px -8px -8px 0;
      border: 0;
      border-radius: var(--r);
      background: none;
      cursor: pointer;
    }
    @media (max-width: 600px) {
      dialog {
        inset: auto 0 0;
        width: 100%;
        border-radius: 10px 10px 0 0;
      }
    }
  `,
})
export class Panel {
  readonly heading = input.required<string>();
  readonly open = model.required<boolean>();

  private readonly dialog = viewChild.required<ElementRef<HTMLDialogElement>>('dialog');

  constructor() {
    effect(() => {
      const dialog = this.dialog().nativeElement;
      if (this.open() && !dialog.open) dialog.showModal();
      if (!this.open() && dialog.open) dialog.close();
    });
  }
}
