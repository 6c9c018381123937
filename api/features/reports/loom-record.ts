import type { EntityManager } from 'typeorm';
import type { LoomRecord } from '../../../shared/contract/shift-records.js';
import type { LoomLine } from '../../../shared/entries/loom-line.js';
import { entriesById, entriesBySeq, EntryWeb } from '../book/entry-store.js';
import { recordedEntries } from './recorded-entries.js';
import type { Reports } from './report-reader.js';
import { sheetReport } from './sheet-report.js';

/** One loom line with all that was ever said of it. Null: no such shift, or the loom has no line in it. */
export async function loomRecord(
  from: EntityManager,
  { shiftKey, loomId, asOf }: Reports['loomRecord']['input'],
): Promise<LoomRecord | null> {
  const sheet = await sheetReport(from, { shiftKey, asOf });
  if (!sheet) return null;
  const order = [...sheet.lines].sort((a, b) => a.loomNumber - b.loomNumber);
  const place = order.findIndex((one) => one.line.loomId === loomId);
  const own = order[place];
  if (!own) return null;
  const beside = (index: number) => {
    const other = order[index];
    return other ? { loomId: other.line.loomId, loomNumber: other.loomNumber } : null;
  };
  return {
    asOf,
    shift: sheet.shift,
    shedName: sheet.shedName,
    loomId,
    loomNumber: own.loomNumber,
    before: beside(place - 1),
    after: beside(place + 1),
    clothNames: own.clothNames,
    weaverNames: own.weaverNames,
    line: own.line,
    figures: own.figures,
    entries: await recordedEntries(from, await entriesOf(from, shiftKey, own.line)),
  };
}

/** What names the loom in this shift, what of other shifts its line uses, and all that corrects, ends or decides those. */
async function entriesOf(from: EntityManager, shiftKey: string, line: LoomLine) {
  const rows = await from.query<{ seq: number }[]>(
    `SELECT "seq" FROM "entry_loom" WHERE "loomId" = ? AND "shiftKey" = ?`,
    [line.loomId, shiftKey],
  );
  const used = [...line.stops, ...line.readings].map((one) => one.id);
  const roots = [
    ...(await entriesBySeq(
      from,
      rows.map((row) => row.seq),
    )),
    ...(await entriesById(from, new Set(used))),
  ];
  const web = new EntryWeb(from);
  await web.add(roots);
  return web.reach(roots).sort((a, b) => a.at - b.at || a.seq - b.seq);
}
