import { crimpOfTakeUp, takeUpOfCrimp } from '@shared/figures/crimp';
import { isNoFigure } from '@shared/figures/no-figure';
import { METRES_PER_YARD, ouncesFromGrams } from '@shared/figures/units';
import { countFromTex, texFrom, type CountSystem } from '@shared/figures/yarn';
import { PERCENT, plain, type Quantity, type Units } from '../common/quantity';

function countQuantity(system: CountSystem, unit: string): Quantity {
  return {
    unit,
    decimals: 3,
    shown: (tex) => countFromTex(tex, system),
    stored: (count) => texFrom(count, system),
  };
}

/** Systems of yarn count that a form offers; the control holds tex. */
export const COUNTS = {
  tex: countQuantity('tex', 'tex'),
  Ne: countQuantity('Ne', 'Ne'),
  lea: countQuantity('lea', 'lea'),
  Nm: countQuantity('Nm', 'Nm'),
} as const satisfies Partial<Record<CountSystem, Quantity>>;
export type Count = keyof typeof COUNTS;

export const COUNT_CHOICES: readonly { readonly value: Count; readonly words: string }[] = [
  { value: 'tex', words: 'tex' },
  { value: 'Ne', words: 'cotton (Ne)' },
  { value: 'lea', words: 'linen (lea)' },
  { value: 'Nm', words: 'metric (Nm)' },
];

/** The count that a mill most likely thinks in. */
export const USUAL_COUNT: Readonly<Record<Units, Count>> = { metric: 'tex', imperial: 'Ne' };

/** Take-up in percent; the control holds the crimp. */
const TAKE_UP: Quantity = {
  unit: '%',
  decimals: 3,
  shown: (crimp) => {
    const takeUp = takeUpOfCrimp(crimp);
    return isNoFigure(takeUp) ? takeUp : takeUp * 100;
  },
  stored: (percent) => crimpOfTakeUp(percent / 100),
};

/** The two ways in which the warp's contraction is said; the control holds the crimp. */
export const CONTRACTIONS = { crimp: PERCENT, 'take-up': TAKE_UP } as const;
export type Contraction = keyof typeof CONTRACTIONS;

/** The other way to say the same contraction: "That is a take-up of 5.66%."; empty: none yet. */
export function otherContraction(crimp: number | null, as: Contraction): string {
  if (crimp === null) return '';
  const other = as === 'crimp' ? 'take-up' : 'crimp';
  const figure = CONTRACTIONS[other].shown(crimp);
  return isNoFigure(figure) ? '' : `That is a ${other} of ${figure.toFixed(2)}%.`;
}

export const WHOLE = plain('', 0);

/** Grams in a metre of cloth as shown: g/m, or oz/yd. */
export function massPerLength(gramsPerMetre: number, units: Units): { value: number; unit: string } {
  if (units === 'metric') return { value: gramsPerMetre, unit: 'g/m' };
  const ounces = ouncesFromGrams(gramsPerMetre * METRES_PER_YARD);
  return { value: isNoFigure(ounces) ? Number.NaN : ounces, unit: 'oz/yd' };
}
