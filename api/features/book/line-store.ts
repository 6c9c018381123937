import type { EntityManager } from 'typeorm';
import type { Fitting, Loom, Shift } from '../../../shared/contract/reference.js';
import { resolveFittings } from '../../../shared/entries/fittings.js';
import type { LineTotals, LoomLine } from '../../../shared/entries/loom-line.js';
import { projectLine } from '../../../shared/entries/projection.js';
import { lineTotals } from '../../../shared/figures/loom-line.js';
import type { FittingRow } from '../../database/entities/index.js';
import { insertRows, list, push } from './bulk.js';
import { entriesBySeq, entriesById, EntryWeb, type StoredEntry } from './entry-store.js';
import { loomsInShed, type MillFacts } from './mill-facts.js';
import { LINE_COLUMNS, lineRow } from './line-row.js';
import type { Shifts } from './which-shift.js';
import { keptVersions } from './kept-versions.js';
import { signedLooms } from './signed-totals.js';

export interface ProjectedLine {
  readonly loom: Loom;
  readonly line: LoomLine;
  /** As of the shift's end. */
  readonly totals: LineTotals;
}

/** One shift's entries in memory, from which its lines are projected. */
export interface LineSource {
  readonly shift: Shift;
  /**
   * `leaveOut`: entries to do without, beside those that are held or refused for this shift; `accepted`: held ones
   * that are to count all the same, to see what they would change.
   */
  project(loomId: string, leaveOut?: ReadonlySet<string>, accepted?: ReadonlySet<string>): ProjectedLine;
}

export interface GatherOptions {
  /** Projections without some of these entries will be asked for. */
  readonly mayLeaveOut?: readonly string[];
  /** Take all versions, whatever an earlier closing kept: the shift is being closed now. */
  readonly fresh?: boolean;
}

/** Gathers what the projection of lines needs from the tables, and writes what it makes. */
export class LineStore {
  private readonly withLines = new Set<string>();

  constructor(
    private readonly tx: EntityManager,
    private readonly facts: MillFacts,
    private readonly shifts: Shifts,
  ) {}

  /** Whether a shift has lines: it has them for all looms of its shed from the first entry that touches it. */
  async hasLines(shiftKey: string): Promise<boolean> {
    if (this.withLines.has(shiftKey)) return true;
    const rows = await this.tx.query<unknown[]>(`SELECT 1 FROM "loom_line" WHERE "shiftKey" = ? LIMIT 1`, [
      shiftKey,
    ]);
    if (rows.length > 0) this.withLines.add(shiftKey);
    return rows.length > 0;
  }

  /**
   * The looms that a shift's sheet shows, in its order: an open one's are all that stood in the shed during it, a
   * closed one's those that were signed, whatever has been set up since.
   */
  async loomsOf(shift: Shift): Promise<string[]> {
    const signed = shift.state === 'closed' ? await signedLooms(this.tx, shift.key) : null;
    return signed ?? this.loomsNow(shift);
  }

  /** The looms that stood in the shed during a shift, by what is set up now. */
  loomsNow(shift: Shift): string[] {
    return loomsInShed(this.facts, shift.shedId, shift.startsAt, shift.endsAt).map((loom) => loom.id);
  }

  /** Takes away the lines of looms that a shift shows no more. */
  async dropOthers(shift: Shift, shown: Iterable<string>): Promise<void> {
    const { tx } = this;
    await tx.query(
      `DELETE FROM "loom_line" WHERE "shiftKey" = ? AND "loomId" NOT IN (SELECT value FROM json_each(?))`,
      [shift.key, list(shown)],
    );
  }

  /** Projects lines and writes them. */
  async write(
    shift: Shift,
    loomIds: Iterable<string>,
    options: GatherOptions = {},
  ): Promise<ProjectedLine[]> {
    const looms = [...loomIds];
    if (looms.length === 0) return [];
    const source = await this.gather(shift, looms, options);
    const lines = looms.map((loomId) => source.project(loomId));
    await insertRows(this.tx, 'loom_line', LINE_COLUMNS, lines.map(lineRow), 'INSERT OR REPLACE');
    return lines;
  }

