import type { AbstractControl } from '@angular/forms';
import type { CauseFacts } from '@shared/contract/set-up';
import { shippedCauses } from '@shared/entries/causes';
import { problemOfField } from '../common/field';
import { plain } from '../common/quantity';
import { CAUSE_LABELS, allowanceWords, causeFacts, causeForm, followGroup, tapSentence } from './cause-form';

const FACTS: CauseFacts = {
  name: 'Warp break',
  group: 'warp',
  attendedBy: 'weaver',
  allowanceS: 60,
  breakOf: 'warp',
};

it('takes every cause that a mill starts with as it is', () => {
  const causes = shippedCauses(0);
  expect(causes.length).toBeGreaterThan(40);
  for (const { name, group, attendedBy, allowanceS, breakOf } of causes) {
    const facts = { name, group, attendedBy, allowanceS, breakOf };
    expect(causeFacts(causeForm(facts, () => []))).toEqual(facts);
  }
});

it.each<[keyof typeof CAUSE_LABELS, Partial<CauseFacts>, string]>([
  ['name', { name: ' ' }, 'Cause is missing.'],
  ['name', { name: 'smash' }, 'There is one called smash already. Choose another name.'],
  ['allowanceS', { allowanceS: 36_001 }, 'Allowance is between 0 and 36,000 s.'],
  ['breakOf', { breakOf: 'weft' }, 'Only a cause of the group Weft counts as a weft break.'],
  ['breakOf', { group: 'loom' }, 'Only a cause of the group Warp counts as a warp break.'],
  ['attendedBy', { group: 'shed', breakOf: null }, 'Nobody mends a stop of this group: choose nobody.'],
])('%s: %j', (at, change, sentence) => {
  const form = causeForm({ ...FACTS, ...change }, () => ['Smash']);
  for (const control of Object.values(form.controls)) control.updateValueAndValidity();
  const control: AbstractControl | null = form.get(at);
  expect(control && problemOfField(control, CAUSE_LABELS[at], plain('s'))).toBe(sentence);
  expect(causeFacts(form)).toBeNull();
});

it('asks for the seconds of an allowance, and forgets them where it is timed', () => {
  const form = causeForm({ ...FACTS, allowanceS: null }, () => []);
  form.controls.timed.setValue(false);
  form.controls.allowanceS.updateValueAndValidity();
  expect(problemOfField(form.controls.allowanceS, CAUSE_LABELS.allowanceS)).toBe(
    'Type the allowance in seconds, such as 60, or choose that it is always timed.',
  );
  form.controls.allowanceS.setValue(45);
  expect(causeFacts(form)?.allowanceS).toBe(45);
  form.controls.timed.setValue(true);
  expect(causeFacts(form)?.allowanceS).toBeNull();
});

it.each([
  ['shed', 'nobody', null],
  ['weft', 'weaver', null],
  ['warp', 'weaver', 'warp'],
] as const)('lets the group %s say who attends and what it counts as', (group, attendedBy, breakOf) => {
  const form = causeForm(FACTS, () => []);
  form.controls.group.setValue(group);
  followGroup(form, group);
  expect(form.getRawValue()).toMatchObject({ attendedBy, breakOf });
});

it('says what a tap counts for', () => {
  expect(tapSentence(FACTS)).toBe(
    'A tap counts one stop, which is a warp break, and 60 s of lost time, marked as estimated unless it is timed.',
  );
  expect(tapSentence({ ...FACTS, allowanceS: null, breakOf: null })).toBe(
    'A tap counts one stop; its minutes are those that somebody times, or none.',
  );
  expect([allowanceWords(15), allowanceWords(null)]).toEqual(['15 s', 'timed']);
});
