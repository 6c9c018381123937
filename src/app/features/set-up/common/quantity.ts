import { isNoFigure, type Figure } from '@shared/figures/no-figure';
import {
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
}

const same = (value: number): Figure => value;

/** A number that no system of units changes. */
export const plain = (unit: string, decimals = 3): Quantity => ({
  unit,
  decimals,
  shown: same,
  stored: same,
});

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

/**
 * "1250.5", "1 250.5", "1,250.5", ".5", and with a decimal comma "22,5", "0,125". Null: no number; also "1,250", which
 * could be either.
 */
export function readNumber(text: string): number | null {
  const bare = text.trim().replace(/(?<=\d)[ \u00a0\u202f](?=\d{3}(?!\d))/g, '');
  if (/^(\d+(\.\d*)?|\.\d+)$/.test(bare)) return Number(bare);
  if (/^\d{1,3}(,\d{3})+\.\d+$/.test(bare) || /^[1-9]\d{0,2}(,\d{3}){2,}$/.test(bare))
    return Number(bare.replaceAll(',', ''));
  if (/^\d*,\d+$/.test(bare) && !couldBeEither(bare)) return Number(bare.replace(',', '.'));
  return null;
}

/** Why a text is no number, as a sentence; empty: it is one. */
export function numberProblem(text: string): string {
  const typed = text.trim();
  if (readNumber(typed) !== null) return '';
  if (couldBeEither(typed))
    return `“${typed}” could be ${typed.replace(',', '')} or ${typed.replace(',', '.')}: type one of them.`;
  if (/^-/.test(typed)) return `“${typed}” is less than nothing. Type a number without a minus.`;
  return `“${typed}” is no number. Type digits, and a point or comma before decimals.`;
}

/** A comma before three digits: thousands to one reader, decimals to another. */
const couldBeEither = (text: string): boolean => /^[1-9]\d{0,2},\d{3}$/.test(text);

/** "1,250", ".5" as sentences write a limit. */
export function limitText(value: number, decimals = 3): string {
  return Number(value.toFixed(decimals)).toLocaleString('en-GB', { maximumFractionDigits: decimals });
}
