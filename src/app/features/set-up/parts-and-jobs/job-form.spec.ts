import type { AbstractControl } from '@angular/forms';
import { problemOfField } from '../common/field';
import { plain } from '../common/quantity';
import { JOB_LABELS, PART_LABELS, jobForm, partForm, picksInHours } from './job-form';

const JOB = { id: 'oil', name: 'Oil the picking shafts', everyPicks: 5_000_000, retired: false };

it.each<[keyof typeof JOB_LABELS, unknown, string]>([
  ['name', '', 'Job is missing.'],
  ['name', 'Clean the race', 'There is one called Clean the race already. Choose another name.'],
  [
    'everyPicks',
    null,
    'Due again after is missing. Due again after is a whole number between 1,000 and 10,000,000,000 picks.',
  ],
  ['everyPicks', 999, 'Due again after is a whole number between 1,000 and 10,000,000,000 picks.'],
  ['everyPicks', 5000.5, 'Due again after is a whole number between 1,000 and 10,000,000,000 picks.'],
])('job’s %s: %j', (at, value, sentence) => {
  const form = jobForm(JOB, () => ['clean the race']);
  expect(form.valid).toBe(true);
  const control: AbstractControl | null = form.get(at);
  control?.setValue(value);
  expect(control && problemOfField(control, JOB_LABELS[at], plain('picks'))).toBe(sentence);
  expect(form.valid).toBe(false);
});

it.each([
  ['', 'Part is missing.'],
  ['picking band', 'There is one called picking band already. Choose another name.'],
  ['x'.repeat(81), 'Part has 1 to 80 characters.'],
])('part’s name: %j', (value, sentence) => {
  const form = partForm(null, () => ['Picking band']);
  form.controls.name.setValue(value);
  expect(problemOfField(form.controls.name, PART_LABELS.name)).toBe(sentence);
});

it('says how long so many picks are on the mill’s looms', () => {
  const looms = [{ ppm: 150 }, { ppm: 160 }, { ppm: 210 }];
  expect(picksInHours(5_000_000, looms)).toBe('about 521 running hours at 160 ppm');
  expect(picksInHours(10_000, looms)).toBe('about 63 running minutes at 160 ppm');
  expect(picksInHours(10_000, [])).toBe('');
  expect(picksInHours(null, looms)).toBe('');
});
