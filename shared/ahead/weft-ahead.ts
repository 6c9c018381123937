import { noFigure, type NoFigure } from '../figures/no-figure.js';

/** Perns in a basket: a gross (common practice). */
export const PERNS_IN_BASKET = 144;

/** What one loom will weave with one weft. */
export interface WeftPlan {
  /** Names or ids that sheets are added up by. */
  readonly cloth: string;
  readonly weft: string;
  /** Picks that the loom will weave in the time ahead, all wefts together, ≥ 0. */
  readonly picks: number;
  /** This weft's share of the picks, 0 to 1; 1 unless said. */
  readonly share?: number;
  /** Width in the reed, metres, > 0: the length of a pick. */
  readonly reedWidth: number;
  /** Waste as a share of what is woven in, ≥ 0: .02 for 2%. */
  readonly waste: number;
  /** Count of the weft, tex, > 0. */
  readonly tex: number;
  /** Weft on a full pern, grams, > 0. */
  readonly pernMass: number;
}

/** What one cloth needs of one weft. */
export interface WeftNeed {
  readonly cloth: string;
  readonly weft: string;
  readonly metres: number;
  readonly kilograms: number;
  /** Perns, exactly; the fraction is the last pern's share. */
  readonly perns: number;
  /** The same in baskets of a gross, exactly. */
  readonly baskets: number;
  /** What to fetch: whole baskets, and odd perns rounded up to whole ones. */
  readonly wholeBaskets: number;
  readonly oddPerns: number;
}

/**
 * Weft for the time ahead, by cloth and weft, in the order in which they first come up. Perns of a cloth are
 * added before they are rounded up: looms of one cloth draw on the same baskets.
 *
 * Weft, m = picks · share · width in the reed · (1 + waste); kg = m · tex ÷ 10⁶; perns = m ÷ the length on a
 * pern, pern mass, g · 1000 ÷ tex. Source: the tex system, ISO 1144; a gross to the basket is common practice.
 *
 * @returns needs, or no figure: `missing-input` for NaN, `out-of-range` for anything negative or infinite, a
 *   share above 1, or a width, count or pern of 0
 */
export function weftAhead(plans: readonly WeftPlan[]): readonly WeftNeed[] | NoFigure {
  const sums = new Map<
    string,
    { cloth: string; weft: string; metres: number; kilograms: number; perns: number }
  >();
  for (const plan of plans) {
    const refused = whyNotPlan(plan);
    if (refused) return refused;
    const { cloth, weft, picks, share = 1, reedWidth, waste, tex, pernMass } = plan;
    const metres = picks * share * reedWidth * (1 + waste);
    const grams = (metres * tex) / 1000;
    const key = JSON.stringify([cloth, weft]);
    const sum = sums.get(key) ?? { cloth, weft, metres: 0, kilograms: 0, perns: 0 };
    sums.set(key, {
      cloth,
      weft,
      metres: sum.metres + metres,
      kilograms: sum.kilograms + grams / 1000,
      perns: sum.perns + grams / pernMass,
    });
  }
  return [...sums.values()].map((sum) => ({ ...sum, ...toFetch(sum.perns) }));
}

/**
 * Perns as whole baskets and odd perns.
 *
 * @param perns a number ≥ 0, rounded up to a whole pern; a billionth over is rounding and no pern
 */
export function toFetch(perns: number): Pick<WeftNeed, 'baskets' | 'wholeBaskets' | 'oddPerns'> {
  const whole = Math.max(0, Math.ceil(perns - 1e-9 * Math.max(1, perns)));
  return {
    baskets: perns / PERNS_IN_BASKET,
    wholeBaskets: Math.floor(whole / PERNS_IN_BASKET),
    oddPerns: whole % PERNS_IN_BASKET,
  };
}

function whyNotPlan({ picks, share = 1, reedWidth, waste, tex, pernMass }: WeftPlan): NoFigure | null {
  const all = [picks, share, reedWidth, waste, tex, pernMass];
  if (all.some(Number.isNaN)) return noFigure('missing-input');
  const some = [reedWidth, tex, pernMass].every((value) => value > 0);
  return some && share <= 1 && all.every((value) => value >= 0 && value < Infinity)
    ? null
    : noFigure('out-of-range');
}
