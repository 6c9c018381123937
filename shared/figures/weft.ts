import type { ClothVersion } from '../contract/reference.js';
import { isNoFigure, noFigure, type Figure, type NoFigure } from './no-figure.js';
import { yarnLength } from './yarn.js';

/** One of a cloth's wefts: tex, its share of the picks, waste as a share, mass on a full pern in g. */
export type Weft = ClothVersion['wefts'][number];

/** Perns in a basket: a gross, common practice. */
export const PERNS_PER_BASKET = 144;

/** What a cloth takes of one weft. */
export interface WeftUsed {
  readonly name: string;
  readonly metres: number;
  readonly kilograms: number;
  /** Perns of it, whole and part; no figure where the mass on a pern is not known. */
  readonly perns: Figure;
}

/** Shares are typed as percentages: rounding of a few of them is not a mistake. */
const SHARES_TOLERANCE = 0.005;

/**
 * Weft in one pick, m: reed width · (1 + waste). Where several cloths are woven abreast the reed width is that of all.
 */
export function weftPerPick(reedWidthCm: number, waste: number): Figure {
  if (Number.isNaN(reedWidthCm) || Number.isNaN(waste)) return noFigure('missing-input');
  const possible = reedWidthCm > 0 && reedWidthCm < Infinity && waste >= 0 && waste < Infinity;
  return possible ? (reedWidthCm / 100) * (1 + waste) : noFigure('out-of-range');
}

/**
 * Weft that picks of one weft take: picks · reed width, m · (1 + waste) metres; mass = metres · tex / 10⁶ kg.
 *
 * @param picks of this weft alone, ≥ 0
 * @returns no figure (`missing-input` for NaN, else `out-of-range`) where picks, tex or widths are impossible
 */
export function weftOfPicks(
  picks: number,
  weft: Pick<Weft, 'tex' | 'waste' | 'pernMassG'>,
  reedWidthCm: number,
): Omit<WeftUsed, 'name'> | NoFigure {
  if (Number.isNaN(picks) || Number.isNaN(weft.tex)) return noFigure('missing-input');
  if (!(picks >= 0 && picks < Infinity && weft.tex > 0 && weft.tex < Infinity))
    return noFigure('out-of-range');
  const each = weftPerPick(reedWidthCm, weft.waste);
  if (isNoFigure(each)) return each;
  const metres = picks * each;
  const kilograms = (metres * weft.tex) / 1e6;
  const perns = weft.pernMassG > 0 ? (kilograms * 1000) / weft.pernMassG : noFigure('missing-input');
  return { metres, kilograms, perns };
}

/**
 * Weft used by a cloth: of several wefts each by its share of the picks (see `weftOfPicks`).
 *
 * @param picks A ≥ 0
 * @param cloth wefts with shares that add up to 1; none: `no-cloth`
 * @returns one row a weft in the cloth's order, or no figure (`out-of-range`: shares, tex or widths impossible)
 */
export function weftUsed(
  picks: number,
  cloth: Pick<ClothVersion, 'reedWidthCm' | 'wefts'>,
): readonly WeftUsed[] | NoFigure {
  if (Number.isNaN(picks)) return noFigure('missing-input');
  if (cloth.wefts.length === 0) return noFigure('no-cloth');
  const shares = cloth.wefts.reduce((sum, weft) => sum + weft.share, 0);
  const possible = Math.abs(shares - 1) <= SHARES_TOLERANCE && cloth.wefts.every(({ share }) => share >= 0);
  if (!possible) return noFigure('out-of-range');
  const rows: WeftUsed[] = [];
  for (const weft of cloth.wefts) {
    const used = weftOfPicks(picks * weft.share, weft, cloth.reedWidthCm);
    if (isNoFigure(used)) return used;
    rows.push({ name: weft.name, ...used });
  }
  return rows;
}

/** Thread on a full pern, m: mass, g · 1000 / tex. 28 g of 25 tex is 1,120 m; an empty pern is none. */
export function threadOnPern(pernMassG: number, tex: number): Figure {
  return pernMassG === 0 ? noFigure('out-of-range') : yarnLength(pernMassG, tex);
}

/** Picks that a full pern lasts for: pern mass, g · 1000 / tex / (reed width, m · (1 + waste)). */
export function picksPerPern(weft: Pick<Weft, 'pernMassG' | 'tex' | 'waste'>, reedWidthCm: number): Figure {
  const thread = threadOnPern(weft.pernMassG, weft.tex);
  const pick = weftPerPick(reedWidthCm, weft.waste);
  if (isNoFigure(thread)) return thread;
  return isNoFigure(pick) ? pick : thread / pick;
}

/** Picks per pern as logged, picks ÷ perns: beside `picksPerPern` it shows short perns, or perns not logged. */
export function picksPerPernLogged(picks: number, perns: number): Figure {
  if (Number.isNaN(picks) || Number.isNaN(perns)) return noFigure('missing-input');
  if (!(picks >= 0 && perns >= 0)) return noFigure('out-of-range');
  return perns === 0 ? noFigure('no-exposure') : picks / perns;
}

/** Perns in whole baskets and odd ones: 300 are 2 baskets and 12. */
export function baskets(perns: number): {
  readonly whole: number;
  readonly odd: number;
  readonly exact: number;
} {
  const count = Math.max(0, perns);
  const whole = Math.floor(count / PERNS_PER_BASKET);
  return { whole, odd: count - whole * PERNS_PER_BASKET, exact: count / PERNS_PER_BASKET };
}