  async gather(
    shift: Shift,
    loomIds: readonly string[],
    { mayLeaveOut = [], fresh = false }: GatherOptions = {},
  ): Promise<LineSource> {
    const before = await this.shifts.beforeOf(shift);
    const after = await this.shifts.afterOf(shift);
    const previous = before?.endsAt === shift.startsAt ? before : null;
    const next = after?.startsAt === shift.endsAt ? after : null;
    const register = this.hasRegister(loomIds) ? await this.shifts.lastOfPattern(shift) : null;
    const web = new EntryWeb(this.tx);
    const neighbours = new Set([before, after, register].flatMap((one) => one?.key ?? []));
    const ownOf = await this.ownEntries(shift, loomIds, neighbours, web);
    const held = await this.heldFor(shift, web);
    const fittings = await this.fittingsFor(shift, loomIds, held.ofShift, mayLeaveOut);
    const versions = await keptVersions(this.tx, this.facts, shift, fresh);
    return {
      shift,
      project: (loomId, leaveOut, accepted) => {
        const loom = this.facts.looms.get(loomId);
        if (!loom) throw new Error(`No loom ${loomId}.`);
        const reached = web.reach(ownOf.get(loomId) ?? []);
        const entries = reached.filter(
          (one) => (accepted?.has(one.id) || !held.ids.has(one.id)) && !leaveOut?.has(one.id),
        );
        const line = projectLine({
          shift,
          previous,
          next,
          loomId,
          looms: [...this.facts.looms.values()].filter((one) => one.shedId === shift.shedId),
          entries,
          loomVersions: versions.loomVersions.get(loomId) ?? [],
          clothVersions: versions.clothVersions,
          causeVersions: versions.causeVersions,
          fittings: fittings(leaveOut).get(loomId) ?? [],
        });
        return { loom, line, totals: lineTotals(line, shift.endsAt) };
      },
    };
  }

  private hasRegister(loomIds: readonly string[]): boolean {
    const looms = new Set(loomIds);
    return this.facts.loomVersions.some(
      (one) => one.clock.kind === 'register-a-shift' && looms.has(one.loomId),
    );
  }

  /** Entries of each loom: what belongs to the shift, timed stops that reach into it, its neighbours' readings. */
  private async ownEntries(
    shift: Shift,
    loomIds: readonly string[],
    neighbours: Iterable<string>,
    web: EntryWeb,
  ): Promise<Map<string, StoredEntry[]>> {
    type Found = { loomId: string; seq: number };
    const looms = list(loomIds);
    const found = await this.tx.query<Found[]>(
      `SELECT "loomId", "seq" FROM "entry_loom"
        WHERE "loomId" IN (SELECT value FROM json_each(?)) AND "shiftKey" = ?`,
      [looms, shift.key],
    );
    for (const key of neighbours)
      found.push(
        ...(await this.tx.query<Found[]>(
          `SELECT l."loomId", l."seq" FROM "entry_loom" l JOIN "entry" e ON e."seq" = l."seq"
              WHERE l."loomId" IN (SELECT value FROM json_each(?)) AND l."shiftKey" = ?
                AND e."kind" IN ('reading', 'decide', 'sheet')`,
          [looms, key],
        )),
      );
    const stands = await this.tx.query<{ stopId: string; loomId: string }[]>(
      `SELECT "stopId", "loomId" FROM "stand" WHERE "loomId" IN (SELECT value FROM json_each(?))
        AND ("until" IS NULL OR "until" >= ?) AND "from" < ?`,
      [looms, shift.startsAt, shift.endsAt],
    );
    await web.add(await entriesBySeq(this.tx, new Set(found.map((one) => one.seq))));
    const stopIds = new Set(stands.map((one) => one.stopId).filter((id) => !web.byId.has(id)));
    if (stopIds.size > 0) await web.add(await entriesById(this.tx, stopIds));
    const bySeq = new Map([...web.byId.values()].map((one) => [one.seq, one]));
    const ownOf = new Map<string, StoredEntry[]>();
    for (const { loomId, seq } of found) {
      const entry = bySeq.get(seq);
      if (entry) push(ownOf, loomId, entry);
    }
    for (const { loomId, stopId } of stands) {
      const entry = web.byId.get(stopId);
      if (entry) push(ownOf, loomId, entry);
    }
    return ownOf;
  }

