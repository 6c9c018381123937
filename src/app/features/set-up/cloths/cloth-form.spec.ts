import type { AbstractControl } from '@angular/forms';
import type { ClothFacts } from '@shared/contract/set-up';
import { problemOfField } from '../common/field';
import { PERCENT, QUANTITIES, plain, readQuantity, textOf, type Quantity } from '../common/quantity';
import { clothFigures } from './cloth-figures';
import {
  CLOTH_LABELS,
  WEFT_LABELS,
  clothAdvice,
  clothFacts,
  clothForm,
  shareLeft,
  weftForm,
} from './cloth-form';
import { CONTRACTIONS, COUNTS, otherContraction } from './cloth-quantities';

const FACTS: ClothFacts = {
  ends: 3360,
  picksPerCmOnLoom: 20,
  picksPerCmLoomState: 20.8,
  reedWidthCm: 168,
  crimp: 0.06,
  abreast: 1,
  wefts: [{ name: 'Ecru 25', tex: 25, share: 1, waste: 0.03, pernMassG: 28 }],
};
/** Numbers that no rounded text can carry. */
const AWKWARD: ClothFacts = {
  ...FACTS,
  picksPerCmOnLoom: 50 / 2.54,
  reedWidthCm: 167.64000000000001,
  crimp: 1 / 17,
  abreast: 2,
  wefts: [
    { name: 'Red', tex: 590.541 / 24, share: 1 / 3, waste: 0.0333333, pernMassG: 28.349523125 },
    { name: 'Blue', tex: 29.52704, share: 1 / 3, waste: 0.02, pernMassG: 27.1 },
    { name: 'White', tex: 19.684697, share: 1 / 3, waste: 1 / 30, pernMassG: 30 },
  ],
};
const open = (facts = FACTS) => clothForm({ name: 'Sorrel stripe', facts }, 'tex', () => ['Glebe 42']);
const firstWeft = (form: ReturnType<typeof open>) => form.controls.wefts.at(0);

it('says what it opened with, to the bit', () => {
  for (const facts of [FACTS, AWKWARD]) expect(clothFacts(open(facts))).toEqual(facts);
});

it.each<[number, Quantity]>([
  [167.64000000000001, QUANTITIES.width.imperial],
  [50 / 2.54, QUANTITIES.sett.metric],
  [28.349523125, QUANTITIES.mass.imperial],
  [590.541 / 24, COUNTS.Ne],
  [590.541 / 24, COUNTS.lea],
  [1 / 17, CONTRACTIONS['take-up']],
])('%d left as it is shown stays to the bit: %#', (stored, quantity) => {
  expect(readQuantity(textOf(stored, quantity), quantity, stored)).toBe(stored);
});

const ENDS = 'Say the ends: the number of warp threads, a whole number from 1 to 100,000.';

