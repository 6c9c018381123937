import { readTarget, targetValuesOf, targetWords, type TargetValues } from './target-form';

const FACTS = { efficiency: 6 / 7, warpBreaks: 4.04, weftBreaks: 10 / 3 };
const values: TargetValues = { efficiency: '85', warpBreaks: '4', weftBreaks: '3.5' };

it('stores what it opened with, to the bit', () => {
  expect(readTarget(targetValuesOf(FACTS), FACTS).facts).toEqual(FACTS);
});

it('takes an empty field for no target', () => {
  expect(readTarget({ efficiency: '', warpBreaks: ' ', weftBreaks: '' }, FACTS).facts).toEqual({
    efficiency: null,
    warpBreaks: null,
    weftBreaks: null,
  });
});

it.each<[keyof TargetValues, Partial<TargetValues>, string]>([
  [
    'efficiency',
    { efficiency: '0' },
    'The loom efficiency is more than 0 and at most 100%. Leave it empty for no target.',
  ],
  [
    'efficiency',
    { efficiency: '101' },
    'The loom efficiency is more than 0 and at most 100%. Leave it empty for no target.',
  ],
  [
    'efficiency',
    { efficiency: 'good' },
    '“good” is no number. Type the loom efficiency, such as 85%. Leave it empty for no target.',
  ],
  [
    'warpBreaks',
    { warpBreaks: '1001' },
    'The rate of warp breaks is at least 0 and at most 1,000 per 10⁵ picks. Leave it empty for no target.',
  ],
  [
    'weftBreaks',
    { weftBreaks: '3,5' },
    'Type the decimals after a point: 3.5. Leave it empty for no target.',
  ],
])('%s: %j', (field, change, sentence) => {
  const reading = readTarget({ ...values, ...change });
  expect(reading.problems).toEqual({ [field]: sentence });
  expect(reading.facts).toBeNull();
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
