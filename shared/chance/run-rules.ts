import { noFigure, type NoFigure } from '../figures/no-figure.js';

/** What a run of points shows: see `runRules`. */
export type RunRule = 'beyond-3-sigma' | '2-of-3' | '4-of-5' | '8-on-one-side' | '6-in-a-row';

export interface RunSignal {
  readonly rule: RunRule;
  /** Above or below the centre; rising or falling for six in a row. */
  readonly side: 'above' | 'below' | 'rising' | 'falling';
  /** The points that make the run, from and to, counted from 0. */
  readonly from: number;
  readonly to: number;
}

/** Runs of `of` points of which `least` are strictly further than `sigmas` out, all on one side. */
const ZONES: readonly { rule: RunRule; least: number; of: number; sigmas: number }[] = [
  { rule: 'beyond-3-sigma', least: 1, of: 1, sigmas: 3 },
  { rule: '2-of-3', least: 2, of: 3, sigmas: 2 },
  { rule: '4-of-5', least: 4, of: 5, sigmas: 1 },
  { rule: '8-on-one-side', least: 8, of: 8, sigmas: 0 },
];

/** How many points in a row must rise or fall. */
const TREND = 6;

/**
 * Runs that chance alone seldom makes, on points in the order of time: one beyond 3σ; two of three beyond 2σ;
 * four of five beyond 1σ; eight in a row on one side; six in a row rising or falling. A point exactly on a
 * line is not beyond it. A run is told at the point that completes it, and again while it goes on.
 *
 * Source: NIST/SEMATECH e-Handbook 6.3.2 (Western Electric rules; wording from memory); six in a row, L. S.
 * Nelson, Journal of Quality Technology 16 (1984), and SAS/QC test 3. Rules multiply alarms: a chart that
 * uses them all gives one about every 90 points where nothing changed (Champ and Woodall 1987, from memory).
 *
 * @param values in the order of time; where limits vary, standardised ones with centre 0 and sigma 1
 * @param centre the chart's centre, in the unit of the values
 * @param sigma the chart's standard deviation in the same unit, ≥ 0; with 0 every departure is beyond
 * @returns signals by the point that completes them, or no figure: `missing-input` for NaN, else `out-of-range`
 */
export function runRules(
  values: readonly number[],
  centre: number,
  sigma: number,
): readonly RunSignal[] | NoFigure {
  const all = [...values, centre, sigma];
  if (all.some(Number.isNaN)) return noFigure('missing-input');
  if (sigma < 0 || !all.every(Number.isFinite)) return noFigure('out-of-range');
  return values.flatMap((_, to) => [
    ...ZONES.flatMap((zone) => zoneSignals(values, centre, sigma, to, zone)),
    ...trendSignals(values, to),
  ]);
}

function zoneSignals(
  values: readonly number[],
  centre: number,
  sigma: number,
  to: number,
  { rule, least, of, sigmas }: (typeof ZONES)[number],
): RunSignal[] {
  const slack = 1e-12 * Math.max(Math.abs(centre), Math.abs(values[to]));
  const beyond = (at: number, sign: number) => sign * (values[at] - centre) > sigmas * sigma + slack;
  return ([1, -1] as const).flatMap((sign) => {
    if (!beyond(to, sign)) return [];
    let hits = 0;
    let from = to;
    for (let at = to; at > to - of && at >= 0; at--) {
      if (!beyond(at, sign)) continue;
      hits++;
      from = at;
    }
    return hits >= least
      ? [{ rule, side: sign > 0 ? ('above' as const) : ('below' as const), from, to }]
      : [];
  });
}

function trendSignals(values: readonly number[], to: number): RunSignal[] {
  const from = to - TREND + 1;
  if (from < 0) return [];
  const steps = values.slice(from + 1, to + 1).map((value, at) => value - values[from + at]);
  if (steps.every((step) => step > 0)) return [{ rule: '6-in-a-row', side: 'rising', from, to }];
  if (steps.every((step) => step < 0)) return [{ rule: '6-in-a-row', side: 'falling', from, to }];
  return [];
}
