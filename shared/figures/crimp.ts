import { noFigure, type Figure } from './no-figure.js';

/**
 * How much longer the warp is than the cloth it goes into, said in one of two ways that are easily mistaken for one
 * another. L: length of the thread taken out and straightened; S: length of the cloth it came from.
 */

/** Crimp, (L − S)/S, a share: 21.2 cm from 20 cm of cloth is .06. */
export function crimpOf(threadLength: number, clothLength: number): Figure {
  return contraction(threadLength, clothLength, clothLength);
}

/** Take-up, (L − S)/L, a share: the same threads give .0566. */
export function takeUpOf(threadLength: number, clothLength: number): Figure {
  return contraction(threadLength, clothLength, threadLength);
}

function contraction(thread: number, cloth: number, base: number): Figure {
  if (Number.isNaN(thread) || Number.isNaN(cloth)) return noFigure('missing-input');
  if (!(cloth > 0 && thread >= cloth && thread < Infinity)) return noFigure('out-of-range');
  return (thread - cloth) / base;
}

/** The take-up that a crimp amounts to, c/(1 + c): the form shows the one beside the other. */
export function takeUpOfCrimp(crimp: number): Figure {
  if (Number.isNaN(crimp)) return noFigure('missing-input');
  return crimp >= 0 && crimp < Infinity ? crimp / (1 + crimp) : noFigure('out-of-range');
}

/** The crimp that a take-up amounts to, t/(1 − t). */
export function crimpOfTakeUp(takeUp: number): Figure {
  if (Number.isNaN(takeUp)) return noFigure('missing-input');
  return takeUp >= 0 && takeUp < 1 ? takeUp / (1 - takeUp) : noFigure('out-of-range');
}
