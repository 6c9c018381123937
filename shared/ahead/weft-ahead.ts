import { isNoFigure, noFigure, type NoFigure } from '../figures/no-figure.js';
import { baskets, weftOfPicks, type Weft } from '../figures/weft.js';

/** What one loom will weave with one weft, as its cloth describes it. */
export interface WeftPlan extends Pick<Weft, 'tex' | 'waste' | 'pernMassG'> {
  /** Names or ids that sheets are added up by. */
  readonly cloth: string;
  readonly weft: string;
  /** Picks that the loom will weave in the time ahead, all wefts together, ≥ 0. */
  readonly picks: number;
  /** This weft's share of the picks, 0 to 1; 1 unless said. */
  readonly share?: number;
  readonly reedWidthCm: number;
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
 * The arithmetic is that of weft used (`weftOfPicks`). Source: the tex system, ISO 1144; a gross to the basket is
 * common practice.
 *
 * @returns needs, or no figure: `missing-input` for NaN, `out-of-range` for anything negative or infinite, a
 *   share above 1, or a width, count or pern of 0
 */
export function weftAhead(plans: readonly WeftPlan[]): readonly WeftNeed[] | NoFigure {
  const sums = new Map<string, Pick<WeftNeed, 'cloth' | 'weft' | 'metres' | 'kilograms' | 'perns'>>();
  for (const { cloth, weft, picks, share = 1, ...own } of plans) {
    if (Number.isNaN(share) || Number.isNaN(own.pernMassG)) return noFigure('missing-input');
    if (!(share >= 0 && share <= 1 && own.pernMassG > 0)) return noFigure('out-of-range');
    const used = weftOfPicks(picks * share, own, own.reedWidthCm);
    if (isNoFigure(used)) return used;
    if (isNoFigure(used.perns)) return used.perns;
    const key = JSON.stringify([cloth, weft]);
    const sum = sums.get(key) ?? { cloth, weft, metres: 0, kilograms: 0, perns: 0 };
    sums.set(key, {
      cloth,
      weft,
      metres: sum.metres + used.metres,
      kilograms: sum.kilograms + used.kilograms,
      perns: sum.perns + used.perns,
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
  const { whole, odd } = baskets(Math.ceil(perns - 1e-9 * Math.max(1, perns)));
  return { baskets: baskets(perns).exact, wholeBaskets: whole, oddPerns: odd };
}
