import type { EntityManager } from 'typeorm';
import { groupFiguresOfLines } from './group-of-lines.js';
import type { ProjectedLine } from './line-store.js';

/** What of a shift was signed: the shed's figures and each loom's totals. */
export function signedTotals(lines: readonly ProjectedLine[]): string {
  return JSON.stringify({
    group: groupFiguresOfLines(lines),
    lines: lines.map(({ line, totals }) => ({ loomId: line.loomId, totals })),
  });
}

/** The totals that a shift was last signed with, as they stand there; null: it never was. */
export async function lastSignedTotals(tx: EntityManager, shiftKey: string): Promise<string | null> {
  const [row] = await tx.query<{ totals: string }[]>(
    `SELECT "totals" FROM "signed_totals" WHERE "shiftKey" = ? ORDER BY "version" DESC LIMIT 1`,
    [shiftKey],
  );
  return row?.totals ?? null;
}

/** The looms of the sheet that was last signed, in its order. */
export async function signedLooms(tx: EntityManager, shiftKey: string): Promise<string[] | null> {
  const totals = await lastSignedTotals(tx, shiftKey);
  if (totals === null) return null;
  return (JSON.parse(totals) as { lines: { loomId: string }[] }).lines.map((one) => one.loomId);
}
