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
      note: await handoverWords(from, input.shiftKey),
    }),
  );
}

/** The foreman's last words to the next one: a handover note, or what was said at the closing. */
async function handoverWords(from: EntityManager, shiftKey: string): Promise<string> {
  const rows = await from.query<{ id: string; words: string | null }[]>(
    `SELECT "id", COALESCE(json_extract("body", '$.note'), json_extract("body", '$.text')) AS "words" FROM "entry"
      WHERE "shiftKey" = ? AND ("kind" = 'close' OR ("kind" = 'note' AND json_extract("body", '$.about') = 'handover'))
        AND NOT EXISTS (SELECT 1 FROM "entry" v WHERE v."kind" = 'void' AND v."targetId" = "entry"."id")
      ORDER BY "seq" DESC`,
    [shiftKey],
  );
  return rows.find(({ words }) => words !== null && words !== '')?.words ?? '';
}
