import type { EntityManager } from 'typeorm';
import type { HeldEntries } from '../../../shared/contract/shift-records.js';
import { loomsNamedBy } from '../../../shared/entries/entry.js';
import { entriesById, EntryWeb, type StoredEntry } from '../book/entry-store.js';
import { groupFiguresOfLines } from '../book/group-of-lines.js';
import { LineStore } from '../book/line-store.js';
import { readMillFacts, type MillFacts } from '../book/mill-facts.js';
import { Shifts } from '../book/which-shift.js';
import { heldEntryIds } from './held.js';
import { changedLine } from './line-sums.js';
import { recordedEntries } from './recorded-entries.js';
import type { Reports } from './report-reader.js';

/** What waits for a decision about a shift, and what each would change. Null: no such shift. */
export async function heldEntriesReport(
  from: EntityManager,
  { shiftKey, asOf }: Reports['heldEntries']['input'],
): Promise<HeldEntries | null> {
  const facts = await readMillFacts(from);
  const shifts = new Shifts(from);
  const shift = await shifts.named(shiftKey);
  if (!shift) return null;
  const held = await entriesById(from, await heldEntryIds(from, shiftKey));
  const web = new EntryWeb(from);
  await web.add(held);
  const targetOf = (one: StoredEntry) =>
    one.targetId === null ? null : (web.byId.get(one.targetId) ?? null);

  const store = new LineStore(from, facts, shifts);
  const ofShed = await store.loomsOf(shift);
  const source = await store.gather(shift, ofShed);
  const now = new Map(ofShed.map((loomId) => [loomId, source.project(loomId)]));
  const loomsOf = new Map(
    held.map((one) => [one.id, loomsAbout(one, web, facts).filter((id) => now.has(id))]),
  );
  const changes = (one: StoredEntry) =>
    (loomsOf.get(one.id) ?? []).flatMap((loomId) => {
      const before = now.get(loomId);
      if (!before) return [];
      const after = source.project(loomId, undefined, new Set([one.id]));
      return changedLine(facts, loomId, before.totals, after.totals);
    });
  const every = new Set(held.map((one) => one.id));
  const touched = new Set([...loomsOf.values()].flat());
  const accepted = [...now].map(([loomId, line]) =>
    touched.has(loomId) ? source.project(loomId, undefined, every) : line,
  );
  const recorded = await recordedEntries(from, [...held, ...held.flatMap((one) => targetOf(one) ?? [])]);
  const byId = new Map(recorded.map((one) => [String(one.entry['id']), one]));
  const [shed] = await from.query<{ name: string }[]>(`SELECT "name" FROM "shed" WHERE "id" = ?`, [
    shift.shedId,
  ]);
  return {
    asOf,
    shift,
    shedName: shed?.name ?? shift.shedId,
    entries: held.flatMap((one) => {
      const entry = byId.get(one.id);
      if (!entry) return [];
      const looms = (loomsOf.get(one.id) ?? []).map((loomId) => ({
        loomId,
        loomNumber: facts.looms.get(loomId)?.number ?? 0,
      }));
      return [{ ...entry, target: byId.get(targetOf(one)?.id ?? '') ?? null, looms, changes: changes(one) }];
    }),
    before: groupFiguresOfLines([...now.values()]),
    after: groupFiguresOfLines(accepted),
  };
}

/** The looms whose line an entry may change: those it names, and those of what it corrects or ends. */
function loomsAbout(one: StoredEntry, web: EntryWeb, facts: MillFacts): string[] {
  const looms = [...facts.looms.values()];
  const roots = [...web.rootsOf(one), ...(web.stopOf(one) ? [web.stopOf(one) as StoredEntry] : [])];
  const moved = one.entry.kind === 'amend' && one.entry.change.loomId ? [one.entry.change.loomId] : [];
  return [...new Set([...roots.flatMap((root) => loomsNamedBy(root.entry, looms)), ...moved])];
}
