import type { ErrorCode } from '../../shared/contract/errors.js';
import { WriterClosed } from './writer.js';

/** What a failing write means to who asked; null: nothing known. Nothing was acknowledged in any of these. */
export function codeOfDatabaseError(error: unknown): ErrorCode | null {
  if (error instanceof WriterClosed) return 'closing-down';
  if (!(error instanceof Error)) return null;
  const code = 'driverError' in error ? codeOf(error.driverError) : codeOf(error);
  if (code === 'SQLITE_FULL' || code === 'ENOSPC' || code === 'EDQUOT') return 'disk-full';
  if (/^SQLITE_(BUSY|LOCKED)/.test(code)) return 'busy';
  return null;
}

function codeOf(error: unknown): string {
  return error instanceof Error && 'code' in error ? String(error.code) : '';
}
