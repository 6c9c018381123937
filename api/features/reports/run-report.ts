import type { EntityManager } from 'typeorm';
import { loomHistory } from '../calls/loom-history.js';
import { tacklerAhead } from '../calls/tackler-ahead.js';
import { heldEntriesReport } from './held-entries.js';
import { loomRecord } from './loom-record.js';
import type { Reports } from './report-reader.js';
import { sheetPdfReport } from '../shift-sheet/sheet-pdf-report.js';
import { sheetReport } from './sheet-report.js';
import { shiftsReport } from './shifts-report.js';
import { signedVersionsReport } from './signed-versions.js';
import { usualReport } from './usual-report.js';
import { weeksReport } from './weeks-report.js';

type Run = {
  [R in keyof Reports]: (from: EntityManager, input: Reports[R]['input']) => Promise<Reports[R]['answer']>;
};

/** Every report, by its name. */
export const REPORTS: Run = {
  shifts: shiftsReport,
  sheet: sheetReport,
  sheetPdf: sheetPdfReport,
  loomRecord,
  heldEntries: heldEntriesReport,
  signedVersions: signedVersionsReport,
  loomHistory,
  tacklerAhead,
  usual: usualReport,
  weeks: weeksReport,
};

export function runReport<R extends keyof Reports>(
  from: EntityManager,
  report: R,
  input: Reports[R]['input'],
): Promise<Reports[R]['answer']> {
  return REPORTS[report](from, input);
}
