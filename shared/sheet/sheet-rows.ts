import type { ShiftSheet } from '../contract/reports.js';
import type { Figures, Rate } from '../entries/loom-line.js';
import { formatCount, formatPercent, formatRate } from '../figures/format.js';
import { isNoFigure, noFigureSentence, type Figure } from '../figures/no-figure.js';
import type { StripLine } from './strip-geometry.js';
import { stripLineOf } from './strip-line.js';
import { flagsInWords, type SaidFlag } from './flag-words.js';

/** A figure as a cell shows it. */
export interface Cell {
  readonly text: string;
  /** Why there is no figure: "the reading at the end is missing". Empty: there is one. */
  readonly why: string;
  /** Between readings a figure is the most that can be. */
  readonly atMost: boolean;
}

export interface RateCell extends Cell {
  /** "2.9–5.4": the 95% interval; where there is no rate, "3 breaks". Empty: neither. */
  readonly beneath: string;
}

/** The columns that a line and the totals share. */
export interface SheetFigures {
  readonly picks: Cell;
  readonly efficiency: Cell;
  readonly picksPerHour: Cell;
  readonly warp: RateCell;
  readonly weft: RateCell;
  /** Minutes lost: timed, by allowance, and what nobody logged. */
  readonly measured: Cell;
  readonly estimated: Cell;
  readonly unaccounted: Cell;
}

export interface SheetRow {
  readonly loomId: string;
  readonly loom: number;
  readonly cloth: string;
  readonly weaver: string;
  readonly figures: SheetFigures;
  readonly strip: StripLine;
  readonly flags: readonly SaidFlag[];
  readonly needsLook: boolean;
}

/** The sheet's lines as rows, those that need a look first, then as the looms are numbered. */
export function sheetRows(sheet: ShiftSheet): SheetRow[] {
  const runs = sheet.asOf < sheet.shift.endsAt;
  const rows = sheet.lines.map((one): SheetRow => {
    const flags = flagsInWords(one.line.flags, runs);
    return {
      loomId: one.line.loomId,
      loom: one.loomNumber,
      cloth: one.clothNames.join(', '),
      weaver: one.weaverNames.join(', '),
      figures: sheetFigures(one.figures, runs),
      strip: stripLineOf(one.line, runs ? sheet.asOf : null),
      flags,
      needsLook: flags.some((flag) => flag.look),
    };
  });
  return rows.sort((a, b) => Number(b.needsLook) - Number(a.needsLook) || a.loom - b.loom);
}

/** @param runs only while a shift runs is "at most" an answer; once it is over a missing reading is missing. */
export function sheetFigures(figures: Figures, runs: boolean): SheetFigures {
  const atMost = runs ? figures.atMost : null;
  return {
    picks: cell(figures.picks, formatCount, atMost?.picks),
    efficiency: cell(figures.efficiency, formatPercent, atMost?.efficiency),
    picksPerHour: cell(figures.picksPerHour, formatCount),
    warp: rateCell(figures.warp),
    weft: rateCell(figures.weft),
    measured: cell(figures.measuredMinutes, formatCount),
    estimated: cell(figures.estimatedMinutes, formatCount),
    unaccounted: cell(figures.unaccountedMinutes, formatCount),
  };
}

/** The shed's totals. Where every line is left out of them the sums are empty, which is not the same as none lost. */
export function totalFigures({
  total,
  asOf,
  shift,
}: Pick<ShiftSheet, 'total' | 'asOf' | 'shift'>): SheetFigures {
  const sums = sheetFigures(total.figures, asOf < shift.endsAt);
  if (total.linesLeftOut < total.lines) return sums;
  const none: Cell = { text: '–', why: 'no loom line counts yet', atMost: false };
  const noRate: RateCell = { ...none, beneath: '' };
  return { ...sums, warp: noRate, weft: noRate, measured: none, estimated: none };
}

/** The figure; where there is none yet, the most that it can be; else a dash and why. */
export function cell(figure: Figure, format: (value: number) => string, atMost?: Figure): Cell {
  if (!isNoFigure(figure)) return { text: format(figure), why: '', atMost: false };
  if (atMost !== undefined && !isNoFigure(atMost)) return { text: format(atMost), why: '', atMost: true };
  return { text: '–', why: noFigureSentence(figure), atMost: false };
}

export function rateCell(rate: Rate): RateCell {
  const shown = cell(rate.rate, formatRate);
  if (shown.why)
    return { ...shown, beneath: rate.count === 1 ? '1 break' : `${formatCount(rate.count)} breaks` };
  if (rate.low === null || rate.high === null) return { ...shown, beneath: '' };
  return { ...shown, beneath: `${formatRate(rate.low)}–${formatRate(rate.high)}` };
}

/** What was left out of the totals, and why: an honest total names what it lacks. */
export function leftOutWords(total: ShiftSheet['total']): string {
  if (total.linesLeftOut === 0) return '';
  const lines =
    total.linesLeftOut === 1 ? '1 loom line is left out' : `${total.linesLeftOut} loom lines are left out`;
  const agreed =
    total.agreedPicks > 0
      ? `; ${formatCount(total.agreedPicks)} agreed picks are paid but not in the ratios`
      : '';
  return `${lines} of the totals: a reading is missing or the picks were agreed${agreed}.`;
}
