import type { ClothFacts } from '@shared/contract/set-up';
import { clothFigures } from './cloth-figures';
import {
  clothValuesOf,
  otherContraction,
  readCloth,
  shareLeft,
  withContractionAs,
  withSystem,
  type ClothField,
  type ClothValues,
  type WeftField,
} from './cloth-form';
import type { Units } from './typed';

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
  ends: 2801,
  picksPerCmOnLoom: 50 / 2.54,
  picksPerCmLoomState: 20.123456789,
  reedWidthCm: 167.64000000000001,
  crimp: 1 / 17,
  abreast: 2,
  wefts: [
    { name: 'Red', tex: 590.541 / 24, share: 1 / 3, waste: 0.0333333, pernMassG: 28.349523125 },
    { name: 'Blue', tex: 29.52704, share: 1 / 3, waste: 0.02, pernMassG: 27.1 },
    { name: 'White', tex: 19.684697, share: 1 / 3, waste: 1 / 30, pernMassG: 30 },
  ],
};
const values = clothValuesOf({ name: 'Sorrel stripe', facts: FACTS }, 'metric');
const said = (change: Partial<ClothValues>, units: Units = 'metric') =>
  readCloth({ ...values, ...change }, units, FACTS);

describe('a cloth that is opened and saved without a change', () => {
  it.each(['metric', 'imperial'] as const)('is stored as it was, to the bit, in %s', (units) => {
    for (const facts of [FACTS, AWKWARD]) {
      const opened = clothValuesOf({ name: 'Sorrel stripe', facts }, units);
      expect(readCloth(opened, units, facts).facts).toEqual(facts);
      const asTakeUp = withContractionAs(opened, 'take-up', facts);
      expect(readCloth(asTakeUp, units, facts).facts).toEqual(facts);
      const byLea = {
        ...opened,
        wefts: opened.wefts.map((weft, at) => withSystem(weft, 'lea', facts.wefts[at]?.tex ?? null)),
      };
      expect(readCloth(byLea, units, facts).facts).toEqual(facts);
    }
  });

  it('keeps what was left alone where one number is another', () => {
    const opened = clothValuesOf({ name: 'Sorrel stripe', facts: AWKWARD }, 'imperial');
    expect(readCloth({ ...opened, reedWidth: '70' }, 'imperial', AWKWARD).facts).toEqual({
      ...AWKWARD,
      reedWidthCm: 177.8,
    });
  });

  it('keeps each weft’s own numbers where one before it goes', () => {
    const opened = clothValuesOf({ name: 'Sorrel stripe', facts: AWKWARD }, 'imperial');
    const [, blue, white] = opened.wefts;
    if (!blue || !white) throw new Error('three wefts');
    const wefts = [blue, { ...white, share: '66.667' }];
    expect(readCloth({ ...opened, wefts }, 'imperial', AWKWARD).facts?.wefts).toEqual([
      AWKWARD.wefts[1],
      { ...AWKWARD.wefts[2], share: 0.66667 },
    ]);
  });
});