  /** Entries that do not count in this shift: held or refused for it, or altogether. */
  private async heldFor(shift: Shift, web: EntryWeb): Promise<{ ids: Set<string>; ofShift: string[] }> {
    const ofShift = await this.tx.query<{ entryId: string }[]>(
      `SELECT "entryId" FROM "entry_hold" WHERE "shiftKey" = ? AND "state" IN ('held', 'refused')`,
      [shift.key],
    );
    const altogether = await this.tx.query<{ entryId: string }[]>(
      `SELECT "entryId" FROM "entry_hold" WHERE "entryId" IN (SELECT value FROM json_each(?))
        AND "shiftKey" = '*' AND "state" IN ('held', 'refused')`,
      [list(web.byId.keys())],
    );
    return {
      ids: new Set([...ofShift, ...altogether].map((one) => one.entryId)),
      ofShift: ofShift.map((one) => one.entryId),
    };
  }

  /**
   * What is on the looms, as this shift sees it. Mostly the read model; where a warp change (or a correction of one)
   * is held for this shift, or is to be left out, from the entries without it.
   */
  private async fittingsFor(
    shift: Shift,
    loomIds: readonly string[],
    heldForShift: readonly string[],
    mayLeaveOut: readonly string[],
  ): Promise<(leaveOut?: ReadonlySet<string>) => Map<string, Fitting[]>> {
    const rows = await this.tx.query<FittingRow[]>(
      `SELECT * FROM "fitting" WHERE "loomId" IN (SELECT value FROM json_each(?))`,
      [list(loomIds)],
    );
    const all = new Map<string, Fitting[]>();
    for (const row of rows) push(all, row.loomId, { ...row });
    if (!(await areAboutWarps(this.tx, [...heldForShift, ...mayLeaveOut]))) return () => all;
    const warpChanges = await warpChangeWeb(this.tx, loomIds);
    const held = await warpChangeHolds(this.tx, warpChanges.keys());
    const heldHere = new Set(heldForShift);
    const without = (leaveOut?: ReadonlySet<string>) => {
      const out = (id: string) => held.has(id) || heldHere.has(id) || (leaveOut?.has(id) ?? false);
      const byLoom = new Map<string, Fitting[]>();
      const counted = [...warpChanges.values()].filter((one) => !out(one.id));
      for (const fitting of resolveFittings(counted)) push(byLoom, fitting.loomId, fitting);
      return byLoom;
    };
    const concerns = (ids: Iterable<string>) => [...ids].some((id) => warpChanges.has(id));
    const here = concerns(heldHere) ? without() : all;
    return (leaveOut) => (leaveOut && concerns(leaveOut) ? without(leaveOut) : here);
  }
}

/** All warp changes of the looms' sheds, with their corrections: an amendment may have moved one to another loom. */
export async function warpChangeWeb(
  tx: EntityManager,
  loomIds: readonly string[],
): Promise<ReadonlyMap<string, StoredEntry>> {
  const found = await tx.query<{ seq: number }[]>(
    `SELECT "seq" FROM "entry" WHERE "kind" = 'warp-change'
      AND "shedId" IN (SELECT "shedId" FROM "loom" WHERE "id" IN (SELECT value FROM json_each(?)))`,
    [list(loomIds)],
  );
  const web = new EntryWeb(tx);
  await web.add(
    await entriesBySeq(
      tx,
      found.map((one) => one.seq),
    ),
  );
  return web.byId;
}

/** Whether any of these entries is a warp change, or corrects one. */
async function areAboutWarps(tx: EntityManager, ids: readonly string[]): Promise<boolean> {
  if (ids.length === 0) return false;
  const web = new EntryWeb(tx);
  const entries = await entriesById(tx, ids);
  await web.add(entries);
  return entries.some((one) => web.rootsOf(one).some((root) => root.kind === 'warp-change'));
}

async function warpChangeHolds(tx: EntityManager, ids: Iterable<string>): Promise<ReadonlySet<string>> {
  const rows = await tx.query<{ entryId: string }[]>(
    `SELECT "entryId" FROM "entry_hold" WHERE "entryId" IN (SELECT value FROM json_each(?))
      AND "shiftKey" = '*' AND "state" IN ('held', 'refused')`,
    [list(ids)],
  );
  return new Set(rows.map((row) => row.entryId));
}
