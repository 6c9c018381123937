import type { Column, Content, TableCell, TDocumentDefinitions } from 'pdfmake/interfaces.js';
import type { ShiftSheet } from '../../../shared/contract/reports.js';
import { MARK_KINDS, MARK_WORDS, type MarkKind } from '../../../shared/sheet/mark-kind.js';
import {
  leftOutWords,
  sheetRows,
  totalFigures,
  type Cell,
  type RateCell,
  type SheetFigures,
  type SheetRow,
} from '../../../shared/sheet/sheet-rows.js';
import {
  sheetMoment,
  sheetStateWords,
  sheetTitle,
  sheetTotalWords,
  sheetTime,
} from '../../../shared/sheet/sheet-words.js';
import { stripSvg } from '../../../shared/sheet/strip-svg.js';

/** A4 landscape, points; what is left for the strip once the figures have theirs. */
const STRIP = { width: 196, height: 11 };
const WIDTHS = [30, 116, 50, 52, 44, 52, 52, 38, 46, 46, STRIP.width];
const SMALL = 7;
/** Figures of one width, so that they stand beneath each other. */
const TABULAR = { fontFeatures: ['tnum' as const] };

/** What a sheet is printed with, beside the sheet itself. */
export interface SheetPrint {
  readonly millName: string;
  readonly timeZone: string;
  /** The words that the shift was closed with; empty: none. */
  readonly note: string;
}

/** The shift's sheet as a document to print: A4 landscape, black on white, no row cut, heads on every page. */
export function sheetDocument(
  sheet: ShiftSheet,
  { millName, timeZone, note }: SheetPrint,
): TDocumentDefinitions {
  const title = sheetTitle(sheet, timeZone);
  const rows = sheetRows(sheet);
  const hours = `${sheetTime(sheet.shift.startsAt, timeZone)} to ${sheetTime(sheet.shift.endsAt, timeZone)}`;
  return {
    pageSize: 'A4',
    pageOrientation: 'landscape',
    pageMargins: [24, 26, 24, 34],
    info: { title, author: millName, creationDate: new Date(sheet.asOf) },
    defaultStyle: { font: 'Atkinson', fontSize: 8.5, lineHeight: 1.05 },
    footer: (page, pages) => ({
      columns: [
        { text: `${millName} · ${title}`, fontSize: SMALL },
        {
          text: `printed of ${sheetMoment(sheet.asOf, timeZone)} · page ${page} of ${pages}`,
          alignment: 'right',
          fontSize: SMALL,
        },
      ],
      margin: [24, 10, 24, 0],
    }),
    content: [
      { text: title, fontSize: 14, bold: true },
      { text: sheetTotalWords(sheet), fontSize: 10, margin: [0, 2, 0, 0] },
      { text: sheetStateWords(sheet, timeZone), margin: [0, 1, 0, note ? 1 : 6] },
      ...(note ? [{ text: `Handover: “${note}”`, margin: [0, 0, 0, 6] } satisfies Content] : []),
      {
        table: {
          headerRows: 2,
          dontBreakRows: true,
          keepWithHeaderRows: 1,
          widths: WIDTHS,
          body: [...heads(hours), ...rows.map(rowCells), totalCells(totalFigures(sheet))],
        },
        layout: {
          hLineWidth: (line, { table }) =>
            line === 2 || line === table.body.length - 1 ? 1 : line === 1 ? 0 : 0.3,
          vLineWidth: () => 0,
          paddingLeft: () => 3,
          paddingRight: () => 3,
          paddingTop: () => 2,
          paddingBottom: () => 2,
        },
      },
      ...(leftOutWords(sheet.total)
        ? [{ text: leftOutWords(sheet.total), margin: [0, 4, 0, 0] } satisfies Content]
        : []),
      legend(),
    ],
  };
}

function heads(hours: string): TableCell[][] {
  const head = (text: Content, more: object = {}): TableCell => ({ text, bold: true, ...more });
  const number = { alignment: 'right' };
  const tall = { rowSpan: 2 };
  const group = { colSpan: 2, alignment: 'center' };
  return [
    [
      head('Loom', tall),
      head('Cloth, weaver', tall),
      head('Picks', { ...tall, ...number }),
      head('Efficiency', { ...tall, ...number }),
      head('Picks an hour', { ...tall, ...number }),
      // The font has no raised five of its own.
      head(['Breaks per 10', { text: '5', sup: true }, ' picks'], group),
      {},
      head('Minutes lost', { ...group, colSpan: 3 }),
      {},
      {},
      head(`The shift, ${hours}`, tall),
    ],
    [
      {},
      {},
      {},
      {},
      {},
      head('warp', number),
      head('weft', number),
      head('timed', number),
      head('estimated', number),
      head('not logged', number),
      {},
    ],
  ];
}

function rowCells(row: SheetRow): TableCell[] {
  const flags = row.flags.map(({ words }) => words).join(' · ');
  return [
    { text: String(row.loom), bold: true, fontSize: 10 },
    { stack: [row.cloth || 'no cloth', { text: row.weaver || 'no weaver', fontSize: SMALL }] },
    ...figureCells(row.figures),
    {
      stack: [
        { svg: stripSvg(row.strip, STRIP.width - 6, STRIP.height), width: STRIP.width - 6 },
        ...(flags ? [{ text: flags, fontSize: SMALL, bold: row.needsLook }] : []),
      ],
    },
  ];
}

function totalCells(sums: SheetFigures): TableCell[] {
  return [
    { text: 'The shed', bold: true, colSpan: 2 },
    {},
    ...figureCells(sums),
    { text: 'picks an hour: a loom’s; minutes: all looms together', fontSize: SMALL },
  ];
}

function figureCells(figures: SheetFigures): TableCell[] {
  const { picks, efficiency, picksPerHour, warp, weft, measured, estimated, unaccounted } = figures;
  return [
    figureCell(picks),
    figureCell(efficiency, true),
    figureCell(picksPerHour),
    figureCell(warp),
    figureCell(weft),
    figureCell(measured),
    figureCell(estimated),
    figureCell(unaccounted),
  ];
}

/** The figure, its interval beneath; where there is none a dash. */
function figureCell(cell: Cell | RateCell, bold = false): TableCell {
  const beneath = 'beneath' in cell ? cell.beneath : '';
  return {
    alignment: 'right',
    stack: [
      ...(cell.atMost ? [{ text: 'at most', fontSize: SMALL }] : []),
      { text: cell.text, bold, noWrap: true, ...TABULAR },
      ...(beneath ? [{ text: beneath, fontSize: SMALL, noWrap: true, ...TABULAR }] : []),
    ],
  };
}

/** The marks, each as a strip with one stop of it. */
function legend(): Content {
  const item = (mark: MarkKind | null, words: string): Column => {
    const stops = mark === null ? [] : [{ from: 0, until: 100, mark, estimated: false }];
    const svg = stripSvg({ startsAt: 0, endsAt: 100, now: null, stops }, 24, 9);
    const said: Column = { text: words, fontSize: SMALL, width: 'auto', margin: [0, 2, 8, 0] };
    return { columns: [{ svg, width: 24 }, said], columnGap: 4, width: 'auto' };
  };
  return {
    columns: [item(null, 'woven'), ...MARK_KINDS.map((mark) => item(mark, MARK_WORDS[mark]))],
    columnGap: 4,
    margin: [0, 8, 0, 0],
  };
}
