import type { EntityManager } from 'typeorm';
import type { ShiftSheet } from '../../../shared/contract/reports.js';
import type { LoomLine } from '../../../shared/entries/loom-line.js';
import { lineFigures, lineTotals } from '../../../shared/figures/loom-line.js';
import type { ShedRow } from '../../database/entities/index.js';
import { list } from '../book/bulk.js';
import { countInterval, groupFiguresOfLines } from '../book/group-of-lines.js';
import { LineStore } from '../book/line-store.js';
import { readMillFacts, type MillFacts } from '../book/mill-facts.js';
import { Shifts } from '../book/which-shift.js';
import { heldOf } from './held.js';
import type { Reports } from './report-reader.js';

type SheetLine = ShiftSheet['lines'][number];

/** A shift's sheet as of a moment: a line for every loom that stood in the shed, logged or not. */
export async function sheetReport(
  from: EntityManager,
  { shiftKey, asOf }: Reports['sheet']['input'],
): Promise<ShiftSheet | null> {
  const facts = await readMillFacts(from);
  const shifts = new Shifts(from);
  const shift = await shifts.named(shiftKey);
  if (!shift) return null;
  const store = new LineStore(from, facts, shifts);
  const stored = await from.query<{ loomId: string; line: string }[]>(
    `SELECT "loomId", "line" FROM "loom_line" WHERE "shiftKey" = ?`,
    [shiftKey],
  );
  const lines = new Map(stored.map((row) => [row.loomId, JSON.parse(row.line) as LoomLine]));
  const missing = (await store.loomsOf(shift)).filter((loomId) => !lines.has(loomId));
  if (missing.length > 0) {
    const source = await store.gather(shift, missing);
    for (const loomId of missing) lines.set(loomId, source.project(loomId).line);
  }
  const all = [...lines.values()];
  const names = await weaverNames(from, all);
  const [shed] = await from.query<ShedRow[]>(`SELECT * FROM "shed" WHERE "id" = ?`, [shift.shedId]);
  return {
    asOf,
    shift,
    shedName: shed?.name ?? shift.shedId,
    lines: all.map((line) => sheetLine(line, asOf, facts, names)).sort(byPlace),
    total: groupFiguresOfLines(
      all.map((line) => ({ line, totals: lineTotals(line, asOf) })),
      asOf,
    ),
    held: (await heldOf(from, [shiftKey])).get(shiftKey) ?? 0,
    closed: shift.state === 'closed' ? await lastSigned(from, shiftKey) : null,
  };
}

function sheetLine(
  line: LoomLine,
  asOf: number,
  facts: MillFacts,
  names: ReadonlyMap<string, string>,
): SheetLine {
  const loom = facts.looms.get(line.loomId);
  const cloths = new Set(line.stretches.flatMap((one) => one.clothId ?? []));
  const weavers = new Set(line.stretches.flatMap((one) => one.weaverId ?? []));
  return {
    loomNumber: loom?.number ?? 0,
    row: loom?.row ?? 0,
    position: loom?.position ?? 0,
    clothNames: [...cloths].map((id) => facts.cloths.get(id)?.name ?? id),
    weaverNames: [...weavers].map((id) => names.get(id) ?? id),
    line,
    figures: lineFigures(line, asOf, countInterval(1)),
  };
}

const byPlace = (a: SheetLine, b: SheetLine) =>
  a.row - b.row || a.position - b.position || a.loomNumber - b.loomNumber;

async function weaverNames(
  from: EntityManager,
  lines: readonly LoomLine[],
): Promise<ReadonlyMap<string, string>> {
  const ids = new Set(lines.flatMap((line) => line.stretches.flatMap((one) => one.weaverId ?? [])));
  const rows = await from.query<{ id: string; name: string }[]>(
    `SELECT "id", "name" FROM "person" WHERE "id" IN (SELECT value FROM json_each(?))`,
    [list(ids)],
  );
  return new Map(rows.map((row) => [row.id, row.name]));
}

async function lastSigned(from: EntityManager, shiftKey: string): Promise<ShiftSheet['closed']> {
  const [row] = await from.query<{ at: number; by: string; version: number }[]>(
    `SELECT t."at", COALESCE(p."name", t."by") AS "by", t."version" FROM "signed_totals" t
       LEFT JOIN "person" p ON p."id" = t."by" WHERE t."shiftKey" = ? ORDER BY t."version" DESC LIMIT 1`,
    [shiftKey],
  );
  return row ?? null;
}