describe('what is wrong with a cloth', () => {
  it.each<[ClothField, Partial<ClothValues>, string]>([
    ['name', { name: '  ' }, 'Give the cloth a name.'],
    ['name', { name: 'x'.repeat(81) }, 'A name has at most 80 characters; this has 81.'],
    ['ends', { ends: '' }, 'Type the number of ends, such as 3,360.'],
    ['ends', { ends: 'many' }, '“many” is no number. Type the number of ends, such as 3,360.'],
    ['ends', { ends: '3360.5' }, 'The number of ends is a whole number, such as 3,360.'],
    ['ends', { ends: '0' }, 'The number of ends is at least 1 and at most 100,000.'],
    ['picksOnLoom', { picksOnLoom: '0' }, 'The setting on the loom is more than 0 and at most 500 per cm.'],
    [
      'picksOnLoom',
      { picksOnLoom: '-20' },
      '“-20” is no number. Type the setting on the loom, such as 20 per cm.',
    ],
    ['picksLoomState', { picksLoomState: '20,8' }, 'Type the decimals after a point: 20.8.'],
    [
      'picksLoomState',
      { picksLoomState: '501' },
      'The setting in loom state is more than 0 and at most 500 per cm.',
    ],
    ['reedWidth', { reedWidth: '1680' }, 'The reed width is more than 0 and at most 1,000 cm.'],
    ['contraction', { contraction: '' }, 'Type the crimp, such as 6%.'],
    ['contraction', { contraction: '120' }, 'The crimp is at least 0 and at most 100%.'],
    [
      'contraction',
      { contraction: '55', contractionAs: 'take-up' },
      'The take-up is at least 0 and at most 50%.',
    ],
    ['abreast', { abreast: '9' }, 'The number of cloths abreast is at least 1 and at most 8.'],
    ['wefts', { wefts: [] }, 'A cloth has at least one weft.'],
    ['wefts', { wefts: [{ ...weft(), share: '90' }] }, 'The shares add up to 90%, not 100%: 10% is missing.'],
    [
      'wefts',
      { wefts: [weft(), { ...weft(), name: 'Other', share: '5' }] },
      'The shares add up to 105%, not 100%: 5% too much.',
    ],
  ])('%s: %j', (field, change, sentence) => {
    const reading = said(change);
    expect(reading.problems[field]).toBe(sentence);
    expect(Object.keys(reading.problems)).toEqual([field]);
    expect(reading.facts).toBeNull();
  });

  it.each<[WeftField, Partial<ReturnType<typeof weft>>, string]>([
    ['name', { name: '' }, 'Give the weft a name.'],
    ['count', { count: '0' }, 'The count is more than 0 and at most 20,000 tex.'],
    ['count', { count: 'fine' }, '“fine” is no number. Type the count, such as 25 tex.'],
    ['share', { share: '0' }, 'The share is more than 0 and at most 100%.'],
    ['waste', { waste: '' }, 'Type the waste, such as 3%.'],
    ['waste', { waste: '100' }, 'The waste is at least 0 and less than 100%.'],
    ['pernMass', { pernMass: '3000' }, 'The weft on a full pern is more than 0 and at most 2,000 g.'],
  ])('weft’s %s: %j', (field, change, sentence) => {
    const reading = said({ wefts: [{ ...weft(), ...change }] });
    expect(reading.weftProblems[0]?.[field]).toBe(sentence);
    expect(reading.facts).toBeNull();
  });

  it('speaks of inches where the mill does', () => {
    expect(said({ reedWidth: '400' }, 'imperial').problems.reedWidth).toBe(
      'The reed width is more than 0 and at most 393.701 in.',
    );
  });

  it('knows that a low count is a thick yarn', () => {
    const thick = { ...weft(), system: 'Ne' as const, count: '0.02' };
    expect(said({ wefts: [thick] }).weftProblems[0]?.count).toBe('The count is at least 0.03 Ne.');
  });

  it('takes no name twice, nor two wefts of one name', () => {
    expect(readCloth(values, 'metric', FACTS, ['sorrel STRIPE']).problems.name).toBe(
      'There is one called Sorrel stripe already. Choose another name.',
    );
    expect(
      said({
        wefts: [
          { ...weft(), share: '50' },
          { ...weft(), share: '50' },
        ],
      }).weftProblems[1]?.name,
    ).toBe('There is one called Ecru 25 already. Choose another name.');
  });

  it('takes three thirds for a whole, and advises where loom state has fewer picks', () => {
    const thirds = ['A', 'B', 'C'].map((name) => ({ ...weft(), name, share: '33.33' }));
    expect(said({ wefts: thirds }).facts).not.toBeNull();
    expect(said({ picksLoomState: '19' }).advice).toContain('more picks than on the loom');
    expect(said({}).advice).toBe('');
  });
});

describe('crimp and take-up', () => {
  it('shows the one beside the other', () => {
    expect(otherContraction(values)).toBe('That is a take-up of 5.66%.');
    const takeUp = withContractionAs(values, 'take-up', FACTS);
    expect(takeUp.contraction).toBe('5.66');
    expect(otherContraction({ ...takeUp, contraction: '20' })).toBe('That is a crimp of 25.00%.');
  });

  it('leaves what cannot be read as it was typed', () => {
    expect(withContractionAs({ ...values, contraction: 'some' }, 'take-up', null).contraction).toBe('some');
    expect(otherContraction({ ...values, contraction: 'some' })).toBe('');
  });
});

it('offers the next weft what is left', () => {
  expect(shareLeft([{ ...weft(), share: '60' }])).toBe('40');
  expect(shareLeft([weft()])).toBe('');
});

describe('what a cloth comes to', () => {
  it('is warp, weft, picks and perns, in metres', () => {
    expect(
      clothFigures(FACTS, 'metric').map(({ label, value, unit }) => `${label}: ${value} ${unit}`),
    ).toEqual([
      'Warp for 100 m of cloth: 106 m',
      // 2,080 picks · 1.68 m · 1.03 · 25 tex
      'Weft in the cloth: 89.98 g/m',
      'Picks in 1 m of cloth: 2,080 picks',
      // 1,120 m ÷ (1.68 m · 1.03)
      'A full pern lasts: 647 picks',
    ]);
  });

  it('is the same cloth in yards', () => {
    expect(
      clothFigures(FACTS, 'imperial').map(({ label, value, unit }) => `${label}: ${value} ${unit}`),
    ).toEqual([
      'Warp for 100 yd of cloth: 106 yd',
      'Weft in the cloth: 2.902 oz/yd',
      'Picks in 1 yd of cloth: 1,902 picks',
      'A full pern lasts: 647 picks',
    ]);
  });

  it('says of several abreast that it is all of them', () => {
    expect(clothFigures(AWKWARD, 'metric')[1]?.from).toBe('all 2 widths together, waste included');
    expect(
      clothFigures(AWKWARD, 'metric').filter(({ label }) => label.startsWith('A full pern of')),
    ).toHaveLength(3);
  });
});

function weft() {
  const [first] = values.wefts;
  if (!first) throw new Error('one weft');
  return first;
}
