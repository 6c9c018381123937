import { noFigure, type Figure } from './no-figure.js';
import { GRAMS_PER_POUND, METRES_PER_YARD, YARDS_PER_HANK, YARDS_PER_LEA } from './units.js';

/**
 * Systems of yarn count. Direct, mass of a length: tex, g per 1,000 m; denier, g per 9,000 m. Indirect, lengths
 * to a mass: Ne (English cotton), hanks of 840 yd to the lb; lea (linen), leas of 300 yd to the lb; Nm, km to
 * the kg.
 */
export type CountSystem = 'tex' | 'denier' | 'Ne' | 'lea' | 'Nm';

/** tex × count of the indirect systems, exact from the definitions of yard and pound: 590.541… for Ne. */
export const TEX_TIMES: Readonly<Record<'Ne' | 'lea' | 'Nm', number>> = {
  Ne: (GRAMS_PER_POUND * 1000) / (YARDS_PER_HANK * METRES_PER_YARD),
  lea: (GRAMS_PER_POUND * 1000) / (YARDS_PER_LEA * METRES_PER_YARD),
  Nm: 1000,
};

/**
 * The count of a yarn in tex.
 *
 * Source: ISO 1144 (the tex system); constants exact from the definitions, as ASTM D2260 prints them rounded.
 *
 * @param count the count in `system`, > 0
 * @returns tex, or no figure: `missing-input` for NaN, `out-of-range` for 0, less or infinite
 */
export function texFrom(count: number, system: CountSystem): Figure {
  return convert(count, system);
}

/** The count of a yarn in `system`, from tex > 0; errors as `texFrom`. */
export function countFromTex(tex: number, system: CountSystem): Figure {
  return system === 'denier' ? convert(tex, 'tex', 9) : convert(tex, system);
}

/**
 * The mass of a length of yarn.
 *
 * @param metres length, ≥ 0
 * @param tex count, > 0
 * @returns grams, or no figure: `missing-input` for NaN, else `out-of-range`
 */
export function yarnMass(metres: number, tex: number): Figure {
  if (Number.isNaN(metres) || Number.isNaN(tex)) return noFigure('missing-input');
  const possible = metres >= 0 && metres < Infinity && tex > 0 && tex < Infinity;
  return possible ? (metres * tex) / 1000 : noFigure('out-of-range');
}

/**
 * The length of a mass of yarn, such as of the weft on a pern: 28 g of 25 tex are 1,120 m.
 *
 * @param grams mass, ≥ 0
 * @param tex count, > 0
 * @returns metres, or no figure as `yarnMass`
 */
export function yarnLength(grams: number, tex: number): Figure {
  if (Number.isNaN(grams) || Number.isNaN(tex)) return noFigure('missing-input');
  const possible = grams >= 0 && grams < Infinity && tex > 0 && tex < Infinity;
  return possible ? (grams * 1000) / tex : noFigure('out-of-range');
}

/** An indirect count times tex is a constant, so the same division serves both ways. */
function convert(count: number, system: CountSystem, times = 1): Figure {
  if (Number.isNaN(count)) return noFigure('missing-input');
  if (!(count > 0 && count < Infinity)) return noFigure('out-of-range');
  if (system === 'tex') return count * times;
  return system === 'denier' ? count / 9 : TEX_TIMES[system] / count;
}
