import { poissonInterval } from '@shared/chance/poisson-interval';
import type { ShiftSheet } from '@shared/contract/reports';
import type { BookEntry } from '@shared/entries/entry';
import { projectLine } from '@shared/entries/projection';
import { lineFigures, lineTotals, whyNoPicks } from '@shared/figures/loom-line';
import { groupFigures } from '@shared/figures/totals';
import { aLineInput, aShift, at, entryBuilder, LOOM_ID, WEAVER_ID } from '@shared/testing/builders';

const interval = (count: number) => poissonInterval(count);

/** Entries of the sheet's three looms: whole; without an end reading; with with nothing at all. */
export function sheetEntries(): readonly (readonly BookEntry[])[] {
  const { book } = entryBuilder();
  const minded = () => book('assign', 0, { weaverId: WEAVER_ID, loomIds: [LOOM_ID] });
  return [
    [
      minded(),
      book('reading', 0, { boundary: 'start', value: 1_000 }),
      book('stop', 60, { cause: 'warp-break', count: 3 }),
      book('stop', 200, { cause: 'weft-break', count: 2, until: at(250) }),
      book('reading', 480, { boundary: 'end', value: 75_250 }),
    ],
    [
      minded(),
      book('reading', 0, { boundary: 'start', value: 500 }),
      book('stop', 90, { cause: 'warp-break', count: 1 }),
    ],
    [],
  ];
}

/** A sheet as the server makes it, by the same arithmetic. `asOf`: minutes after the shift begins. */
export function aSheet(asOfMinutes = 600, looms = sheetEntries()): ShiftSheet {
  const asOf = at(asOfMinutes);
  const lines = looms.map((entries) => projectLine(aLineInput({ entries })));
  return {
    asOf,
    shift: aShift(),
    shedName: 'Long shed',
    lines: lines.map((line, index) => ({
      loomNumber: index + 1,
      row: 1,
      position: index + 1,
      clothNames: ['Glebe 42'],
      weaverNames: index === 2 ? [] : ['Nuala Doran'],
      line,
      figures: lineFigures(line, asOf, interval),
    })),
    total: groupFigures(
      lines.map((line) => ({
        totals: lineTotals(line, asOf),
        picksBy: line.picksBy,
        why: whyNoPicks(line, asOf),
      })),
      { interval, asOf },
    ),
    held: 0,
    closed: null,
  };
}
