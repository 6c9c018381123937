import type { Weeks } from '@shared/contract/reports';
import type { GroupFigures } from '@shared/entries/loom-line';
import { formatRate } from '@shared/figures/format';
import { isNoFigure, noFigureSentence, numberOrNull } from '@shared/figures/no-figure';
import { addDays, formatDate } from '../../core/dates';
import { coverageWords } from '../../ui/coverage-words';
import type { Metric } from './weeks-metrics';
import type { WeeksView } from './weeks-view';

export interface WeekCell {
  readonly text: string;
  readonly value: number | null;
  readonly low: number | null;
  readonly high: number | null;
  /** "2.9–5.4"; empty: not a rate, or no figure. */
  readonly interval: string;
  /** Why there is no figure; empty: there is one. */
  readonly why: string;
  readonly leftOut: number;
  /** "from 5 of 24 loom lines"; empty: from all, or no figure. */
  readonly coverage: string;
}

export interface WeeksRow {
  readonly key: string;
  readonly label: string;
  readonly cloth: string;
  readonly cells: readonly WeekCell[];
  /** The last whole week against the one before; null: one of them has no figure. */
  readonly change: number | null;
  readonly changeText: string;
}

export interface WeekColumn {
  readonly monday: string;
  /** "4 May". */
  readonly label: string;
  /** The week is not over. */
  readonly soFar: boolean;
}

export interface WeeksTable {
  readonly columns: readonly WeekColumn[];
  readonly rows: readonly WeeksRow[];
  readonly total: WeeksRow;
  /** Index of the last week that is over; −1: none is. */
  readonly lastWhole: number;
}

export function weeksTable(weeks: Weeks, metric: Metric, today: string): WeeksTable {
  const columns = weeks.weeks.map((monday) => ({
    monday,
    label: formatDate(monday),
    soFar: addDays(monday, 7) > today,
  }));
  const lastWhole = columns.findLastIndex((column) => !column.soFar);
  const row = (
    key: string,
    label: string,
    cloths: readonly string[],
    groups: readonly (GroupFigures | null)[],
  ) => {
    const cells = groups.map((group) => weekCell(group, metric));
    const [now, before] = [cells[lastWhole]?.value ?? null, cells[lastWhole - 1]?.value ?? null];
    const change = now === null || before === null ? null : now - before;
    return {
      key,
      label,
      cloth: cloths.join(', '),
      cells,
      change,
      changeText: change === null ? '–' : metric.formatChange(change),
    };
  };
  return {
    columns,
    rows: weeks.rows.map((one) => row(one.key, one.label, one.clothNames, one.cells)),
    total: row('total', 'The shed', [], weeks.total),
    lastWhole,
  };
}

export function weekCell(group: GroupFigures | null, metric: Metric): WeekCell {
  if (!group)
    return {
      text: '–',
      value: null,
      low: null,
      high: null,
      interval: '',
      why: 'no closed shift',
      leftOut: 0,
      coverage: '',
    };
  const figure = metric.figure(group.figures);
  const rate = metric.rate?.(group.figures);
  const { low, high } = { low: rate?.low ?? null, high: rate?.high ?? null };
  return {
    text: isNoFigure(figure) ? '–' : metric.format(figure),
    value: numberOrNull(figure),
    low,
    high,
    interval: low === null || high === null ? '' : `${formatRate(low)}–${formatRate(high)}`,
    why: isNoFigure(figure) ? noFigureSentence(figure) : '',
    leftOut: group.linesLeftOut,
    coverage: isNoFigure(figure) ? '' : coverageWords(group, 'loom lines'),
  };
}

const byLabel = new Intl.Collator('en-GB', { numeric: true });

/** Rows in the order of the view; rows without the figure come last, whichever way it goes. */
export function sortRows(
  table: WeeksTable,
  view: Pick<WeeksView, 'sort' | 'descending'>,
): readonly WeeksRow[] {
  const direction = view.descending ? -1 : 1;
  const column = table.columns.findIndex((one) => one.monday === view.sort);
  const label = (a: WeeksRow, b: WeeksRow) => byLabel.compare(a.label, b.label);
  const value = (row: WeeksRow) => (view.sort === 'change' ? row.change : (row.cells[column]?.value ?? null));
  return [...table.rows].sort((a, b) => {
    if (view.sort === 'cloth') return direction * byLabel.compare(a.cloth, b.cloth) || label(a, b);
    if (view.sort !== 'change' && column < 0) return direction * label(a, b);
    const [left, right] = [value(a), value(b)];
    if (left === null || right === null) return Number(left === null) - Number(right === null) || label(a, b);
    return direction * (left - right) || label(a, b);
  });
}
