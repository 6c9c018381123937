import type { Weeks } from '@shared/contract/reports';
import type { Metric } from './weeks-metrics';
import type { WeekCell, WeeksRow, WeeksTable } from './weeks-rows';

/**
 * The sentence above the table says only what the table shows: two numbers and their weeks. Whether their difference
 * is more than chance is another question.
 */
export function shedSentence(table: WeeksTable, metric: Metric): string {
  const { total, columns, lastWhole } = table;
  const now = total.cells[lastWhole];
  const week = columns[lastWhole];
  if (!now || !week) return 'None of these weeks is over yet.';
  if (now.value === null) return `No figure for the shed in the week of ${week.label}: ${now.why}.`;
  const before = total.cells[lastWhole - 1];
  const first = `${metric.ofShed} ${said(now)}${metric.ofShedUnit} in the week of ${week.label}`;
  if (!before) return `${first}.`;
  if (before.value === null) return `${first}; no figure for the week before: ${before.why}.`;
  return `${first}, ${said(before)} the week before.`;
}

function said(cell: WeekCell): string {
  const beside = [cell.interval, cell.coverage].filter(Boolean).join('; ');
  return beside ? `${cell.text} (${beside})` : cell.text;
}

/** What is not in the figures, and why. Empty: nothing is left out. */
export function leftOutSentence(table: WeeksTable, weeks: Pick<Weeks, 'openShifts'>): string {
  const left = table.total.cells.reduce((sum, cell) => sum + cell.leftOut, 0);
  const parts: string[] = [];
  if (left > 0)
    parts.push(
      `${left === 1 ? '1 loom line is' : `${left} loom lines are`} left out: a reading is missing or the picks were agreed.`,
    );
  if (weeks.openShifts > 0)
    parts.push(
      weeks.openShifts === 1
        ? '1 shift is not closed and not counted.'
        : `${weeks.openShifts} shifts are not closed and not counted.`,
    );
  return parts.join(' ');
}

/** The chart in words: for each line its first, last, lowest and highest week. */
export function chartSummary(lines: readonly WeeksRow[], table: WeeksTable, metric: Metric): string {
  const said = lines.map((line) => {
    const points = line.cells.flatMap((cell, at) =>
      cell.value === null
        ? []
        : [{ value: cell.value, text: cell.text, week: table.columns[at]?.label ?? '' }],
    );
    const [first, last] = [points[0], points.at(-1)];
    if (!first || !last) return `${line.label}: no figure in these weeks`;
    const low = points.reduce((a, b) => (b.value < a.value ? b : a));
    const high = points.reduce((a, b) => (b.value > a.value ? b : a));
    return `${line.label}: ${first.text} in the week of ${first.week}, ${last.text} in the week of ${last.week}, lowest ${low.text} (${low.week}), highest ${high.text} (${high.week})`;
  });
  return `${metric.unit}, week by week. ${said.join('. ')}.`;
}
