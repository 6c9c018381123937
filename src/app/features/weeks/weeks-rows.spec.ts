import { poissonInterval } from '@shared/chance/poisson-interval';
import type { Weeks } from '@shared/contract/reports';
import type { GroupFigures } from '@shared/entries/loom-line';
import { groupFigures } from '@shared/figures/totals';
import { projectLine } from '@shared/entries/projection';
import { lineTotals } from '@shared/figures/loom-line';
import { aLineInput, at, entryBuilder } from '@shared/testing/builders';
import { METRICS } from './weeks-metrics';
import { sortRows, weekCell, weeksTable } from './weeks-rows';
import { chartSummary, leftOutSentence, shedSentence } from './weeks-words';

const WEEKS = ['2026-04-27', '2026-05-04', '2026-05-11'];
const TODAY = '2026-05-13';

/** A week of one shift of 86,400 possible picks: so many woven, so many warp breaks; null picks: no end reading. */
function week(picks: number | null, warpBreaks = 0): GroupFigures {
  const { book } = entryBuilder();
  const line = projectLine(
    aLineInput({
      entries: [
        book('reading', 0, { boundary: 'start', value: 0 }),
        ...(warpBreaks > 0 ? [book('stop', 60, { cause: 'warp-break', count: warpBreaks })] : []),
        ...(picks === null ? [] : [book('reading', 480, { boundary: 'end', value: picks })]),
      ],
    }),
  );
  return groupFigures(
    [
      {
        totals: lineTotals(line, at(600)),
        picksBy: line.picksBy,
        why: picks === null ? 'no-end-reading' : undefined,
      },
    ],
    { interval: (count) => poissonInterval(count), asOf: at(600) },
  );
}

const weeks: Weeks = {
  by: 'loom',
  weeks: WEEKS,
  rows: [
    {
      key: 'l10',
      label: '10',
      clothNames: ['Larch twill'],
      cells: [week(64_800), week(69_120), week(60_480)],
    },
    { key: 'l2', label: '2', clothNames: ['Glebe 42'], cells: [week(72_000), week(51_840), null] },
    { key: 'l1', label: '1', clothNames: ['Tarn linen'], cells: [week(60_000), week(null), week(43_200)] },
  ],
  total: [week(69_120, 3), week(74_250, 3), week(43_200)],
  openShifts: 2,
};
const order = (sort: string, descending = false) =>
  sortRows(weeksTable(weeks, METRICS.efficiency, TODAY), { sort, descending }).map((row) => row.label);

describe('weeksTable', () => {
  it('takes the last week that is over, not the one in progress, against the week before', () => {
    const table = weeksTable(weeks, METRICS.efficiency, TODAY);
    expect(table.columns.map((column) => [column.label, column.soFar])).toEqual([
      ['27 Apr', false],
      ['4 May', false],
      ['11 May', true],
    ]);
    expect(table.lastWhole).toBe(1);
    expect(table.rows[0]?.changeText).toBe('+5.0');
    expect(table.rows[1]?.changeText).toBe('−23.3');
  });

  it('says why there is no figure, and makes no difference of it', () => {
    const table = weeksTable(weeks, METRICS.efficiency, TODAY);
    expect(table.rows[2]?.cells[1]).toMatchObject({
      text: '–',
      value: null,
      why: 'the reading at the end is missing',
    });
    expect(table.rows[2]).toMatchObject({ change: null, changeText: '–' });
    expect(table.rows[1]?.cells[2]).toMatchObject({ text: '–', why: 'no closed shift' });
  });

  it('shows breaks with their interval', () => {
    const table = weeksTable(weeks, METRICS['warp-breaks'], TODAY);
    expect(table.total.cells[1]).toMatchObject({ text: '4.0', interval: '0.8–11.8' });
  });
});

describe('sortRows', () => {
  it('sorts looms by number, weeks by their figure, and puts those without one last either way', () => {
    expect(order('label')).toEqual(['1', '2', '10']);
    expect(order('label', true)).toEqual(['10', '2', '1']);
    expect(order('cloth')).toEqual(['2', '10', '1']);
    expect(order('2026-05-04')).toEqual(['2', '10', '1']);
    expect(order('2026-05-04', true)).toEqual(['10', '2', '1']);
    expect(order('change', true)).toEqual(['10', '2', '1']);
    expect(order('nonsense')).toEqual(['1', '2', '10']);
  });
});

describe('words', () => {
  it('says two numbers and their weeks, and nothing of why', () => {
    const said = (id: keyof typeof METRICS) =>
      shedSentence(weeksTable(weeks, METRICS[id], TODAY), METRICS[id]);
    expect(said('efficiency')).toBe('Shed efficiency 85.9% in the week of 4 May, 80.0% the week before.');
    expect(said('warp-breaks')).toBe(
      'The shed’s warps broke 4.0 (0.8–11.8) times per 10⁵ picks in the week of 4 May, 4.3 (0.9–12.7) the week before.',
    );
  });

  it('has a sentence where a week has no figure', () => {
    const without = { ...weeks, total: [null, week(null), null] };
    expect(shedSentence(weeksTable(without, METRICS.efficiency, TODAY), METRICS.efficiency)).toBe(
      'No figure for the shed in the week of 4 May: the reading at the end is missing.',
    );
  });

  it('names what is left out', () => {
    const table = weeksTable({ ...weeks, total: [week(null), week(null), null] }, METRICS.efficiency, TODAY);
    expect(leftOutSentence(table, weeks)).toBe(
      '2 loom lines are left out: a reading is missing or the picks were agreed. 2 shifts are not closed and not counted.',
    );
  });

  it('tells the chart in words', () => {
    const table = weeksTable(weeks, METRICS.efficiency, TODAY);
    expect(chartSummary([table.total], table, METRICS.efficiency)).toBe(
      'loom efficiency, %, week by week. The shed: 80.0% in the week of 27 Apr, 50.0% in the week of 11 May, lowest 50.0% (11 May), highest 85.9% (4 May).',
    );
  });
});

describe('coverage', () => {
  const partly = { ...week(69_120), lines: 24, linesLeftOut: 19 };

  it('stands beside a figure from which lines are left out, in its cell and in the sentence', () => {
    expect(weekCell(partly, METRICS.efficiency).coverage).toBe('from 5 of 24 loom lines');
    const table = weeksTable({ ...weeks, total: [week(69_120), partly, null] }, METRICS.efficiency, TODAY);
    expect(shedSentence(table, METRICS.efficiency)).toContain(
      '80.0% (from 5 of 24 loom lines) in the week of 4 May',
    );
  });

  it('is not said where every line counts, or none', () => {
    expect(weekCell(week(69_120), METRICS.efficiency).coverage).toBe('');
    expect(weekCell(week(null), METRICS.efficiency).coverage).toBe('');
  });
});
