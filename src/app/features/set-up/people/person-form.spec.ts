import { EASY_PIN, personTroubles } from '@shared/contract/person-rules';
import type { PersonRow } from '@shared/contract/session';
import { problemOfField } from '../common/field';
import { judge } from '../common/judge-together';
import { NO_ROLE, NO_SHED, PERSON_LABELS, personForm, personOf } from './person-form';

const NUALA: PersonRow = {
  id: 'nuala',
  name: 'Nuala Doyle',
  shortName: 'Nuala D.',
  worksNumber: '112',
  email: null,
  roles: ['weaver'],
  shedIds: ['north'],
  disabledAt: null,
  usualSet: ['n3', 'n1'],
  hasPassword: false,
  hasPin: true,
  linkUntil: null,
};
const OTHERS = [
  NUALA,
  { id: 'maud', name: 'Maud Lee', shortName: 'Maud', worksNumber: '401', email: 'maud@mill.example' },
];

it('says what it opened with', () => {
  const { name, shortName, worksNumber, email, roles, shedIds, usualSet } = NUALA;
  expect(personOf(personForm(NUALA, () => OTHERS))).toEqual({
    name,
    shortName,
    worksNumber,
    email,
    roles,
    shedIds,
    usualSet,
  });
});

it('begins empty as a weaver, and says what is missing', () => {
  const form = personForm(null, () => OTHERS);
  expect(form.getRawValue().roles).toEqual({ weaver: true, tackler: false, foreman: false, manager: false });
  expect(personOf(form)).toBeNull();
});

it.each<[keyof typeof PERSON_LABELS, string, string]>([
  ['name', '', 'Name is missing.'],
  ['name', '   ', 'Name is missing.'],
  ['name', 'x'.repeat(81), 'Name has 1 to 80 characters.'],
  ['shortName', '', 'Short name is missing.'],
  ['shortName', 'maud ', 'There is a Maud already: say which, e.g. Nuala D.'],
  ['worksNumber', '0401', 'Maud Lee has 401, which is the same at the PIN pad. Choose another.'],
  ['pin', '111111', EASY_PIN],
  ['pin', '123456', EASY_PIN],
  ['pin', '987654', EASY_PIN],
  ['worksNumber', '12a', 'A works number is one to six digits, such as 112.'],
  ['worksNumber', '1234567', 'A works number is one to six digits, such as 112.'],
  ['worksNumber', '-5', 'A works number is one to six digits, such as 112.'],
  ['worksNumber', '401', 'Maud Lee has this works number. Choose another.'],
  [
    'worksNumber',
    '',
    'A works number for tablets or an e-mail address for the desk: nobody can sign in without either.',
  ],
  ['email', 'nuala', 'An e-mail address, such as name@mill.example.'],
  ['email', 'nuala@mill', 'An e-mail address, such as name@mill.example.'],
  ['email', ' Maud@Mill.example', 'Maud Lee has this e-mail address. Choose another.'],
  ['pin', '12345', 'A PIN is six digits; this has 5 characters.'],
  ['pin', '12345a', 'A PIN is six digits; this has 6 characters.'],
])('%s: %j', (at, value, sentence) => {
  const form = personForm(NUALA, () => OTHERS);
  const control = form.controls[at];
  control.setValue(value);
  expect(problemOfField(control, PERSON_LABELS[at])).toBe(sentence);
  expect(personOf(form)).toBeNull();
});

it('wants an e-mail address of a manager, and says so as the role is ticked', () => {
  const form = personForm(NUALA, () => OTHERS);
  form.controls.roles.controls.manager.setValue(true);
  judge(form, [form.controls.worksNumber, form.controls.email]);
  expect(problemOfField(form.controls.email, 'E-mail')).toBe(
    'A manager signs in at a desk and needs an e-mail address, such as name@mill.example.',
  );
  form.controls.email.setValue('nuala@mill.example');
  expect(personOf(form)).toMatchObject({ roles: ['weaver', 'manager'], email: 'nuala@mill.example' });
});

it('wants a role', () => {
  const form = personForm(NUALA, () => OTHERS);
  form.controls.roles.controls.weaver.setValue(false);
  expect(form.controls.roles.errors).toEqual({ says: NO_ROLE });
  expect(personOf(form)).toBeNull();
});

it('wants a shed, or all of them', () => {
  const form = personForm(NUALA, () => OTHERS);
  form.controls.shedIds.setValue([]);
  expect(problemOfField(form.controls.shedIds, 'Sheds')).toBe(NO_SHED);
  expect(personOf(form)).toBeNull();
  form.controls.everywhere.setValue(true);
  judge(form, [form.controls.shedIds]);
  expect(personOf(form)).toMatchObject({ shedIds: [] });
});

it('is sound again with either a works number or an address', () => {
  const form = personForm(NUALA, () => OTHERS);
  form.controls.worksNumber.setValue('');
  form.controls.email.setValue('nuala@mill.example');
  judge(form, [form.controls.worksNumber]);
  expect(personOf(form)).toMatchObject({ worksNumber: null, email: 'nuala@mill.example' });
});

it.each([
  ['Mary Kay', ['Mary'], 'There is a Mary already: say which, e.g. Mary K.'],
  ['Mary Kay', ['mary', 'Mary K.'], 'There is a mary already: say which, e.g. Mary Ka.'],
  ['Mary', ['Mary'], 'There is a Mary already: say which.'],
  ['Mary Kay', ['Maud'], undefined],
])('%s beside %j', (name, shorts, sentence) => {
  const others = shorts.map((shortName) => ({
    id: shortName,
    name: shortName,
    shortName,
    worksNumber: null,
    email: null,
  }));
  const facts = { name, shortName: 'Mary', worksNumber: '7', email: null, roles: ['weaver'] as const };
  expect(personTroubles(facts, others, null).shortName).toBe(sentence);
});

it('leaves a person the number and the short name that were theirs before', () => {
  const own = { ...NUALA, worksNumber: '0401', shortName: 'Maud' };
  expect(personTroubles(own, [own, ...OTHERS.slice(1)], 'nuala')).toEqual({});
});
