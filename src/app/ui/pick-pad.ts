import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  computed,
  input,
  linkedSignal,
  output,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { formatCount, formatPercent } from '@shared/figures/format';
import { NumberKeys } from './number-keys';
import { checkReading, editedText, typedReading, type ClockQuestion } from './pick-reading';

export interface PickReading {
  readonly value: number;
  /** Somebody was asked about it and kept it. */
  readonly kept: boolean;
}

/**
 * Takes a pick-clock reading: large keys, the last reading beside it, what the picks between would mean, and the
 * question about the impossible on the spot. What is no reading stays in the field with a sentence, and cannot be
 * entered.
 */
@Component({
  selector: 'app-pick-pad',
  changeDetection: ChangeDetectionStrategy.OnPush,
  imports: [MatButton, NumberKeys],
  templateUrl: './pick-pad.html',
  styleUrls: ['./asked.scss', './pick-pad.scss'],
})
export class PickPad {
  readonly about = input.required<ClockQuestion>();
  /** What the previous reading is: "Last reading", "Start reading". */
  readonly previousLabel = input('Last reading');
  readonly label = input('Reading');
  readonly doneLabel = input('Next');
  /** What was half typed before. */
  readonly begun = input('');
  readonly read = output<PickReading>();
  /** The digits as they are typed; empty again: nothing is. */
  readonly typing = output<string>();

  private readonly field = viewChild.required<ElementRef<HTMLInputElement>>('field');

  /** A signal of its own: a linked signal starts anew whenever what its source reads was set, equal or not. */
  private readonly whose = computed(() => this.about().id);
  /** Another loom, an empty pad. */
  protected readonly digits = linkedSignal<string, string>({
    source: this.whose,
    computation: () => untracked(this.begun),
  });
  protected readonly complaint = linkedSignal<string, string>({
    source: this.whose,
    computation: () => '',
  });
  /** What stands in the field and is no reading; empty: the digits do. */
  private readonly refused = linkedSignal<string, string>({
    source: this.whose,
    computation: () => '',
  });
  /** The question that stands; empty: none. */
  protected readonly asked = linkedSignal<string, string>({
    source: this.whose,
    computation: () => '',
  });
  protected readonly check = computed(() =>
    this.digits() === '' ? null : checkReading(this.about(), Number(this.digits())),
  );
  protected readonly previous = computed(() => {
    const previous = this.about().previous;
    return previous === null ? 'none known' : formatCount(previous);
  });
  protected readonly shown = computed(
    () => this.refused() || (this.digits() === '' ? '' : formatCount(Number(this.digits()))),
  );
  protected readonly meaning = computed(() => {
    const check = this.check();
    if (!check || check.picks === null) return '';
    const picks = `${formatCount(check.picks)} picks`;
    return check.efficiency === null ? picks : `${picks} · ${formatPercent(check.efficiency)}`;
  });
  protected readonly unit = computed(() => {
    const unit = this.about().clock.unit;
    return unit === 1 ? 'in picks' : `in ${formatCount(unit)} picks`;
  });

  focus(): void {
    this.field().nativeElement.focus();
  }

  protected press(digit: string): void {
    this.type((this.refused() || this.digits()) + digit);
  }

  protected erase(): void {
    this.type((this.refused() || this.digits()).slice(0, -1));
  }

  protected typeText(event: Event): void {
    const field = event.target as HTMLInputElement;
    this.type(this.refused() ? field.value : editedText(this.shown(), field.value));
    // The field shows what was taken, even where that is what it showed before.
    field.value = this.shown();
  }

  /** Sent by Enter or the last key. The impossible is asked about first, once. */
  protected finish(): void {
    const check = this.check();
    if (!check) {
      if (!this.refused()) this.complaint.set('Type what the pick clock shows.');
      return;
    }
    this.complaint.set('');
    if (check.question && this.asked() === '') {
      this.asked.set(check.question);
      return;
    }
    if (!check.question) this.send(false);
  }

  protected keep(): void {
    this.send(true);
  }

  protected readAgain(): void {
    this.asked.set('');
    this.digits.set('');
    this.typing.emit('');
    this.focus();
  }

  private type(text: string): void {
    const typed = typedReading(text, this.about().clock, this.digits());
    this.asked.set('');
    this.digits.set(typed.digits);
    this.typing.emit(typed.digits);
    this.complaint.set(typed.complaint);
    this.refused.set(typed.refused);
  }

  private send(kept: boolean): void {
    this.read.emit({ value: Number(this.digits()), kept });
  }
}
