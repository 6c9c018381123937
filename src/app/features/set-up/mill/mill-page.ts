import { ChangeDetectionStrategy, Component, computed, inject, untracked } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { millFormSchema, type MillForm } from '@shared/contract/set-up';
import { ChoiceField } from '../common/choice-field';
import { field } from '../common/field';
import { FormSaver } from '../common/form-saver';
import { NumberField } from '../common/number-field';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { RecalculateForm } from './recalculate-form';

/** Minutes until an untouched tablet locks, where the mill never said. */
const LOCK_AFTER = 5;

/** The mill itself: name, units, who may see figures by person, when tablets lock; and the command to recalculate. */
@Component({
  selector: 'app-mill-page',
  imports: [
    ChoiceField,
    MatButton,
    NumberField,
    ReactiveFormsModule,
    RecalculateForm,
    RoomHeading,
    TextField,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './mill-page.html',
  styleUrls: ['../common/form.scss', './mill-page.scss'],
})
export class MillPage {
  private readonly store = inject(SetUpStore);
  protected readonly saver = inject(FormSaver);
  protected readonly mill = computed(() => this.store.known().mill);
  protected readonly form = new FormGroup(
    untracked(() => {
      const { name, units, figuresByPerson, lockAfterMinutes } = this.mill();
      return {
        name: field(millFormSchema.shape.name, name),
        units: new FormControl<MillForm['units']>(units, { nonNullable: true }),
        figuresByPerson: new FormControl<MillForm['figuresByPerson']>(figuresByPerson ?? 'own', {
          nonNullable: true,
        }),
        lockAfterMinutes: field(
          millFormSchema.shape.lockAfterMinutes,
          (lockAfterMinutes ?? LOCK_AFTER) as number | null,
        ),
      };
    }),
  );
  protected readonly units = [
    { value: 'metric', words: 'Metric: cm, m, g, kg' },
    { value: 'imperial', words: 'Imperial: in, yd, oz, lb' },
  ] as const;
  protected readonly sights = [
    { value: 'nobody', words: 'Nobody' },
    { value: 'own', words: 'Each weaver their own' },
    { value: 'foremen', words: 'Foremen and managers too' },
    { value: 'managers', words: 'Managers too, not foremen' },
  ] as const;

  constructor() {
    keepUnsaved(() => this.form.dirty);
  }

  protected async save(): Promise<void> {
    await this.saver.save(this.form, 'PATCH', '/mill', () => this.form.getRawValue());
  }
}
