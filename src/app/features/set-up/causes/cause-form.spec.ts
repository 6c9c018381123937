import type { CauseFacts } from '@shared/contract/set-up';
import { shippedCauses } from '@shared/entries/causes';
import {
  allowanceWords,
  causeValuesOf,
  readCause,
  tapSentence,
  type CauseField,
  type CauseValues,
} from './cause-form';

const FACTS: CauseFacts = {
  name: 'Warp break',
  group: 'warp',
  attendedBy: 'weaver',
  allowanceS: 60,
  breakOf: 'warp',
};
const values = causeValuesOf(FACTS);

it('takes every cause that a mill starts with as it is', () => {
  const causes = shippedCauses(0);
  expect(causes.length).toBeGreaterThan(40);
  for (const { name, group, attendedBy, allowanceS, breakOf } of causes) {
    const facts = { name, group, attendedBy, allowanceS, breakOf };
    expect(readCause(causeValuesOf(facts), facts)).toEqual({ facts, problems: {} });
  }
});

it('keeps an allowance that no text can carry', () => {
  const facts = { ...FACTS, allowanceS: 200 / 3 };
  expect(causeValuesOf(facts).allowance).toBe('66.667');
  expect(readCause(causeValuesOf(facts), facts).facts).toEqual(facts);
});

it.each<[CauseField, Partial<CauseValues>, string]>([
  ['name', { name: ' ' }, 'Give the cause a name.'],
  ['name', { name: 'smash' }, 'There is one called smash already. Choose another name.'],
  ['allowance', { allowance: '' }, 'Type the allowance, such as 60 s. Or choose “timed”.'],
  [
    'allowance',
    { allowance: '1:30' },
    '“1:30” is no number. Type the allowance, such as 60 s. Or choose “timed”.',
  ],
  [
    'allowance',
    { allowance: '36001' },
    'The allowance is at least 0 and at most 36,000 s. Or choose “timed”.',
  ],
  ['breakOf', { breakOf: 'weft' }, 'Only a cause of the group Weft counts as a weft break.'],
  ['breakOf', { group: 'loom' }, 'Only a cause of the group Warp counts as a warp break.'],
  ['attendedBy', { group: 'shed', breakOf: null }, 'Nobody mends a stop of this group: choose “nobody”.'],
])('%s: %j', (field, change, sentence) => {
  const reading = readCause({ ...values, ...change }, FACTS, ['Smash']);
  expect(reading.problems).toEqual({ [field]: sentence });
  expect(reading.facts).toBeNull();
});

it('says what a tap counts for', () => {
  expect(tapSentence(FACTS)).toBe(
    'A tap counts one stop, and one warp break, and 60 s marked as estimated unless it is timed.',
  );
  expect(tapSentence({ ...FACTS, allowanceS: null, breakOf: null })).toBe(
    'A tap counts one stop; its minutes are those that are timed, or none.',
  );
  expect([allowanceWords(15), allowanceWords(null)]).toEqual(['15 s', 'timed']);
});
