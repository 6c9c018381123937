import { noFigure, type NoFigure } from '../figures/no-figure.js';
import { D2, meanMovingRange, sideOut, type ChartPoint } from './control-charts.js';

/** The upper limit of a range of two, in mean ranges (D4 of the printed tables). */
const D4 = 3.267;

/** A chart of single values in the order of time, such as a loom's efficiency by shift. */
export interface IndividualsChart {
  readonly mean: number;
  /** Mean moving range ÷ 1.128: the spread between neighbours, which a drift does not swell. */
  readonly sigma: number;
  readonly meanRange: number;
  readonly rangeHigh: number;
  readonly points: readonly ChartPoint[];
  /** The moving ranges, one fewer than the points; the first belongs to the second point. */
  readonly ranges: readonly ChartPoint[];
}

/**
 * Individuals and moving range chart: mean ± 3 · mean moving range ÷ 1.128.
 *
 * Source: NIST/SEMATECH e-Handbook 6.3.2.2 (d₂ = 1.128, D₄ = 3.267).
 *
 * @param values in the order of time, in one unit; shifts without a value are left out by the caller
 * @returns the chart in the unit of the values, or no figure: `missing-input` for fewer than two values or NaN,
 *   `out-of-range` for infinite ones
 */
export function individualsChart(values: readonly number[]): IndividualsChart | NoFigure {
  if (values.length < 2 || values.some(Number.isNaN)) return noFigure('missing-input');
  if (!values.every(Number.isFinite)) return noFigure('out-of-range');
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const meanRange = meanMovingRange(values);
  const sigma = meanRange / D2;
  const rangeHigh = D4 * meanRange;
  const point = (value: number, low: number, high: number) => ({
    value,
    low,
    high,
    out: sideOut(value, low, high),
  });
  return {
    mean,
    sigma,
    meanRange,
    rangeHigh,
    points: values.map((value) => point(value, mean - 3 * sigma, mean + 3 * sigma)),
    ranges: values.slice(1).map((value, at) => point(Math.abs(value - values[at]), 0, rangeHigh)),
  };
}
