import { problemOfField } from '../common/field';
import { PERCENT, type Quantity } from '../common/quantity';
import { BREAK_RATE, TARGET_LABELS, targetFacts, targetForm, targetWords } from './target-form';

const FACTS = { efficiency: 6 / 7, warpBreaks: 4.04, weftBreaks: 10 / 3 };

it('says what it opened with, to the bit', () => {
  expect(targetFacts(targetForm(FACTS))).toEqual(FACTS);
});

it('takes an empty field for no target', () => {
  const none = { efficiency: null, warpBreaks: null, weftBreaks: null };
  const form = targetForm(FACTS);
  form.patchValue(none);
  expect(targetFacts(form)).toEqual(none);
});

it.each<[keyof typeof TARGET_LABELS, number, string, Quantity]>([
  ['efficiency', 0, 'Loom efficiency is more than 0 and at most 100 %.', PERCENT],
  ['efficiency', 1.01, 'Loom efficiency is more than 0 and at most 100 %.', PERCENT],
  ['warpBreaks', 1001, 'Warp breaks is between 0 and 1,000 per 10⁵ picks.', BREAK_RATE],
  ['weftBreaks', -1, 'Weft breaks is between 0 and 1,000 per 10⁵ picks.', BREAK_RATE],
])('%s: %d', (at, value, sentence, quantity) => {
  const form = targetForm(FACTS);
  form.controls[at].setValue(value);
  expect(problemOfField(form.controls[at], TARGET_LABELS[at], quantity)).toBe(sentence);
  expect(targetFacts(form)).toBeNull();
});

it.each([
  [
    { efficiency: 0.85, warpBreaks: 4, weftBreaks: 3 },
    '85.0%, at most 4.0 warp and 3.0 weft breaks per 10⁵ picks',
  ],
  [{ efficiency: null, warpBreaks: 4, weftBreaks: null }, 'at most 4.0 warp breaks per 10⁵ picks'],
  [{ efficiency: null, warpBreaks: null, weftBreaks: null }, 'no target'],
])('%j is said', (target, words) => {
  expect(targetWords(target)).toBe(words);
});
