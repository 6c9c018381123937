import { noFigure, type NoFigure } from '../figures/no-figure.js';

/** Most looms in a set that the figures are held good for. */
export const MOST_LOOMS = 200;

/** How long mending takes from stop to stop: scattered as widely as exponential times, or always the same. */
export type AttendingTimes = 'exponential' | 'constant';

/** How a set of looms runs, once it has run for long. */
export interface Interference {
  /** Share of time that a loom runs, 0 to 1: its efficiency as far as the weaver's stops go. */
  readonly efficiency: number;
  /** Share of a weaver's time spent mending, 0 to 1. */
  readonly busy: number;
  /** Mean number of looms running, being mended, and standing for want of a free weaver; they sum to N. */
  readonly running: number;
  readonly mended: number;
  readonly waiting: number;
}

/** Interference with the probability of each number of looms standing. */
export interface InterferenceWithStates extends Interference {
  /** The probability that 0, 1, … N looms stand. */
  readonly probabilities: readonly number[];
}

/**
 * A set of looms minded by one weaver or several sharing, exponential attending times (M/M/c//N).
 *
 * With n looms standing the chances run pₙ₊₁ : pₙ = (N − n)ρ : min(n + 1, c). They are built outward from the
 * likeliest n and divided by their sum, so that 200 looms at ρ = 1 do not overflow.
 *
 * Source: C. Palm 1947; W. Feller, An Introduction to Probability Theory and Its Applications I, XVII.7.
 *
 * @param looms N, looms in the set, a whole number 1 to 200
 * @param rho ρ, stops per running minute × mean attending minutes, 0 to 1
 * @param weavers c, weavers who share the set, a whole number ≥ 1
 * @returns shares and mean numbers, or no figure: `missing-input` for NaN, `out-of-range` otherwise
 */
export function exponentialInterference(
  looms: number,
  rho: number,
  weavers = 1,
): InterferenceWithStates | NoFigure {
  return whyNotSet(looms, rho, weavers) ?? solveExponential(looms, rho, weavers);
}

/**
 * A set of looms minded by one weaver, every stop attended in the same time.
 *
 * B = Σⱼ C(N−1, j)·Πᵢ₌₁ʲ(e^{iρ} − 1); busy = NρB ÷ (1 + NρB). B is summed by its logarithms: at 200 looms and
 * ρ = 1 it has some 8,600 digits.
 *
 * Source: H. Ashcroft, J. R. Statist. Soc. B 12 (1950) (formula from memory, confirmed by simulation).
 *
 * @param looms N, a whole number 1 to 200
 * @param rho ρ, stops per running minute × attending minutes, 0 to 1
 * @returns shares and mean numbers, or no figure: `missing-input` for NaN, `out-of-range` otherwise
 */
export function constantInterference(looms: number, rho: number): Interference | NoFigure {
  return whyNotSet(looms, rho, 1) ?? solveConstant(looms, rho);
}

/** Why a set cannot be reckoned, or null where it can. */
export function whyNotSet(looms: number, rho: number, weavers: number): NoFigure | null {
  if ([looms, rho, weavers].some(Number.isNaN)) return noFigure('missing-input');
  const possible =
    Number.isInteger(looms) && looms >= 1 && looms <= MOST_LOOMS && Number.isInteger(weavers) && weavers >= 1;
  return possible && rho >= 0 && rho <= 1 ? null : noFigure('out-of-range');
}

/** The model by name, on inputs known to be possible; ρ may pass 1, where searches pass through. */
export function solve(times: AttendingTimes, looms: number, rho: number, weavers: number): Interference {
  return times === 'constant' ? solveConstant(looms, rho) : solveExponential(looms, rho, weavers);
}

function solveExponential(looms: number, rho: number, weavers: number): InterferenceWithStates {
  const step = (n: number) => ((looms - n) * rho) / Math.min(n + 1, weavers);
  let likeliest = 0;
  while (likeliest < looms && step(likeliest) > 1) likeliest++;
  const weights = new Array<number>(looms + 1);
  weights[likeliest] = 1;
  for (let n = likeliest; n < looms; n++) weights[n + 1] = weights[n] * step(n);
  for (let n = likeliest; n > 0; n--) weights[n - 1] = weights[n] / step(n - 1);
  const sum = weights.reduce((all, weight) => all + weight, 0);
  const probabilities = weights.map((weight) => weight / sum);
  const mean = (of: (n: number) => number) => probabilities.reduce((all, p, n) => all + p * of(n), 0);

  const mended = mean((n) => Math.min(n, weavers));
  const running = mean((n) => looms - n);
  const waiting = mean((n) => Math.max(0, n - weavers));
  return { efficiency: running / looms, busy: mended / weavers, running, mended, waiting, probabilities };
}

function solveConstant(looms: number, rho: number): Interference {
  if (rho === 0) return { efficiency: 1, busy: 0, running: looms, mended: 0, waiting: 0 };
  const logs = [0];
  for (let j = 1; j < looms; j++) {
    // log(e^x − 1), whether x is near 0 or far beyond what e^x can hold
    const x = j * rho;
    const rise = x < 1 ? Math.log(Math.expm1(x)) : x + Math.log1p(-Math.exp(-x));
    logs.push(logs[j - 1] + Math.log((looms - j) / j) + rise);
  }
  const top = Math.max(...logs);
  const logB = top + Math.log(logs.reduce((sum, log) => sum + Math.exp(log - top), 0));
  const efficiency = 1 / (Math.exp(-logB) + looms * rho);
  const running = looms * efficiency;
  const mended = running * rho;
  return { efficiency, busy: mended, running, mended, waiting: Math.max(0, looms - running - mended) };
}
