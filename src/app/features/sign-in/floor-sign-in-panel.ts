import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  linkedSignal,
  output,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { SignedInPerson } from '@shared/contract/session';
import { FloorSignIn } from '../../offline/floor-sign-in';
import { ErrorState } from '../../ui/error-state';
import { NumberKeys } from '../../ui/number-keys';
import { padKeyOf } from '../../ui/pad-key';
import { PinPad } from '../../ui/pin-pad';

const NUMBER_DIGITS = 6;

/** Works number, then PIN, by big keys and one hand. Who has signed in here before is offered by name. */
@Component({
  selector: 'app-floor-sign-in-panel',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [ErrorState, MatButton, NumberKeys, PinPad],
  host: {
    role: 'group',
    'aria-label': 'Works number and PIN',
    tabindex: '-1',
    '(document:keydown)': 'takeKey($event)',
    '(click)': 'leaveKey($event)',
  },
  templateUrl: './floor-sign-in-panel.html',
  styleUrl: './floor-sign-in-panel.scss',
})
export class FloorSignInPanel {
  /** Whose PIN is asked for at once; empty: the number first. */
  readonly first = input('');
  readonly signedIn = output<void>();

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly floor = inject(FloorSignIn);

  protected readonly number = linkedSignal(() => this.first());
  protected readonly step = linkedSignal<'number' | 'pin'>(() => (this.first() ? 'pin' : 'number'));
  protected readonly pin = signal('');
  protected readonly busy = signal(false);
  protected readonly failed = signal('');
  protected readonly known = signal<readonly SignedInPerson[]>([]);
  protected readonly unlocksOffline = this.floor.unlocksOffline;
  /** The server locked the screen again after an unlock without network: that is said first. */
  protected readonly failure = computed(() => this.failed() || (this.floor.refused() ?? ''));
  protected readonly name = computed(
    () => this.known().find((person) => person.worksNumber === this.number())?.shortName ?? '',
  );

  constructor() {
    void this.floor.known().then((people) => this.known.set(people));
  }

  protected add(digit: string): void {
    this.failed.set('');
    if (this.number().length < NUMBER_DIGITS) this.number.set(this.number() + digit);
  }

  protected erase(): void {
    this.number.set(this.number().slice(0, -1));
  }

  protected toPin(): void {
    if (this.number() === '') return;
    this.pin.set('');
    this.step.set('pin');
    this.focus();
  }

  protected pick(person: SignedInPerson): void {
    this.failed.set('');
    this.number.set(person.worksNumber ?? '');
    this.toPin();
  }

  protected back(): void {
    this.pin.set('');
    this.number.set('');
    this.failed.set('');
    this.step.set('number');
    this.focus();
  }

  protected async enter(pin: string): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.failed.set('');
    const outcome = await this.floor.signIn(this.number(), pin);
    this.busy.set(false);
    this.pin.set('');
    if (outcome.ok) this.signedIn.emit();
    else this.failed.set(outcome.sentence);
  }

  /** A key that a finger or a mouse pressed keeps no focus: Enter would press it again. */
  protected leaveKey(event: MouseEvent): void {
    const onKey = event.target instanceof Element && event.target.closest('app-number-keys') !== null;
    if (onKey && event.detail > 0) this.focus();
  }

  /** The keys of a keyboard, where there is one; the PIN pad hears its own. */
  protected takeKey(event: KeyboardEvent): void {
    if (this.step() !== 'number') return;
    const pressed = padKeyOf(event);
    if (!pressed) return;
    if (pressed.key === 'digit') this.add(pressed.digit);
    else if (pressed.key === 'erase') this.erase();
    else this.toPin();
    event.preventDefault();
  }

  /** The button that was pressed goes with its step: the focus stays in the panel, not lost to the page. */
  private focus(): void {
    this.host.nativeElement.focus({ preventScroll: true });
  }
}
