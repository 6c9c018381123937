import { ChangeDetectionStrategy, Component, computed, input, model, output } from '@angular/core';
import { LIMITS } from '@shared/contract/limits';
import { NumberKeys } from './number-keys';
import { padKeyOf } from './pad-key';

/** Six digits by big keys or by keyboard. The digits are never shown. */
@Component({
  selector: 'app-pin-pad',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [NumberKeys],
  host: { '(document:keydown)': 'takeKey($event)', role: 'group', 'aria-label': 'PIN' },
  template: `
    <div class="dots" role="status" [attr.aria-label]="pin().length + ' of ' + length + ' digits'">
      @for (place of places; track place) {
        <span [class.filled]="place < pin().length"></span>
      }
    </div>
    <app-number-keys
      [ready]="complete()"
      [disabled]="busy()"
      doneLabel="Sign in"
      (digitPressed)="add($event)"
      (erased)="erase()"
      (finished)="finish()"
    />
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--gap-2);
    }
    .dots {
      display: flex;
      justify-content: center;
      gap: 14px;
      padding: var(--gap-1) 0;
    }
    .dots span {
      width: 18px;
      height: 18px;
      border: 2px solid var(--line-strong);
      border-radius: 4px;
    }
    .dots .filled {
      background: var(--ink);
      border-color: var(--ink);
    }
  `,
})
export class PinPad {
  readonly busy = input(false);
  readonly pin = model('');
  /** The sixth digit is enough: nobody presses a key to say that a PIN is complete. */
  readonly entered = output<string>();

  protected readonly length = LIMITS.pinDigits;
  protected readonly places = Array.from({ length: LIMITS.pinDigits }, (_, i) => i);
  protected readonly complete = computed(() => this.pin().length === this.length);

  protected add(digit: string): void {
    if (this.busy() || this.complete()) return;
    this.pin.set(this.pin() + digit);
    if (this.complete()) this.finish();
  }

  protected erase(): void {
    if (this.busy()) return;
    this.pin.set(this.pin().slice(0, -1));
  }

  protected finish(): void {
    if (this.complete() && !this.busy()) this.entered.emit(this.pin());
  }

  protected takeKey(event: KeyboardEvent): void {
    const pressed = padKeyOf(event);
    if (!pressed) return;
    if (pressed.key === 'digit') this.add(pressed.digit);
    else if (pressed.key === 'erase') this.erase();
    else this.finish();
    event.preventDefault();
  }
}
