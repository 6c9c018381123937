import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { instantSchema } from '@shared/contract/primitives';
import { Clock } from '../../../core/clock';
import { dateOf, formatDay, formatTime } from '../../../core/dates';
import { ChoiceField, type Choice } from './choice-field';
import { says } from './field';
import { turnsOf } from './field-state';
import { longMoment, momentOf } from './moments';
import { SetUpStore } from './set-up-store';
import { TextField } from './text-field';

type How = 'now' | 'shift' | 'moment';

/** A control for "takes effect from": null is now, to be read as `moment.value ?? clock.correctedNow()` when it is saved. */
export function effectControl(): FormControl<number | null> {
  return new FormControl<number | null>(null);
}

/** From when a change holds: now, from the start of a shift, or from a date and time of the mill's clock. */
@Component({
  selector: 'app-from-moment',
  imports: [ChoiceField, ReactiveFormsModule, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <fieldset>
      <legend>{{ legend() }}</legend>
      <div class="ways">
        @for (way of ways(); track way.how) {
          <label class="way">
            <input type="radio" [name]="name" [checked]="how() === way.how" (change)="choose(way.how)" />
            {{ way.words }}
          </label>
        }
      </div>
      @if (how() === 'shift') {
        <app-choice-field label="Shift" [control]="shift" [choices]="shiftChoices()" />
      }
      @if (how() === 'moment') {
        <div class="typed">
          <app-text-field label="Date" type="date" [control]="date" />
          <app-text-field label="Time" placeholder="06:00" [control]="time" />
        </div>
      }
      <p class="muted small" aria-live="polite">{{ words() }}</p>
    </fieldset>
  `,
  styleUrl: './from-moment.scss',
})
export class FromMoment {
  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);

  readonly control = input.required<FormControl<number | null>>();
  readonly legend = input('Takes effect from');
  /** Only this shed's shifts are offered; null: all. */
  readonly shedId = input<string | null>(null);
  /** Only shifts that have begun are offered: for what is so already. */
  readonly begunOnly = input(false);
  /** What happens to what was before, in a sentence. */
  readonly note = input(
    'What was before stays in the history: closed shifts keep the figures they were signed with.',
  );

  protected readonly name = `from-${nextName()}`;
  protected readonly how = signal<How>('now');
  protected readonly shift = new FormControl<number>(0, { nonNullable: true });
  protected readonly date = new FormControl('', { nonNullable: true });
  protected readonly time = new FormControl('06:00', { nonNullable: true });
  private readonly turns = turnsOf(this.control);

  protected readonly shiftChoices = computed<readonly Choice<number>[]>(() => {
    const shed = this.shedId();
    const zone = this.store.timeZone();
    return (this.store.setUp()?.shifts ?? [])
      .filter((one) => shed === null || one.shedId === shed)
      .filter((one) => !this.begunOnly() || one.startsAt <= this.clock.tick())
      .sort((a, b) => a.startsAt - b.startsAt)
      .slice(0, 60)
      .map((one) => ({
        value: one.startsAt,
        words: `${one.name}, ${formatDay(one.date)}, ${formatTime(one.startsAt, zone)}`,
      }));
  });
  protected readonly ways = computed<readonly { how: How; words: string }[]>(() => [
    { how: 'now', words: 'Now' },
    ...(this.shiftChoices().length ? [{ how: 'shift', words: 'The start of a shift' } as const] : []),
    { how: 'moment', words: 'A date and time' },
  ]);
  protected readonly words = computed(() => {
    this.turns();
    const at = this.control().value;
    const when = at === null ? 'From now on' : `From ${longMoment(at, this.store.timeZone())} on`;
    return `${when}. ${this.note()}`;
  });

  constructor() {
    const judged = says<string>(() => this.problem());
    this.date.addValidators(judged);
    this.time.addValidators(judged);
    effect((onCleanup) => {
      const control = this.control();
      const invalid = () =>
        this.how() === 'moment' && this.typedMoment() === null ? { says: this.problem() } : null;
      control.addValidators(invalid);
      // Emptied from outside: the form was saved or opened anew.
      const changes = control.valueChanges.subscribe((value) => {
        if (value === null && untracked(this.how) !== 'moment') this.how.set('now');
      });
      onCleanup(() => {
        changes.unsubscribe();
        control.removeValidators(invalid);
      });
    });
    for (const part of [this.date, this.time]) part.valueChanges.subscribe(() => this.take());
    this.shift.valueChanges.subscribe(() => this.take());
  }

  protected choose(how: How): void {
    this.how.set(how);
    const zone = this.store.timeZone();
    if (how === 'moment' && !this.date.value)
      this.date.setValue(dateOf(this.clock.correctedNow(), zone), { emitEvent: false });
    const first =
      this.shiftChoices().find((one) => one.value >= this.clock.correctedNow()) ?? this.shiftChoices()[0];
    if (how === 'shift' && !this.shift.value && first) this.shift.setValue(first.value, { emitEvent: false });
    this.take();
  }

  private take(): void {
    const control = this.control();
    const how = this.how();
    control.markAsDirty();
    if (how === 'now') control.setValue(null);
    else control.setValue(how === 'shift' ? this.shift.value : this.typedMoment());
    for (const part of [this.date, this.time]) part.updateValueAndValidity({ emitEvent: false });
  }

  private typedMoment(): number | null {
    const at = momentOf(this.date.value, this.time.value, this.store.timeZone());
    return at !== null && instantSchema.safeParse(at).success ? at : null;
  }

  private problem(): string {
    if (this.how() !== 'moment' || this.typedMoment() !== null) return '';
    return 'Choose a date, and a time such as 06:00; in the night when the clocks go forward an hour is missing.';
  }
}

let names = 0;
const nextName = () => ++names;
