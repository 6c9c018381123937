import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  signal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { CalendarDay, Pattern } from '@shared/contract/set-up';
import { formatDay } from '../../../core/dates';
import { outcomeOf } from '../../../core/answer';
import { ChoiceField } from '../common/choice-field';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { judgeTogether } from '../common/judge-together';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { whileShown } from '../common/while-shown';
import { inForceOn } from '../shifts/week-ribbons';
import { ALL, DAY_LABELS, KIND_CHOICES, calendarDay, dayForm, hanging } from './day-form';
import { KIND_WORDS, runsOn } from './month';

/** A day of the calendar: a holiday, other hours, a shift more. */
@Component({
  selector: 'app-day-panel',
  imports: [ChoiceField, FormFoot, MatButton, TextField],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form (submit)="save(); $event.preventDefault()" novalidate [attr.aria-label]="heading()">
      <h2>{{ heading() }}</h2>
      <app-choice-field [label]="labels.kind" [control]="form().controls.kind" [choices]="kinds" />
      <div class="fields">
        <app-text-field [label]="labels.date" type="date" [control]="form().controls.date" />
        <app-choice-field
          [label]="labels.patternId"
          [control]="form().controls.patternId"
          [choices]="choices()"
        />
        @if (kind() !== 'off') {
          <app-text-field
            [label]="labels.starts"
            placeholder="06:00"
            [control]="form().controls.starts"
            [hint]="kind() === 'overtime' ? 'Empty: the pattern’s own hours.' : ''"
          />
          <app-text-field [label]="labels.ends" placeholder="12:00" [control]="form().controls.ends" />
        }
      </div>
      <app-text-field
        [label]="labels.reason"
        [control]="form().controls.reason"
        placeholder="Christmas Day"
        hint="Shown on the calendar."
      />
      <app-form-foot [label]="isNew() ? 'Mark the day' : 'Save the day'">
        <button matButton="outlined" type="button" (click)="left.emit()">Leave it</button>
        @if (!isNew()) {
          <button matButton="text" type="button" (click)="another.emit()">
            Mark other shifts of the day
          </button>
          <button matButton="text" type="button" [disabled]="dropping()" (click)="drop()">
            Take it off the calendar
          </button>
        }
      </app-form-foot>
    </form>
  `,
  styleUrl: '../common/form.scss',
})
export class DayPanel {
  readonly day = input.required<CalendarDay>();
  readonly patterns = input.required<readonly Pattern[]>();
  readonly left = output<void>();
  /** A second mark on the same day is asked for. */
  readonly another = output<void>();
  /** What was done, in a sentence. */
  readonly saved = output<string>();

  private readonly store = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  protected readonly labels = DAY_LABELS;
  protected readonly kinds = KIND_CHOICES;
  protected readonly dropping = signal(false);
  /** What is in the calendar has a reason. */
  protected readonly isNew = computed(() => this.day().reason === '');
  protected readonly heading = computed(() => `${formatDay(this.day().date)} ${this.day().date.slice(0, 4)}`);
  protected readonly form = computed(() => {
    const day = this.day();
    return untracked(() =>
      dayForm(day, (id, date) => this.patterns().some((one) => one.id === id && runsOn(one, date))),
    );
  });
  private readonly turns = turnsOf(this.form);
  protected readonly kind = computed(() => {
    this.turns();
    return this.form().controls.kind.value;
  });
  protected readonly choices = computed(() => {
    this.turns();
    const date = this.form().controls.date.value;
    return [
      { value: ALL, words: 'all of the day' },
      ...this.patterns()
        .filter((one) => inForceOn(one, date) || one.id === this.day().patternId)
        .map(({ id, name, startsLocal, endsLocal }) => ({
          value: id,
          words: `${name}, ${startsLocal} to ${endsLocal}`,
        })),
    ];
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
    whileShown(this.form, (form) => judgeTogether(form, hanging(form)));
  }

  protected async save(): Promise<void> {
    const [before, wasNew] = [this.day(), this.isNew()];
    const said = calendarDay(this.form(), before.shedId);
    const ids = await this.saver.save(this.form(), 'POST', '/calendar', () => said);
    if (!ids || !said) return;
    // Moved to another date, or to other shifts: the old mark goes.
    if (!wasNew && (said.date !== before.date || said.patternId !== before.patternId))
      await this.take(before);
    this.saved.emit(`${KIND_WORDS[said.kind]} on ${formatDay(said.date)} is in the calendar.`);
  }

  protected async drop(): Promise<void> {
    this.dropping.set(true);
    const outcome = outcomeOf(await this.take(this.day()));
    this.dropping.set(false);
    if (!outcome.ok) {
      this.saver.failure.set(outcome.sentence);
      return;
    }
    this.form().markAsPristine();
    this.saved.emit(`${formatDay(this.day().date)} is an ordinary day again.`);
  }

  private take({ shedId, date, patternId }: CalendarDay) {
    return this.store.change('POST', '/calendar/drop', { shedId, date, patternId });
  }
}
