import type { Rate } from '@shared/entries/loom-line';
import type { UsualRow } from '@shared/contract/usual';
import { BREAKS_PER } from '@shared/figures/breaks';
import { formatRate } from '@shared/figures/format';
import { isNoFigure, type Figure } from '@shared/figures/no-figure';

export type Counted = 'stops' | 'warp' | 'weft';

/** What happened on a loom, or on a set, beside what so many picks usually bring. */
export interface AgainstUsual {
  readonly count: number;
  /** Null: nothing to hold it against. */
  readonly usual: { readonly expected: number; readonly low: number; readonly high: number } | null;
}

/**
 * A loom's count beside what this loom with this cloth usually gives in so many picks.
 *
 * @param picks of the shift so far, at most; no figure: nothing to hold it against
 * @param rate per 10⁵ picks with its interval; null: not known
 */
export function againstUsual(count: number, picks: Figure, rate: Rate | null): AgainstUsual {
  if (isNoFigure(picks) || !rate || isNoFigure(rate.rate) || rate.low === null || rate.high === null)
    return { count, usual: null };
  const share = picks / BREAKS_PER;
  return {
    count,
    usual: { expected: rate.rate * share, low: rate.low * share, high: rate.high * share },
  };
}

/**
 * The set's counts and expectations added up. Looms err independently of each other, so the distances of the limits
 * add as squares. One loom that has nothing to be held against leaves the set without: a part is not the whole.
 */
export function addedUp(looms: readonly AgainstUsual[]): AgainstUsual {
  const count = looms.reduce((sum, one) => sum + one.count, 0);
  const usual = looms.flatMap((one) => one.usual ?? []);
  if (usual.length === 0 || usual.length < looms.length) return { count, usual: null };
  const expected = usual.reduce((sum, one) => sum + one.expected, 0);
  const distance = (of: (one: (typeof usual)[number]) => number) =>
    Math.sqrt(usual.reduce((sum, one) => sum + of(one) ** 2, 0));
  return {
    count,
    usual: {
      expected,
      low: Math.max(0, expected - distance((one) => one.expected - one.low)),
      high: expected + distance((one) => one.high - one.expected),
    },
  };
}

export function usualRate(row: UsualRow | null, what: Counted): Rate | null {
  return row?.[what] ?? null;
}

/** "usually 3.1 (2.4 to 4.0)"; empty where there is nothing to say. */
export function usualWords({ usual }: AgainstUsual): string {
  return usual
    ? `usually ${formatRate(usual.expected)} (${formatRate(usual.low)} to ${formatRate(usual.high)})`
    : '';
}
