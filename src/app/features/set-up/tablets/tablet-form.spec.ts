import { problemOfField } from '../common/field';
import { renameForm, TABLET_LABELS, tabletForm } from './tablet-form';

it.each<[keyof typeof TABLET_LABELS, string, string]>([
  ['name', '', 'Name of the tablet is missing.'],
  ['name', '  ', 'Name of the tablet is missing.'],
  ['name', 'x'.repeat(81), 'Name of the tablet has 1 to 80 characters.'],
  ['name', 'alley a', 'There is one called alley a already. Choose another name.'],
  ['shedId', '', 'Choose the shed whose looms it logs for.'],
])('%s: %j', (at, value, sentence) => {
  const form = tabletForm('north', () => ['Alley A']);
  form.controls.name.setValue('Alley B');
  expect(form.valid).toBe(true);
  form.controls[at].setValue(value);
  expect(problemOfField(form.controls[at], TABLET_LABELS[at])).toBe(sentence);
  expect(form.valid).toBe(false);
});

it('takes its own name again', () => {
  expect(renameForm('Alley A', () => ['Alley B']).valid).toBe(true);
});
