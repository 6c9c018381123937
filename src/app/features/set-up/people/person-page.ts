import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
  untracked,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import { LIMITS } from '@shared/contract/limits';
import { ROLES, type Role } from '@shared/contract/roles';
import type { PersonRow } from '@shared/contract/session';
import { EmptyState } from '../../../ui/empty-state';
import { ReportTrouble } from '../../../ui/report-trouble';
import { problemOfField } from '../common/field';
import { turnsOf } from '../common/field-state';
import { FormFoot } from '../common/form-foot';
import { FormSaver } from '../common/form-saver';
import { judgeTogether } from '../common/judge-together';
import { RoomHeading } from '../common/room-heading';
import { SetUpStore } from '../common/set-up-store';
import { TextField } from '../common/text-field';
import { keepUnsaved } from '../common/unsaved';
import { whileShown } from '../common/while-shown';
import { PeopleStore } from './people-store';
import { PERSON_LABELS, personForm, personOf } from './person-form';
import { PersonSignIn } from './person-sign-in';
import { ROLE_NOTES, ROLE_WORDS } from './person-words';
import { WalkingOrder } from './walking-order';

/** One person: name, roles, sheds, usual looms; and how they sign in. */
@Component({
  selector: 'app-person-page',
  imports: [
    EmptyState,
    FormFoot,
    MatButton,
    PersonSignIn,
    ReportTrouble,
    RoomHeading,
    RouterLink,
    TextField,
    WalkingOrder,
  ],
  providers: [FormSaver],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './person-page.html',
  styleUrls: ['../common/room.scss', '../common/form.scss', './person-page.scss'],
})
export class PersonPage {
  /** From the address: a person's id, or `new`. */
  readonly id = input.required<string>();

  protected readonly people = inject(PeopleStore);
  private readonly setUp = inject(SetUpStore);
  private readonly saver = inject(FormSaver);
  private readonly router = inject(Router);

  protected readonly labels = PERSON_LABELS;
  protected readonly roles = ROLES.map((role) => ({
    role,
    words: ROLE_WORDS[role],
    note: ROLE_NOTES[role],
  }));
  protected readonly pinDigits = LIMITS.pinDigits;
  protected readonly known = computed(() => this.people.load().value);
  protected readonly person = computed<PersonRow | null>(
    () => this.known()?.find(({ id }) => id === this.id()) ?? null,
  );
  protected readonly isThere = computed(() => this.id() === 'new' || this.person() !== null);
  protected readonly sheds = computed(() => this.setUp.known().sheds);
  /** Which person's facts the form holds: fetching the list anew leaves what is typed alone. */
  private readonly formOf = computed(() => (this.known() === null ? null : this.id()));
  protected readonly form = linkedSignal({
    source: this.formOf,
    computation: () => untracked(() => personForm(this.person(), () => this.known() ?? [])),
  });
  private readonly turns = turnsOf(this.form);
  protected readonly roleTrouble = computed(() => {
    this.turns();
    const { roles } = this.form().controls;
    const words: unknown = roles.touched || roles.dirty ? roles.errors?.['says'] : '';
    return typeof words === 'string' ? words : '';
  });
  protected readonly everywhere = computed(() => {
    this.turns();
    return this.form().getRawValue().everywhere;
  });
  protected readonly shedTrouble = computed(() => {
    this.turns();
    const { shedIds } = this.form().controls;
    return shedIds.touched || shedIds.dirty ? problemOfField(shedIds, 'Sheds') : '';
  });
  protected readonly shedIds = computed(() => {
    this.turns();
    return this.form().getRawValue().shedIds;
  });
  protected readonly usualSet = computed(() => {
    this.turns();
    return this.form().getRawValue().usualSet;
  });
  /** Looms of the person's sheds that are in use. */
  protected readonly looms = computed(() => {
    const sheds = this.everywhere() ? [] : this.shedIds();
    return this.setUp
      .known()
      .looms.filter(({ until, shedId }) => until === null && (sheds.length === 0 || sheds.includes(shedId)));
  });

  /** Looms are a weaver's, alleys a tackler's; nobody else walks a round. */
  protected readonly minds = computed(() => {
    this.turns();
    const { weaver, tackler } = this.form().controls.roles.getRawValue();
    return { looms: weaver, alleys: tackler };
  });
  protected readonly alleyWords = computed(() => {
    const served = this.setUp.known().alleys.filter(({ tacklerIds }) => tacklerIds.includes(this.id()));
    const names = served.map(({ name }) => name).join(', ');
    return names
      ? `Serves alleys ${names}: change them in Sheds and looms.`
      : 'A tackler serves alleys: say which in Sheds and looms, once saved.';
  });

  constructor() {
    void this.people.reload();
    keepUnsaved(() => this.form().dirty);
    whileShown(this.form, (form) =>
      judgeTogether(form, [
        form.controls.name,
        form.controls.shortName,
        form.controls.worksNumber,
        form.controls.email,
        form.controls.roles,
        form.controls.shedIds,
      ]),
    );
  }

  protected tickRole(role: Role): void {
    const control = this.form().controls.roles.controls[role];
    control.setValue(!control.value);
    control.markAsDirty();
  }

  protected tickShed(id: string, ticked: boolean): void {
    const others = this.shedIds().filter((each) => each !== id);
    this.set('shedIds', ticked ? [...others, id] : others);
  }

  protected goEverywhere(everywhere: boolean): void {
    const control = this.form().controls.everywhere;
    control.setValue(everywhere);
    control.markAsDirty();
  }

  protected walk(order: readonly string[]): void {
    this.set('usualSet', order);
  }

  private set(at: 'shedIds' | 'usualSet', value: readonly string[]): void {
    const control = this.form().controls[at];
    control.setValue(value);
    control.markAsDirty();
  }

  protected async save(): Promise<void> {
    const id = this.person()?.id ?? null;
    const saved = await this.saver.send(this.form(), () => this.people.save(id, personOf(this.form()) ?? {}));
    if (!saved) return;
    await this.people.reload();
    await this.router.navigate(['/set-up/people'], { queryParams: { at: saved.id } });
  }
}
