import type * as z from 'zod/mini';
import type { LoomHistory, TacklerAhead } from '../../../shared/contract/calls.js';
import type { Usual } from '../../../shared/contract/usual.js';
import type { HeldEntries, LoomRecord, SignedVersions } from '../../../shared/contract/shift-records.js';
import type {
  shiftListQuerySchema,
  ShiftList,
  ShiftSheet,
  Weeks,
  weeksQuerySchema,
} from '../../../shared/contract/reports.js';

/** The heavy reads, each with its input and answer. They run in a worker thread on a read-only connection. */
export interface Reports {
  shifts: { input: z.infer<typeof shiftListQuerySchema>; answer: ShiftList };
  /** Null: no such shift. */
  sheet: { input: { shiftKey: string; asOf: number }; answer: ShiftSheet | null };
  /** The same as an A4 page to print. Null: no such shift. */
  sheetPdf: { input: { shiftKey: string; asOf: number }; answer: Uint8Array | null };
  /** Null: no such shift, or no such loom in it. */
  loomRecord: { input: { shiftKey: string; loomId: string; asOf: number }; answer: LoomRecord | null };
  /** Null: no such shift. */
  heldEntries: { input: { shiftKey: string; asOf: number }; answer: HeldEntries | null };
  /** Null: no such shift. */
  signedVersions: { input: { shiftKey: string }; answer: SignedVersions | null };
  /** Null: no such loom. `names`: whether the asker may see who repaired. */
  loomHistory: { input: { loomId: string; asOf: number; names: boolean }; answer: LoomHistory | null };
  tacklerAhead: { input: { shedId: string; asOf: number }; answer: TacklerAhead };
  usual: { input: { shedId: string; asOf: number }; answer: Usual };
  weeks: { input: z.infer<typeof weeksQuerySchema>; answer: Weeks };
}

export interface ReportReader {
  run<R extends keyof Reports>(report: R, input: Reports[R]['input']): Promise<Reports[R]['answer']>;
  close(): Promise<void>;
}
