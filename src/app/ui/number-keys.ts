import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { MatIcon } from '@angular/material/icon';

/** Ten digits, erase and a last key: what pick pad and PIN pad have in common. Every key is at least 64 px. */
@Component({
  selector: 'app-number-keys',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatIcon],
  template: `
    @for (digit of digits; track digit) {
      <button type="button" class="key" [disabled]="disabled()" (click)="digitPressed.emit(digit)">
        {{ digit }}
      </button>
    }
    <button type="button" class="key" aria-label="Erase" [disabled]="disabled()" (click)="erased.emit()">
      <mat-icon svgIcon="erase" aria-hidden="true" />
    </button>
    <button type="button" class="key" [disabled]="disabled()" (click)="digitPressed.emit('0')">0</button>
    <button
      type="button"
      class="key done"
      [disabled]="disabled() || !ready()"
      (click)="finished.emit()"
      [attr.aria-label]="doneLabel()"
    >
      <mat-icon svgIcon="check" aria-hidden="true" />
    </button>
  `,
  styles: `
    :host {
      display: grid;
      grid-template-columns: repeat(3, minmax(var(--touch-primary), 1fr));
      gap: var(--gap-1);
    }
    .key {
      min-height: var(--touch-primary);
      border: 1.5px solid var(--line-strong);
      border-radius: var(--r);
      background: var(--raised);
      color: var(--ink);
      font: 650 1.625rem/1 var(--text-family);
      font-variant-numeric: tabular-nums;
      touch-action: manipulation;
    }
    .key:active:not(:disabled) {
      background: var(--flax-soft);
    }
    .key:disabled {
      color: var(--ink-3);
      border-color: var(--line);
    }
    .done:not(:disabled) {
      background: var(--flax);
      border-color: var(--flax);
      color: var(--on-flax);
    }
  `,
})
export class NumberKeys {
  readonly ready = input(true);
  readonly disabled = input(false);
  readonly doneLabel = input('Done');
  readonly digitPressed = output<string>();
  readonly erased = output<void>();
  readonly finished = output<void>();

  protected readonly digits = ['1', '2', '3', '4', '5', '6', '7', '8', '9'] as const;
}
