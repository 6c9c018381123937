import { LIMITS } from '@shared/contract/limits';
import { isNoFigure, type Figure } from '@shared/figures/no-figure';
import { countFromTex, texFrom, type CountSystem } from '@shared/figures/yarn';
import {
  CM_PER_INCH,
  METRES_PER_YARD,
  cmFromInches,
  gramsFromOunces,
  inchesFromCm,
  metresFromYards,
  ouncesFromGrams,
  perCmFromPerInch,
  perInchFromPerCm,
  yardsFromMetres,
} from '@shared/figures/units';

/**
 * Numbers as they are typed and as they are stored. What is stored stays as it is, to the bit, while its text in the
 * form is what the form opened with: opening and saving in another system of units changes nothing.
 */
export type Units = 'metric' | 'imperial';

/** A kind of number in a form: how its stored value is shown, and read back. */
export interface Quantity {
  readonly unit: string;
  readonly decimals: number;
  readonly shown: (stored: number) => Figure;
  readonly stored: (shown: number) => Figure;
  /** The finer, the higher the number: the largest that may be stored is the least that may be typed. */
  readonly inverse?: boolean;
}

const same = (value: number): Figure => value;
const plain = (unit: string, decimals: number): Quantity => ({ unit, decimals, shown: same, stored: same });

/** Widths (stored cm), lengths (m), setts (threads per cm), small masses (g). */
export const QUANTITIES = {
  width: {
    metric: plain('cm', 2),
    imperial: { unit: 'in', decimals: 3, shown: inchesFromCm, stored: cmFromInches },
  },
  length: {
    metric: plain('m', 2),
    imperial: { unit: 'yd', decimals: 2, shown: yardsFromMetres, stored: metresFromYards },
  },
  sett: {
    metric: plain('per cm', 3),
    imperial: { unit: 'per in', decimals: 3, shown: perInchFromPerCm, stored: perCmFromPerInch },
  },
  mass: {
    metric: plain('g', 2),
    imperial: { unit: 'oz', decimals: 4, shown: ouncesFromGrams, stored: gramsFromOunces },
  },
} as const satisfies Record<string, Record<Units, Quantity>>;

/** A share, shown as a percentage. */
export const PERCENT: Quantity = {
  unit: '%',
  decimals: 3,
  shown: (share) => share * 100,
  stored: (percent) => percent / 100,
};

/** Breaks per 10⁵ picks, seconds and other numbers that no system of units changes. */
export const PLAIN: Quantity = plain('', 3);

/** Tex, shown by a system of counts. */
export function countQuantity(system: CountSystem): Quantity {
  return {
    unit: COUNT_UNITS[system],
    decimals: 3,
    shown: (tex) => countFromTex(tex, system),
    stored: (count) => texFrom(count, system),
    inverse: system !== 'tex' && system !== 'denier',
  };
}

const COUNT_UNITS: Readonly<Record<CountSystem, string>> = {
  tex: 'tex',
  denier: 'den',
  Ne: 'Ne',
  lea: 'lea',
  Nm: 'Nm',
};

/** Grams a metre of cloth as shown: g/m, or oz/yd. */
export function massPerLength(gramsPerMetre: number, units: Units): { value: number; unit: string } {
  if (units === 'metric') return { value: gramsPerMetre, unit: 'g/m' };
  const ounces = ouncesFromGrams(gramsPerMetre * METRES_PER_YARD);
  return { value: isNoFigure(ounces) ? Number.NaN : ounces, unit: 'oz/yd' };
}

/** How many picks make a unit of length of the sett: centimetres in one. */
export const CM_PER_SETT_UNIT: Readonly<Record<Units, number>> = { metric: 1, imperial: CM_PER_INCH };

/** A stored value as a form shows it: rounded, without trailing zeros. */
export function textOf(stored: number, quantity: Quantity): string {
  const shown = quantity.shown(stored);
  return isNoFigure(shown) ? '' : String(Number(shown.toFixed(quantity.decimals)));
}