describe('what is wrong with a cloth', () => {
  it.each<[keyof typeof CLOTH_LABELS, unknown, string, Quantity?]>([
    ['name', '  ', 'Name is missing.'],
    ['name', 'x'.repeat(81), 'Name has 1 to 80 characters.'],
    ['name', 'glebe 42', 'There is one called glebe 42 already. Choose another name.'],
    ['ends', null, ENDS],
    ['ends', 3360.5, ENDS],
    ['ends', 0, ENDS],
    [
      'picksPerCmOnLoom',
      0,
      'Picks on the loom is more than 0 and at most 500 per cm.',
      QUANTITIES.sett.metric,
    ],
    [
      'picksPerCmOnLoom',
      501,
      'Picks on the loom is more than 0 and at most 1,270 per in.',
      QUANTITIES.sett.imperial,
    ],
    [
      'picksPerCmLoomState',
      501,
      'Picks in loom state is more than 0 and at most 500 per cm.',
      QUANTITIES.sett.metric,
    ],
    ['reedWidthCm', 1001, 'Reed width is more than 0 and at most 1,000 cm.', QUANTITIES.width.metric],
    ['crimp', 1.2, 'Crimp is between 0 and 100 %.', PERCENT],
    ['abreast', 9, 'Cloths abreast is a whole number between 1 and 8.'],
  ])('%s: %j', (at, value, sentence, quantity) => {
    const form = open();
    const control: AbstractControl | null = form.get(at);
    control?.setValue(value);
    expect(control && problemOfField(control, CLOTH_LABELS[at], quantity)).toBe(sentence);
    expect(clothFacts(form) === null || at === 'name').toBe(true);
    expect(form.invalid).toBe(true);
  });

  it('speaks of the take-up where that is asked', () => {
    const { crimp } = open().controls;
    crimp.setValue(1.2);
    expect(problemOfField(crimp, CLOTH_LABELS.takeUp, CONTRACTIONS['take-up'])).toBe(
      'Take-up is between 0 and 50 %.',
    );
  });

  it.each<[keyof typeof WEFT_LABELS, unknown, string, Quantity?]>([
    ['name', '', 'Yarn is missing.'],
    ['tex', 0, 'Count is more than 0 and at most 20,000 tex.', COUNTS.tex],
    ['share', 0, 'Share of the picks is more than 0 and at most 100 %.', PERCENT],
    ['waste', null, 'Waste is missing. Waste is from 0 to less than 100 %.', PERCENT],
    ['waste', 1, 'Waste is from 0 to less than 100 %.', PERCENT],
    ['pernMassG', 3000, 'Weft on a full pern is more than 0 and at most 2,000 g.', plain('g')],
  ])('weft’s %s: %j', (at, value, sentence, quantity) => {
    const form = open();
    const control: AbstractControl | null = firstWeft(form).get(at);
    control?.setValue(value);
    expect(control && problemOfField(control, WEFT_LABELS[at], quantity)).toBe(sentence);
    expect(clothFacts(form)).toBeNull();
  });

  it('knows that a low count is a thick yarn', () => {
    const { tex, system } = firstWeft(open()).controls;
    system.setValue('Ne');
    tex.setValue(30_000);
    expect(problemOfField(tex, WEFT_LABELS.tex, COUNTS.Ne)).toBe('Count is at least 0.030 Ne.');
  });

  it.each([
    [[0.9], 'The shares add up to 90%, not 100%: 10% is missing.'],
    [[0.6, 0.45], 'The shares add up to 105%, not 100%: 5% too much.'],
    [[], 'A cloth has at least one weft.'],
    [Array.from({ length: 9 }, () => 1 / 9), 'A cloth has at most 8 wefts.'],
    [[0.3333, 0.3333, 0.3333], ''],
  ])('shares of %j: %s', (shares, sentence) => {
    const form = open();
    form.controls.wefts.clear();
    for (const [at, share] of shares.entries())
      form.controls.wefts.push(weftForm({ name: `W${at}`, tex: 25, share, waste: 0, pernMassG: 28 }, 'tex'));
    const { wefts } = form.controls;
    expect(problemOfField(wefts, 'Wefts') || '').toBe(sentence);
    expect(clothFacts(form) === null).toBe(sentence !== '');
  });

  it('tells two wefts of one name apart', () => {
    const { wefts } = open(AWKWARD).controls;
    const name: AbstractControl = wefts.at(1).controls.name;
    name.setValue('RED');
    expect(problemOfField(name, WEFT_LABELS.name)).toBe('Two wefts are called RED. Tell them apart.');
  });

  it('advises where loom state has fewer picks', () => {
    const form = open();
    expect(clothAdvice(form)).toBe('');
    form.controls.picksPerCmLoomState.setValue(19);
    expect(clothAdvice(form)).toContain('more picks than on the loom');
  });
});

it('offers the next weft what is left', () => {
  const { wefts } = open().controls;
  expect(shareLeft(wefts)).toBeNull();
  wefts.at(0).controls.share.setValue(0.6);
  expect(shareLeft(wefts)).toBe(0.4);
});

it('says crimp beside take-up and the other way round', () => {
  expect(otherContraction(0.06, 'crimp')).toBe('That is a take-up of 5.66%.');
  expect(otherContraction(0.25, 'take-up')).toBe('That is a crimp of 25.00%.');
  expect(otherContraction(null, 'crimp')).toBe('');
});

describe('what a cloth comes to', () => {
  const lines = (facts: ClothFacts, units: 'metric' | 'imperial') =>
    clothFigures(facts, units).map(({ label, value, unit }) => `${label}: ${value} ${unit}`);

  it('is warp, weft, picks and perns, in metres', () => {
    expect(lines(FACTS, 'metric')).toEqual([
      'Warp for 100 m of cloth: 106 m',
      // 2,080 picks · 1.68 m · 1.03 · 25 tex
      'Weft in the cloth: 89.98 g/m',
      'Picks in 1 m of cloth: 2,080 picks',
      // 1,120 m ÷ (1.68 m · 1.03)
      'A full pern lasts: 647 picks',
    ]);
  });

  it('is the same cloth in yards', () => {
    expect(lines(FACTS, 'imperial')).toEqual([
      'Warp for 100 yd of cloth: 106 yd',
      'Weft in the cloth: 2.902 oz/yd',
      'Picks in 1 yd of cloth: 1,902 picks',
      'A full pern lasts: 647 picks',
    ]);
  });

  it('says of several abreast that it is all of them', () => {
    expect(clothFigures(AWKWARD, 'metric')[1]?.from).toBe('all 2 widths together, waste included');
    expect(lines(AWKWARD, 'metric').filter((line) => line.startsWith('A full pern of'))).toHaveLength(3);
  });
});
