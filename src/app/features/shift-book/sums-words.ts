import type { LineSums } from '@shared/contract/shift-records';
import type { GroupFigures } from '@shared/entries/loom-line';
import { ratio } from '@shared/figures/efficiency';
import { formatCount, formatMinutes, formatPercent } from '@shared/figures/format';
import { isNoFigure, type Figure } from '@shared/figures/no-figure';
import type { Change } from './entry-words';

/** What differs between a line's sums before and after, in words. */
export function sumsChanges(before: LineSums, after: LineSums): Change[] {
  const then = sumsRows(before);
  return sumsRows(after).flatMap(({ label, text }, index) => {
    const was = then[index]?.text ?? '';
    return was === text ? [] : [{ label, before: was, after: text }];
  });
}

function sumsRows(sums: LineSums): { label: string; text: string }[] {
  const efficiency = ratio(sums.picks ?? { none: 'no-picks' }, sums.possiblePicks ?? 0, 'no-picks');
  return [
    { label: 'Efficiency', text: percent(efficiency) },
    { label: 'Picks', text: sums.picks === null ? 'not known' : formatCount(sums.picks) },
    { label: 'Minutes timed', text: formatMinutes(Math.round(sums.measuredMinutes)) },
    { label: 'Minutes estimated', text: formatMinutes(Math.round(sums.estimatedMinutes * 10) / 10) },
    { label: 'Warp breaks', text: formatCount(sums.warpBreaks) },
    { label: 'Weft breaks', text: formatCount(sums.weftBreaks) },
    { label: 'Stops', text: formatCount(sums.stops) },
    { label: 'Perns', text: formatCount(sums.perns) },
  ];
}

/** What differs between a shed's figures before and after. */
export function groupChanges(before: GroupFigures, after: GroupFigures): Change[] {
  const then = groupRows(before);
  return groupRows(after).flatMap(({ label, text }, index) => {
    const was = then[index]?.text ?? '';
    return was === text ? [] : [{ label, before: was, after: text }];
  });
}

export function groupRows({ figures }: GroupFigures): { label: string; text: string }[] {
  return [
    { label: 'Efficiency', text: percent(figures.efficiency) },
    { label: 'Picks', text: isNoFigure(figures.picks) ? 'not known' : formatCount(figures.picks) },
    { label: 'Warp breaks', text: formatCount(figures.warp.count) },
    { label: 'Weft breaks', text: formatCount(figures.weft.count) },
    { label: 'Minutes timed', text: formatMinutes(Math.round(figures.measuredMinutes)) },
    { label: 'Minutes estimated', text: formatMinutes(Math.round(figures.estimatedMinutes * 10) / 10) },
  ];
}

function percent(figure: Figure): string {
  return isNoFigure(figure) ? 'no figure' : formatPercent(figure);
}
