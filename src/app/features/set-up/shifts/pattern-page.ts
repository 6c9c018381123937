import { ChangeDetectionStrategy, Component, computed, inject, input, untracked } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { PatternFacts } from '@shared/contract/set-up';
import { catchError, debounceTime, distinctUntilChanged, from, of, switchMap } from 'rxjs';
import { Clock } from '../../../core/clock';
import { addDays, dateOf, isDate } from '../../../core/dates';
import { EmptyState } from '../../../ui/empty-state';
import { ErrorState } from '../../../ui/error-state';
import { ChoiceField } from '../common/choice-field';
import { problemOfField } from '../common/field';
import { speaks, turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { judgeTogether } from '../common/judge-together';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { whileShown } from '../common/while-shown';
import { EndPattern } from './end-pattern';
import { ExamplesClient } from './examples-client';
import { endsNextDay, readLocalTime } from './local-time';
import {
  MEAL_CHOICES,
  PATTERN_FIELDS,
  PATTERN_LABELS,
  mealFields,
  patternFacts,
  patternForm,
} from './pattern-form';
import { WEEKDAYS, WEEKDAY_NAMES, exampleWords, overlapWords, patternSentence } from './pattern-words';

/** Long enough not to ask at each key. */
const TYPING_PAUSE = 400;

/** One shift pattern, worked out as it is typed: the next shift, and the nights when the clocks change. */
@Component({
  selector: 'app-pattern-page',
  imports: [
    ChoiceField,
    EmptyState,
    EndPattern,
    ErrorState,
    FormFoot,
    MatButton,
    RoomHeading,
    RouterLink,
    TextField,
  ],
  providers: [FormSaver, ExamplesClient],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './pattern-page.html',
  styleUrls: ['../common/room.scss', '../common/form.scss', './pattern-page.scss'],
})
export class PatternPage {
  /** From the address: a pattern's id, or `new` with the shed's id. */
  readonly id = input.required<string>();
  readonly shed = input<string>();

  private readonly store = inject(SetUpStore);
  protected readonly saver = inject(FormSaver);
  private readonly clock = inject(Clock);
  private readonly router = inject(Router);
  private readonly client = inject(ExamplesClient);

  protected readonly labels = PATTERN_LABELS;
  protected readonly meals = MEAL_CHOICES;
  protected readonly weekdays = WEEKDAYS.map((short, at) => ({
    number: at + 1,
    short,
    name: WEEKDAY_NAMES[at] ?? short,
  }));
  protected readonly pattern = computed(() => this.store.known().patterns.find(({ id }) => id === this.id()));
  protected readonly ofShed = computed(() => {
    const wanted = this.pattern()?.shedId ?? this.shed();
    const { sheds } = this.store.known();
    return sheds.find(({ id }) => id === wanted) ?? (this.pattern() ? undefined : sheds[0]);
  });
  protected readonly isThere = computed(
    () => this.ofShed() !== undefined && (this.id() === 'new' || this.pattern() !== undefined),
  );
  protected readonly form = computed(() => {
    const id = this.id();
    return untracked(() => {
      const today = dateOf(this.clock.correctedNow(), this.store.timeZone());
      const pattern = this.pattern();
      const first = !pattern ? today : later(addDays(today, 1), pattern.from);
      return patternForm(pattern ?? null, first, () => this.otherNames(id));
    });
  });
  private readonly turns = turnsOf(this.form);
  protected readonly facts = computed(
    () => {
      this.turns();
      return patternFacts(this.form());
    },
    { equal: (a, b) => JSON.stringify(a) === JSON.stringify(b) },
  );
  protected readonly sentence = computed(() => {
    const facts = this.facts();
    return facts ? patternSentence(facts) : '';
  });
  protected readonly hasMeal = computed(() => {
    this.turns();
    return this.form().controls.meal.value !== 'none';
  });
  protected readonly nextDay = computed(() => {
    this.turns();
    const { starts, ends } = this.form().getRawValue();
    const [start, end] = [readLocalTime(starts), readLocalTime(ends)];
    return start !== null && end !== null && endsNextDay(start, end);
  });
  protected readonly daysProblem = computed(() => {
    this.turns();
    const { weekdays } = this.form().controls;
    return speaks(weekdays) ? problemOfField(weekdays, this.labels.weekdays) : '';
  });

  /** From when on, as far as it is a date. */
  private readonly fromDate = computed(() => {
    this.turns();
    const { from: since } = this.form().getRawValue();
    return isDate(since) ? since : null;
  });

  /** What the server works out of the form as typed; with the facts it is of, for they go on while it answers. */
  private readonly worked = toSignal(
    toObservable(
      computed(() => ({
        facts: this.facts(),
        shedId: this.ofShed()?.id,
        patternId: this.pattern()?.id,
        from: this.fromDate(),
      })),
    ).pipe(
      debounceTime(TYPING_PAUSE),
      distinctUntilChanged((a, b) => JSON.stringify(a) === JSON.stringify(b)),
      switchMap(({ facts, shedId, patternId, from: since }) =>
        facts && shedId
          ? from(
              this.client.examples({
                shedId,
                facts,
                ...(patternId !== undefined && { patternId }),
                ...(since !== null && { from: since }),
              }),
            ).pipe(
              catchError(() => of(null)),
              switchMap((answer) => of({ facts, answer })),
            )
          : of(null),
      ),
    ),
    { initialValue: null },
  );
  protected readonly examples = computed(() => {
    const worked = this.worked();
    return worked?.answer?.kind === 'ok' && this.facts()
      ? exampleWords(worked.answer.body, worked.facts, this.store.timeZone())
      : [];
  });
  protected readonly sameAllYear = computed(() => this.examples().length === 1);
  protected readonly overlaps = computed(() => {
    const answer = this.worked()?.answer;
    if (answer?.kind !== 'ok' || !this.facts()) return '';
    return overlapWords(answer.body.overlaps);
  });
  protected readonly trouble = computed(() => {
    const worked = this.worked();
    return worked && worked.answer?.kind !== 'ok' && this.facts()
      ? 'The nights when the clocks change cannot be worked out just now. The pattern can be saved all the same.'
      : '';
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
    whileShown(this.form, (form) => judgeTogether(form, mealFields(form)));
    // What was refused is no longer what stands there.
    whileShown(this.form, (form) => form.valueChanges.subscribe(() => this.saver.failure.set('')));
  }

  protected setDay(day: number, on: boolean): void {
    const { weekdays } = this.form().controls;
    const others = weekdays.value.filter((one) => one !== day);
    weekdays.setValue(on ? [...others, day].sort((a, b) => a - b) : others);
    weekdays.markAsDirty();
  }

  protected async save(): Promise<void> {
    const [id, shedId] = [this.pattern()?.id, this.ofShed()?.id];
    // A pattern that is as it was is no other one from a date on.
    if (id !== undefined && this.form().pristine) {
      await this.router.navigate(['/set-up/shifts'], { queryParams: { at: id } });
      return;
    }
    const ids = await this.saver.save(
      this.form(),
      id === undefined ? 'POST' : 'PATCH',
      id === undefined ? '/patterns' : `/patterns/${id}`,
      () => this.body(id === undefined ? shedId : undefined),
      { under: 'facts', named: PATTERN_FIELDS },
    );
    if (ids) await this.router.navigate(['/set-up/shifts'], { queryParams: { at: ids[0] ?? id } });
  }

  private body(shedId: string | undefined): { shedId?: string; from: string; facts: PatternFacts | null } {
    const facts = patternFacts(this.form());
    return { ...(shedId !== undefined && { shedId }), from: this.form().controls.from.value, facts };
  }

  /** Patterns of the shed that go on; one that ended may lend its name to the next. */
  private otherNames(id: string): readonly string[] {
    const [shedId, own] = [this.ofShed()?.id, this.pattern()?.name];
    return this.store
      .known()
      .patterns.filter(
        (one) => one.shedId === shedId && one.id !== id && one.until === null && one.name !== own,
      )
      .map(({ name }) => name);
  }
}

function later(date: string, other: string | null): string {
  return other !== null && other > date ? other : date;
}
