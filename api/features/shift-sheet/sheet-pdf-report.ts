import type { EntityManager } from 'typeorm';
import type { Reports } from '../reports/report-reader.js';
import { sheetReport } from '../reports/sheet-report.js';
import { makePdf } from './pdf.js';
import { sheetDocument } from './sheet-document.js';

/** The shift's sheet as a PDF, with the same figures and words as the screen's. */
export async function sheetPdfReport(
  from: EntityManager,
  input: Reports['sheetPdf']['input'],
): Promise<Uint8Array | null> {
  const sheet = await sheetReport(from, input);
  if (!sheet) return null;
  const [mill] = await from.query<{ name: string; timeZone: string }[]>(
    `SELECT "name", "timeZone" FROM "mill" WHERE "id" = 1`,
  );
  return makePdf(
    sheetDocument(sheet, {
      millName: mill?.name ?? '',
      timeZone: mill?.timeZone ?? 'UTC',
      note: sheet.closed ? await closingWords(from, input.shiftKey) : '',
    }),
  );
}

/** What was said at the last closing. */
async function closingWords(from: EntityManager, shiftKey: string): Promise<string> {
  const [row] = await from.query<{ note: string | null }[]>(
    `SELECT json_extract("body", '$.note') AS "note" FROM "entry"
      WHERE "kind" = 'close' AND "shiftKey" = ? ORDER BY "seq" DESC LIMIT 1`,
    [shiftKey],
  );
  return row?.note ?? '';
}
