import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  output,
  untracked,
} from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import * as z from 'zod/mini';
import { loomPlaceSchema, newLoomsSchema } from '@shared/contract/set-up';
import { Clock } from '../../../core/clock';
import { ChoiceField } from '../common/choice-field';
import { field, says } from '../common/field';
import { turnsOf } from '../common/field-state';
import { FormSaver } from '../common/form-saver';
import { FromMoment, effectControl } from '../common/from-moment';
import { NumberField } from '../common/number-field';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { FactsFields } from './facts-fields';
import { factsForm, factsOf, longestShift } from './loom-facts';
import { alleyCount, newPlaces, type NewPlaces, type PlannedLoom } from './plan';
import { PlanGrid } from './plan-grid';

const rowsSchema = z.int().check(z.gte(1), z.lte(50));
const perRowSchema = z.int().check(z.gte(1), z.lte(100));

/** Many looms at once, alike but for their places, shown on the plan before they are added. */
@Component({
  selector: 'app-add-looms-form',
  imports: [
    ChoiceField,
    FactsFields,
    FromMoment,
    MatButton,
    NumberField,
    PlanGrid,
    ReactiveFormsModule,
    TextField,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './add-looms-form.html',
  styleUrl: '../common/form.scss',
})
export class AddLoomsForm {
  readonly shedId = input.required<string>();
  readonly done = output<readonly string[]>();
  readonly left = output<void>();

  private readonly store = inject(SetUpStore);
  private readonly clock = inject(Clock);
  protected readonly saver = inject(FormSaver);
  private readonly there = computed(() =>
    this.store.known().looms.filter((loom) => loom.shedId === this.shedId() && loom.until === null),
  );

  /** Made anew only for another shed: a reload must not empty what is half typed. */
  protected readonly form = computed(() => {
    const minutes = longestShift(untracked(this.store.known).patterns, this.shedId());
    return new FormGroup({
      places: new FormGroup({
        firstNumber: field(loomPlaceSchema.shape.number, null as number | null),
        rows: field(rowsSchema, 4 as number | null),
        perRow: field(perRowSchema, 6 as number | null),
        direction: new FormControl<NewPlaces['direction']>('left', { nonNullable: true }),
        firstFaces: new FormControl<NewPlaces['firstFaces']>('alley', { nonNullable: true }),
        alleys: new FormControl('', { nonNullable: true, validators: says<string>(alleyProblem) }),
      }),
      from: effectControl(),
      facts: factsForm(
        { battery: false, shuttles: 1, clock: { kind: 'continuous', unit: 100, digits: 6 } },
        false,
        minutes,
      ),
    });
  });
  private readonly turns = turnsOf(this.form);
  protected readonly directions = [
    { value: 'left', words: 'Every row from the left' },
    { value: 'right', words: 'Every row from the right' },
    { value: 'to-and-fro', words: 'There and back' },
  ] as const;
  protected readonly facings = [
    { value: 'alley', words: 'Facing the second row' },
    { value: 'wall', words: 'At an alley of its own' },
  ] as const;

  protected readonly places = computed(() => {
    this.turns();
    const { firstNumber, rows, perRow, direction, firstFaces, alleys } =
      this.form().controls.places.getRawValue();
    if (
      firstNumber === null ||
      !rowsSchema.safeParse(rows).success ||
      !perRowSchema.safeParse(perRow).success
    )
      return [];
    if (rows === null || perRow === null || rows * perRow > 500) return [];
    return newPlaces({
      firstNumber,
      rows,
      perRow,
      direction,
      firstFaces,
      alleys: alleyNames(alleys),
      taken: this.there().map((loom) => loom.alley),
      firstRow: this.firstRow(),
    });
  });
  /** After the last row that is there. */
  private readonly firstRow = computed(() => Math.max(0, ...this.there().map((loom) => loom.row)) + 1);
  protected readonly preview = computed<readonly PlannedLoom[]>(() =>
    this.places().map((place) => ({ ...place, id: String(place.number) })),
  );
  protected readonly alleyHint = computed(() => {
    this.turns();
    const { rows, firstFaces, alleys } = this.form().controls.places.getRawValue();
    if (!rowsSchema.safeParse(rows).success) return 'With commas between; left empty, they are letters.';
    const count = alleyCount({ rows: rows ?? 0, firstFaces });
    if (alleyNames(alleys).length > count)
      return count === 1
        ? 'There is one alley: only the first name is used.'
        : `There are ${count} alleys: only the first ${count} names are used.`;
    return count === 1
      ? 'One alley; left empty, its name is a letter.'
      : `${count} alleys, with commas between; left empty, they are letters.`;
  });
  protected readonly taken = computed(() => {
    const numbers = new Set(this.there().map((loom) => loom.number));
    const twice = this.places().filter((place) => numbers.has(place.number));
    return twice.length
      ? `The shed has loom ${twice[0]?.number ?? ''} already${twice.length > 1 ? `, and ${twice.length - 1} more of these` : ''}. Begin with another number.`
      : '';
  });

  constructor() {
    keepUnsaved(() => this.form().dirty);
    // The next free number is a fair guess; who types another keeps it.
    queueMicrotask(() => {
      const { firstNumber } = this.form().controls.places.controls;
      if (firstNumber.pristine)
        firstNumber.setValue(Math.max(0, ...this.there().map((loom) => loom.number)) + 1);
    });
  }

  protected async save(): Promise<void> {
    const form = this.form();
    if (this.taken()) {
      form.controls.places.controls.firstNumber.setErrors({ server: this.taken() });
      form.controls.places.controls.firstNumber.markAsTouched();
    }
    const body = () => ({
      shedId: this.shedId(),
      from: form.controls.from.value ?? this.clock.correctedNow(),
      places: this.places(),
      facts: factsOf(form.controls.facts),
    });
    if (this.taken()) return;
    const count = this.places().length;
    if (form.valid && !newLoomsSchema.safeParse(body()).success) {
      this.saver.failure.set(
        count === 0
          ? 'That is more than 500 looms at once: add them in parts.'
          : 'Something of these looms is not as it should be.',
      );
      return;
    }
    const ids = await this.saver.save(form, 'POST', '/looms', body);
    if (ids) this.done.emit(ids);
  }
}

/** "A, B; North" as names. */
function alleyNames(typed: string): readonly string[] {
  return [
    ...new Set(
      typed
        .split(/[,;]/)
        .map((name) => name.trim())
        .filter(Boolean),
    ),
  ];
}

function alleyProblem(typed: string): string {
  const tooLong = alleyNames(typed).find((name) => name.length > 80);
  return tooLong ? 'A name of an alley has at most 80 characters.' : '';
}
