import { FormControl, FormGroup, type AbstractControl, type ValidatorFn } from '@angular/forms';
import {
  EASY_PIN,
  isEasyPin,
  personTroubles,
  type KnownPerson,
  type PersonField,
} from '@shared/contract/person-rules';
import { ROLES, type Role } from '@shared/contract/roles';
import {
  emailSchema,
  newPersonSchema,
  pinSchema,
  worksNumberSchema,
  type PersonRow,
} from '@shared/contract/session';
import { field, says } from '../common/field';

export const PERSON_LABELS = {
  name: 'Name',
  shortName: 'Short name',
  worksNumber: 'Works number',
  email: 'E-mail',
  pin: 'PIN',
} as const;

export type PersonForm = ReturnType<typeof personForm>;

/**
 * A person's form, empty or as stored. `others`: whose works numbers and addresses are taken; the person's own do not
 * count.
 */
export function personForm(person: PersonRow | null, others: () => readonly KnownPerson[]) {
  const id = person?.id ?? null;
  const facts = newPersonSchema.shape;
  return new FormGroup({
    name: field(facts.name, person?.name ?? ''),
    shortName: field(facts.shortName, person?.shortName ?? '', [together('shortName', others, id)]),
    worksNumber: new FormControl(person?.worksNumber ?? '', {
      nonNullable: true,
      validators: [says<string>(worksNumberTrouble), together('worksNumber', others, id)],
    }),
    email: new FormControl(person?.email ?? '', {
      nonNullable: true,
      validators: [says<string>(emailTrouble), together('email', others, id)],
    }),
    roles: new FormGroup(
      Object.fromEntries(
        ROLES.map((role) => [
          role,
          new FormControl(person ? person.roles.includes(role) : role === 'weaver', { nonNullable: true }),
        ]),
      ) as Record<Role, FormControl<boolean>>,
      {
        validators: (group) =>
          rolesIn(group.value as Record<Role, boolean>).length ? null : { says: NO_ROLE },
      },
    ),
    everywhere: new FormControl(!person || person.shedIds.length === 0, { nonNullable: true }),
    shedIds: new FormControl<readonly string[]>(person?.shedIds ?? [], {
      nonNullable: true,
      validators: [
        says<readonly string[]>((ids, { parent }) =>
          ids.length > 0 || parent?.get('everywhere')?.value !== false ? '' : NO_SHED,
        ),
      ],
    }),
    usualSet: new FormControl<readonly string[]>(person?.usualSet ?? [], { nonNullable: true }),
    pin: new FormControl('', { nonNullable: true, validators: [says<string>(pinTrouble)] }),
  });
}

export const NO_SHED = 'Tick at least one shed, or choose all of them.';
export const NO_ROLE = 'At least one role: what somebody may do comes from it.';

/** What the form says; null: something is not right yet. */
export function personOf(form: PersonForm): object | null {
  const { roles, worksNumber, email, pin, everywhere, shedIds, ...rest } = form.getRawValue();
  const read = newPersonSchema.safeParse({
    ...rest,
    worksNumber: worksNumber.trim() || null,
    email: email.trim() || null,
    roles: rolesIn(roles),
    shedIds: everywhere ? [] : shedIds,
    ...(pin ? { pin } : {}),
  });
  return read.success && form.valid ? read.data : null;
}

export function rolesIn(ticked: Readonly<Record<Role, boolean>>): Role[] {
  return ROLES.filter((role) => ticked[role]);
}

function worksNumberTrouble(value: string): string {
  const number = value.trim();
  return number === '' || worksNumberSchema.safeParse(number).success
    ? ''
    : 'A works number is one to six digits, such as 112.';
}

function emailTrouble(value: string): string {
  return value.trim() === '' || emailSchema.safeParse(value).success
    ? ''
    : 'An e-mail address, such as name@mill.example.';
}

function pinTrouble(value: string): string {
  if (value === '') return '';
  if (!pinSchema.safeParse(value).success) return `A PIN is six digits; this has ${value.length} characters.`;
  return isEasyPin(value) ? EASY_PIN : '';
}

/** What hangs on more than one field, and on other people: the same rules that the server asks. */
function together(of: PersonField, others: () => readonly KnownPerson[], id: string | null): ValidatorFn {
  return says<string>((_value, control: AbstractControl) => {
    const form = control.parent as PersonForm | null;
    if (!form) return '';
    const { name, shortName, worksNumber, email, roles } = form.getRawValue();
    const facts = {
      name,
      shortName,
      worksNumber: worksNumber.trim() || null,
      email: email.trim().toLowerCase() || null,
      roles: rolesIn(roles),
    };
    return personTroubles(facts, others(), id)[of] ?? '';
  });
}
