import type { AbstractControl } from '@angular/forms';
import type { PatternFacts } from '@shared/contract/set-up';
import { problemOfField } from '../common/field';
import { judge } from '../common/judge-together';
import { readLocalTime } from './local-time';
import { PATTERN_LABELS, mealFields, patternFacts, patternForm } from './pattern-form';

const NIGHT: PatternFacts = {
  name: 'Night',
  startsLocal: '22:00',
  endsLocal: '06:00',
  weekdays: [1, 2, 3, 4, 5],
  meal: { startsLocal: '02:00', endsLocal: '02:30', looms: 'stopped' },
};
const open = () => patternForm(NIGHT, '2026-12-07', () => ['Early']);

it('says what it opened with', () => {
  expect(patternFacts(open())).toEqual(NIGHT);
});

it.each([
  ['6:00', '06:00'],
  ['0600', '06:00'],
  ['600', '06:00'],
  ['22.15', '22:15'],
  ['24:00', null],
  ['6', null],
  ['12:60', null],
  ['noon', null],
])('%j is %j', (text, time) => {
  expect(readLocalTime(text)).toBe(time);
});

type Changes = Readonly<Partial<Record<keyof typeof PATTERN_LABELS, unknown>>>;

it.each<[keyof typeof PATTERN_LABELS, Changes, string]>([
  ['name', { name: '' }, 'Name is missing.'],
  ['name', { name: 'early' }, 'There is one called early already. Choose another name.'],
  ['starts', { starts: '' }, 'Type the start as hours and minutes, such as 06:00.'],
  [
    'starts',
    { starts: '25:00' },
    '“25:00” is no time of day. Type the start as hours and minutes, such as 06:00.',
  ],
  ['ends', { ends: '6 am' }, '“6 am” is no time of day. Type the end as hours and minutes, such as 14:00.'],
  ['weekdays', { weekdays: [] }, 'Choose at least one day on which it starts.'],
  ['mealStarts', { mealStarts: '' }, 'Type when the meal begins as hours and minutes, such as 10:00.'],
  ['mealStarts', { mealStarts: '07:00' }, 'The meal begins at 07:00, outside the shift from 22:00 to 06:00.'],
  ['mealStarts', { ends: '01:00' }, 'The meal begins at 02:00, outside the shift from 22:00 to 01:00.'],
  ['mealEnds', { mealEnds: '06:30' }, 'The meal ends at 06:30, after the shift’s end: it is over by 06:00.'],
  ['mealEnds', { mealEnds: '01:30' }, 'The meal ends at 01:30, after the shift’s end: it is over by 06:00.'],
  [
    'mealEnds',
    { mealStarts: '22:00', mealEnds: '06:00' },
    'The meal is as long as the shift: no time to weave is left.',
  ],
  ['from', { from: '2026-02-30' }, 'Choose the first date on which it is so, such as 2026-12-07.'],
])('%s: %j', (at, change, sentence) => {
  const form = open();
  for (const [key, value] of Object.entries(change)) form.get(key)?.setValue(value);
  judge(form, mealFields(form));
  const control: AbstractControl | null = form.get(at);
  expect(control && problemOfField(control, PATTERN_LABELS[at])).toBe(sentence);
  expect(form.valid).toBe(false);
  if (at !== 'from') expect(patternFacts(form)).toBeNull();
});

it('forgets a meal that is switched off, whatever its times say', () => {
  const form = open();
  form.patchValue({ mealStarts: 'x', meal: 'none' });
  judge(form, mealFields(form));
  expect(patternFacts(form)?.meal).toBeNull();
  expect(form.valid).toBe(true);
});
