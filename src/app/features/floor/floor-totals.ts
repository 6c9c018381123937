import { noInterval } from '@shared/figures/breaks';
import { formatCount } from '@shared/figures/format';
import { whyNoPicks } from '@shared/figures/loom-line';
import type { Figure } from '@shared/figures/no-figure';
import { groupFigures } from '@shared/figures/totals';
import type { FloorLoom } from './floor-loom';

/** The shed as a whole, so far in the shift. */
export interface FloorTotals {
  readonly efficiency: Figure;
  readonly picks: Figure;
  /** A reading of some loom is missing: the most that they can be. */
  readonly atMost: boolean;
  readonly looms: number;
  readonly running: number;
  readonly planned: number;
  readonly callsWaiting: number;
  /** Since when the longest waits; null: nobody waits. */
  readonly longestCall: number | null;
}

/** Ratios of sums over all looms, at `asOf`. */
export function floorTotals(looms: readonly FloorLoom[], asOf: number): FloorTotals {
  const { figures } = groupFigures(
    looms.map(({ line, totals }) => ({ totals, picksBy: line.picksBy, why: whyNoPicks(line, asOf) })),
    { interval: noInterval, asOf },
  );
  const waiting = looms.flatMap(({ call }) => (call?.waits ? [call.at] : []));
  return {
    efficiency: figures.atMost?.efficiency ?? figures.efficiency,
    picks: figures.atMost?.picks ?? figures.picks,
    atMost: figures.atMost !== null,
    looms: looms.length,
    running: looms.filter(({ standing }) => standing === null).length,
    planned: looms.filter(({ standing }) => standing?.planned).length,
    callsWaiting: waiting.length,
    longestCall: waiting.length ? Math.min(...waiting) : null,
  };
}

/** Picks of a shed, to what "at most" is worth: "1.02 M", below a million to the hundred. */
export function picksInShort(picks: number): string {
  const hundreds = Math.round(picks / 100) * 100;
  return hundreds < 1_000_000 ? formatCount(hundreds) : `${(hundreds / 1_000_000).toFixed(2)} M`;
}
