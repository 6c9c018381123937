import type { RepairRecord } from '@shared/contract/calls';
import { formatRate } from '@shared/figures/format';
import { isNoFigure } from '@shared/figures/no-figure';

const NTH = ['', 'first', 'second', 'third', 'fourth', 'fifth', 'sixth', 'seventh', 'eighth', 'ninth'];

/** "Third picking repair in 9 shifts"; empty: the only one for a while. */
export function repeatWords({ repeat, causeName }: Pick<RepairRecord, 'repeat' | 'causeName'>): string {
  if (!repeat) return '';
  const nth = NTH[repeat.nth] ?? `${repeat.nth}th`;
  const cause = causeName.charAt(0).toLocaleLowerCase('en-GB') + causeName.slice(1);
  const shifts = repeat.shifts === 1 ? 'one shift' : `${repeat.shifts} shifts`;
  return `${nth.charAt(0).toUpperCase()}${nth.slice(1)} repair for ${cause} in ${shifts}`;
}

export interface EffectRow {
  readonly what: string;
  /** Breaks per 10⁵ picks with the interval beneath. */
  readonly before: string;
  readonly beforeRange: string;
  readonly after: string;
  readonly afterRange: string;
  readonly verdict: string;
}

/** Breaks before and after a repair, warp and weft. */
export function effectRows(record: RepairRecord): readonly EffectRow[] {
  return (['warp', 'weft'] as const).map((kind) => {
    const { before, after } = record;
    const change = kind === 'warp' ? record.warpChange : record.weftChange;
    return {
      what: kind === 'warp' ? 'Warp breaks' : 'Weft breaks',
      before: rateOf(before[kind]),
      beforeRange: rangeOf(before[kind]),
      after: rateOf(after[kind]),
      afterRange: rangeOf(after[kind]),
      verdict: verdictOf(change),
    };
  });
}

/** "9 shifts before, 4 after"; says where there is too little to compare. */
export function spanWords({ before, after, otherWarp }: RepairRecord): string {
  const count = (n: number) => (n === 1 ? '1 shift' : `${n} shifts`);
  const cut = otherWarp ? ', this warp alone' : '';
  if (after.shifts === 0) return `No whole shift since is known yet${cut}.`;
  if (before.shifts === 0) return `No whole shift before is known${cut}.`;
  return `${count(before.shifts)} before, ${count(after.shifts)} after${cut}, the shift of the repair left out.`;
}

function rateOf({ rate }: RepairRecord['before']['warp']): string {
  return isNoFigure(rate) ? '–' : formatRate(rate);
}

function rangeOf({ low, high }: RepairRecord['before']['warp']): string {
  return low === null || high === null ? '' : `${formatRate(low)}–${formatRate(high)}`;
}

function verdictOf({ ratio, shown }: RepairRecord['warpChange']): string {
  if (isNoFigure(ratio)) return 'not to be compared';
  if (!shown) return 'no change shown';
  return ratio < 1 ? 'fewer since' : 'more since';
}
