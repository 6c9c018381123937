import { isNoFigure, noFigure, type Figure } from './no-figure.js';

/**
 * Metric and imperial, exact by definition. Stored are cm, picks per cm, m, g; a mill setting chooses what is
 * shown. Source: international yard and pound agreement, 1959 (1 yd = .9144 m, 1 lb = 453.59237 g).
 */
export const CM_PER_INCH = 2.54;
export const METRES_PER_YARD = 0.9144;
export const GRAMS_PER_POUND = 453.59237;
export const YARDS_PER_HANK = 840;
export const YARDS_PER_LEA = 300;

/** Centimetres of a length in inches. */
export function cmFromInches(inches: Figure): Figure {
  return scaled(inches, CM_PER_INCH, 1);
}

/** Inches of a length in centimetres. */
export function inchesFromCm(cm: Figure): Figure {
  return scaled(cm, 1, CM_PER_INCH);
}

/** Metres of a length in yards. */
export function metresFromYards(yards: Figure): Figure {
  return scaled(yards, METRES_PER_YARD, 1);
}

/** Yards of a length in metres. */
export function yardsFromMetres(metres: Figure): Figure {
  return scaled(metres, 1, METRES_PER_YARD);
}

/** Threads (picks or ends) per cm of a sett per inch. */
export function perCmFromPerInch(perInch: Figure): Figure {
  return scaled(perInch, 1, CM_PER_INCH);
}

/** Threads (picks or ends) per inch of a sett per cm. */
export function perInchFromPerCm(perCm: Figure): Figure {
  return scaled(perCm, CM_PER_INCH, 1);
}

/** Kilograms of a mass in pounds. */
export function kilogramsFromPounds(pounds: Figure): Figure {
  return scaled(pounds, GRAMS_PER_POUND, 1000);
}

/** Pounds of a mass in kilograms. */
export function poundsFromKilograms(kilograms: Figure): Figure {
  return scaled(kilograms, 1000, GRAMS_PER_POUND);
}

/** Grams of a mass in ounces, 16 to the pound. */
export function gramsFromOunces(ounces: Figure): Figure {
  return scaled(ounces, GRAMS_PER_POUND, 16);
}

/** Ounces of a mass in grams. */
export function ouncesFromGrams(grams: Figure): Figure {
  return scaled(grams, 16, GRAMS_PER_POUND);
}

/** Multiplied and divided, not by a rounded factor; no figure stays no figure, NaN and Infinity become one. */
function scaled(figure: Figure, times: number, over: number): Figure {
  if (isNoFigure(figure)) return figure;
  if (Number.isNaN(figure)) return noFigure('missing-input');
  return Number.isFinite(figure) ? (figure * times) / over : noFigure('out-of-range');
}
