import type { EntityManager } from 'typeorm';
import type { SignedVersions } from '../../../shared/contract/shift-records.js';
import type { Entry } from '../../../shared/entries/entry.js';
import type { GroupFigures, LineTotals } from '../../../shared/entries/loom-line.js';
import { entriesById, type EntryRecordRow, storedEntry } from '../book/entry-store.js';
import { list } from '../book/bulk.js';
import { RECALCULATED } from '../book/restated-shift.js';
import { readMillFacts } from '../book/mill-facts.js';
import { Shifts } from '../book/which-shift.js';
import { changedLine } from './line-sums.js';
import type { Reports } from './report-reader.js';

interface SignedRow {
  version: number;
  at: number;
  by: string;
  entryId: string;
  totals: string;
}

interface Totals {
  group: GroupFigures;
  lines: { loomId: string; totals: LineTotals }[];
}

/** Every signed version of a shift, each with what it changed. Null: no such shift. */
export async function signedVersionsReport(
  from: EntityManager,
  { shiftKey }: Reports['signedVersions']['input'],
): Promise<SignedVersions | null> {
  const shift = await new Shifts(from).named(shiftKey);
  if (!shift) return null;
  const facts = await readMillFacts(from);
  const rows = await from.query<SignedRow[]>(
    `SELECT t."version", t."at", COALESCE(p."name", t."by") AS "by", t."entryId", t."totals"
       FROM "signed_totals" t LEFT JOIN "person" p ON p."id" = t."by"
      WHERE t."shiftKey" = ? ORDER BY t."version"`,
    [shiftKey],
  );
  const signers = await entriesById(
    from,
    rows.map((row) => row.entryId),
  );
  const signerOf = new Map(signers.map((one) => [one.id, one.entry]));
  const commands = await recalculations(from, rows);
  let last = new Map<string, LineTotals>();
  return {
    shift,
    versions: rows.map((row) => {
      const { group, lines } = JSON.parse(row.totals) as Totals;
      const signer = signerOf.get(row.entryId);
      const changed = lines.flatMap(({ loomId, totals }) => {
        const before = last.get(loomId);
        return before ? changedLine(facts, loomId, before, totals) : [];
      });
      last = new Map(lines.map(({ loomId, totals }) => [loomId, totals]));
      return {
        version: row.version,
        at: row.at,
        by: row.by,
        ...(commands.get(row.entryId) ?? signedBy(signer)),
        group,
        changed,
      };
    }),
    reopened: await reopenings(from, shiftKey),
  };
}

type Signature = Pick<SignedVersions['versions'][number], 'how' | 'words'>;

function signedBy(signer: Entry | undefined): Signature {
  if (signer?.kind === 'accept') return { how: 'accept', words: signer.reason };
  return { how: 'close', words: signer?.kind === 'close' ? (signer.note ?? null) : null };
}

/** Versions that a command of set-up signed, by what they name in place of an entry. */
async function recalculations(
  from: EntityManager,
  rows: readonly SignedRow[],
): Promise<ReadonlyMap<string, Signature>> {
  const named = rows.map((row) => row.entryId).filter((id) => id.startsWith(RECALCULATED));
  const commands = await from.query<{ seq: number; reason: string | null }[]>(
    `SELECT "seq", "reason" FROM "recorded_change" WHERE "seq" IN (SELECT value FROM json_each(?))`,
    [list(named.map((id) => Number(id.slice(RECALCULATED.length))))],
  );
  return new Map(
    commands.map(({ seq, reason }) => [`${RECALCULATED}${seq}`, { how: 'recalculate', words: reason }]),
  );
}

async function reopenings(from: EntityManager, shiftKey: string): Promise<SignedVersions['reopened']> {
  const rows = await from.query<(EntryRecordRow & { name: string })[]>(
    `SELECT e.*, COALESCE(p."name", e."by") AS "name" FROM "entry" e LEFT JOIN "person" p ON p."id" = e."by"
      WHERE e."shiftKey" = ? AND e."kind" = 'reopen'
        AND NOT EXISTS (SELECT 1 FROM "entry_hold" h WHERE h."entryId" = e."id" AND h."state" <> 'accepted')
      ORDER BY e."at", e."seq"`,
    [shiftKey],
  );
  return rows.flatMap((row) => {
    const { entry } = storedEntry(row);
    return entry.kind === 'reopen' ? [{ at: row.at, by: row.name, reason: entry.reason }] : [];
  });
}