/** What was typed, in stored units; the stored value itself where its text was left alone. Null: no number. */
export function readQuantity(text: string, quantity: Quantity, kept: number | null = null): number | null {
  if (kept !== null && text.trim() === textOf(kept, quantity)) return kept;
  const typed = readNumber(text);
  if (typed === null) return null;
  const stored = quantity.stored(typed);
  return isNoFigure(stored) ? null : stored;
}

/** "1,250.5", "1 250.5", ".5"; null for all else: a comma before one, two or four digits is no thousands comma. */
export function readNumber(text: string): number | null {
  const bare = text.trim().replace(/(?<=\d)[ \u00a0\u202f](?=\d{3}(?!\d))/g, ',');
  if (!/^(\d+|\d{1,3}(,\d{3})+)?(\.\d+)?$/.test(bare) || bare === '') return null;
  return Number(bare.replaceAll(',', ''));
}

/** A whole number; null: none. */
export function readWhole(text: string): number | null {
  const number = readNumber(text);
  return number !== null && Number.isSafeInteger(number) ? number : null;
}

/** Why a text is no number, as a sentence; empty: it is one. */
export function numberProblem(text: string, what: string, example: string): string {
  if (text.trim() === '') return `Type ${what}, such as ${example}.`;
  if (readNumber(text) !== null) return '';
  if (/^\d+,\d+$/.test(text.trim()))
    return `Type the decimals after a point: ${text.trim().replace(',', '.')}.`;
  return `“${text.trim()}” is no number. Type ${what}, such as ${example}.`;
}

/** What a number must be, in stored units, and how a sentence calls it. */
export interface Bounds {
  /** With its article: "the reed width". */
  readonly what: string;
  /** A usual value, stored: what would be right. */
  readonly usual: number;
  /** At least; more than (0 unless `least` is said); at most. */
  readonly least?: number;
  readonly most: number;
  readonly below?: boolean;
  readonly whole?: boolean;
}

export interface ReadValue {
  /** In stored units; null: see `problem`. */
  readonly value: number | null;
  /** Why it cannot be taken, and what would be right; empty: it can. */
  readonly problem: string;
}

const grouped = new Intl.NumberFormat('en-GB', { maximumFractionDigits: 3 });

/** Reads a number and holds it against its bounds. */
export function readWithin(
  text: string,
  quantity: Quantity,
  bounds: Bounds,
  kept: number | null = null,
): ReadValue {
  const unit = quantity.unit === '%' ? '%' : quantity.unit ? ` ${quantity.unit}` : '';
  const shown = (stored: number, digits = 6) => {
    const figure = quantity.shown(stored);
    return grouped.format(isNoFigure(figure) ? stored : Number(figure.toPrecision(digits)));
  };
  const problem = numberProblem(text, bounds.what, `${shown(bounds.usual, 3)}${unit}`);
  if (problem) return { value: null, problem };
  const value = readQuantity(text, quantity, kept);
  if (bounds.whole && readWhole(text) === null)
    return {
      value: null,
      problem: `${capital(bounds.what)} is a whole number, such as ${shown(bounds.usual)}.`,
    };
  const low = bounds.least ?? 0;
  const within =
    value !== null &&
    (bounds.least === undefined ? value > 0 : value >= low) &&
    (bounds.below ? value < bounds.most : value <= bounds.most);
  if (within) return { value, problem: '' };
  if (quantity.inverse)
    return { value: null, problem: `${capital(bounds.what)} is at least ${shown(bounds.most)}${unit}.` };
  const from = bounds.least === undefined ? 'more than 0' : `at least ${shown(low)}`;
  const to = `${bounds.below ? 'less than' : 'at most'} ${shown(bounds.most)}${unit}`;
  return { value: null, problem: `${capital(bounds.what)} is ${from} and ${to}.` };
}

/** A name's problem; `taken` are the names of the others, whatever their letters' case. */
export function nameProblem(text: string, what: string, taken: readonly string[] = []): string {
  const name = text.trim();
  if (name === '') return `Give ${what} a name.`;
  if (name.length > LIMITS.nameLength)
    return `A name has at most ${LIMITS.nameLength} characters; this has ${name.length}.`;
  if (taken.some((other) => other.trim().toLowerCase() === name.toLowerCase()))
    return `There is one called ${name} already. Choose another name.`;
  return '';
}

export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
