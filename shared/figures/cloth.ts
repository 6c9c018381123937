import { noFigure, isNoFigure, type Figure } from './no-figure.js';

/** Centimetres in a metre: picks are set per cm, cloth is sold by the metre. */
const CM = 100;

const known = (...inputs: number[]) => !inputs.some(Number.isNaN);
const finite = (...inputs: number[]) => inputs.every((input) => input >= 0 && input < Infinity);

/**
 * Cloth woven, m: A / (picks per cm · 100). With the loom-state setting it is cloth as it leaves the loom; with the
 * setting on the loom, where the cloth is stretched, it is what the loom's own roller measures. With several cloths
 * abreast they share the picks: this is the length of each width (`allWidths` for their sum).
 *
 * @param picks A ≥ 0
 * @param picksPerCm the setting, > 0
 */
export function clothLength(picks: number, picksPerCm: number): Figure {
  if (!known(picks, picksPerCm)) return noFigure('missing-input');
  if (!finite(picks, picksPerCm) || picksPerCm === 0) return noFigure('out-of-range');
  return picks / (picksPerCm * CM);
}

/** Metres of all cloths abreast together, from the metres of one. */
export function allWidths(metresEach: Figure, abreast: number): Figure {
  if (isNoFigure(metresEach)) return metresEach;
  return Number.isInteger(abreast) && abreast >= 1 ? metresEach * abreast : noFigure('out-of-range');
}

/** Picks in a length of cloth, A = m · picks per cm · 100. */
export function picksInCloth(metres: number, picksPerCm: number): Figure {
  if (!known(metres, picksPerCm)) return noFigure('missing-input');
  return finite(metres, picksPerCm) && picksPerCm > 0 ? metres * picksPerCm * CM : noFigure('out-of-range');
}

/**
 * Warp used, m: cloth · (1 + crimp).
 *
 * @param clothM metres of one width
 * @param crimp (L − S)/S, a share ≥ 0 (for a take-up: `crimpOfTakeUp`)
 */
export function warpUsed(clothM: number, crimp: number): Figure {
  if (!known(clothM, crimp)) return noFigure('missing-input');
  return finite(clothM, crimp) ? clothM * (1 + crimp) : noFigure('out-of-range');
}

/** Cloth that a length of warp gives, m: warp ÷ (1 + crimp). */
export function clothFromWarp(warpM: number, crimp: number): Figure {
  if (!known(warpM, crimp)) return noFigure('missing-input');
  return finite(warpM, crimp) ? warpM / (1 + crimp) : noFigure('out-of-range');
}

/**
 * Warp left on the beam that can be woven, m: length − used − thrum. Negative, it says that the beam held more than
 * its ticket, or that picks were counted to the wrong warp: shown, not hidden.
 *
 * @param lengthM what came on the beam; usedM warp used so far; thrumM what cannot be woven at the end
 */
export function beamLeft(lengthM: number, usedM: number, thrumM: number): Figure {
  if (!known(lengthM, usedM, thrumM)) return noFigure('missing-input');
  return finite(lengthM, usedM, thrumM) && thrumM <= lengthM
    ? lengthM - usedM - thrumM
    : noFigure('out-of-range');
}
