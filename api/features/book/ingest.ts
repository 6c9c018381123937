import type { EntityManager } from 'typeorm';
import { HOLD_REASONS, type HoldReason } from '../../../shared/contract/errors.js';
import type { PushResult } from '../../../shared/contract/sync.js';
import type { BookEntry, Entry } from '../../../shared/entries/entry.js';
import { Bookkeeper, type NewEntry } from './bookkeeper.js';
import { list } from './bulk.js';
import { carryOut } from './closing.js';
import { correctedMoments, isDoubtful } from './corrected-moment.js';
import { endsBeforeItsStop, refusalOf, type CheckedEntry } from './entry-checks.js';
import { entriesById, type StoredEntry } from './entry-store.js';
import { holdsOf, undecidedOf } from './holds.js';
import { readMillFacts } from './mill-facts.js';
import { readEntry } from './read-entry.js';
import { judge, readRights } from './rights.js';
import type { Place } from './which-shift.js';

export interface IngestContext {
  /** The device that sends; null: entries of any device (the demo's seeder). */
  readonly deviceId: string | null;
  readonly deviceRevoked: boolean;
  /** The shed that a tablet belongs to; null: an office browser. */
  readonly tabletShedId: string | null;
  /** The device's clock at sending, and ours at receiving. */
  readonly sentAt: number;
  readonly serverNow: number;
}

export interface Ingested {
  /** One for each entry, in the order in which they came. */
  readonly results: PushResult[];
  /** Whom the feed tells (null: the whole mill), and the number reached. */
  readonly changed: { readonly shedIds: readonly (string | null)[]; readonly seq: number | null };
}

/** An entry that reads well and is new. */
interface Candidate {
  readonly index: number;
  readonly entry: Entry;
  readonly body: string;
  readonly at: number;
  readonly until: number | null;
  readonly changedAt: number | null;
}

const CONTROL: ReadonlySet<Entry['kind']> = new Set(['close', 'reopen', 'accept', 'refuse']);

/**
 * The one way into the book, for tablets and for the demo alike. Each entry is looked at by itself: one bad entry
 * never blocks its neighbours. Runs inside a writer's transaction; what is acknowledged is in it.
 */
export async function ingestEntries(
  tx: EntityManager,
  raw: readonly unknown[],
  context: IngestContext,
): Promise<Ingested> {
  const ingest = new Ingest(tx, context, raw.length);
  await ingest.read(raw);
  await ingest.bookAll();
  return ingest.finish();
}

class Ingest {
  private readonly results: PushResult[];
  private readonly fresh: Candidate[] = [];
  /** Entries sent twice in one request, by the place of the first. */
  private readonly again: { index: number; first: number; same: boolean }[] = [];
  private readonly offset: number;

  constructor(
    private readonly tx: EntityManager,
    private readonly context: IngestContext,
    count: number,
  ) {
    this.results = new Array<PushResult>(count);
    this.offset = context.serverNow - context.sentAt;
  }

  /** Sorts out what cannot be read and what the book has already. */
  async read(raw: readonly unknown[]): Promise<void> {
    const readable: { index: number; entry: Entry; body: string }[] = [];
    raw.forEach((one, index) => {
      const { id, ...read } = readEntry(one);
      if (read.result === 'read') readable.push({ index, entry: read.entry, body: read.body });
      else this.results[index] = { id, index, ...read };
    });
    const stored = await entriesById(
      this.tx,
      readable.map(({ entry }) => entry.id),
    );
    const known = new Map(stored.map((one) => [one.id, one]));
    const holds = stored.length > 0 ? await this.openHolds(known.keys()) : new Map<string, HoldReason>();
    const firsts = new Map<string, { index: number; body: string }>();
    for (const { index, entry, body } of readable) {
      const { id } = entry;
      const before = known.get(id);
      const first = firsts.get(id);
      if (before) this.results[index] = duplicateOf(before, body, index, holds.get(id));
      else if (first) this.again.push({ index, first: first.index, same: first.body === body });
      else {
        firsts.set(id, { index, body });
        this.fresh.push({ index, entry, body, ...correctedMoments(entry, this.offset) });
      }
    }
  }

  async bookAll(): Promise<void> {
    if (this.fresh.length === 0) return;
    const mill = await readMillFacts(this.tx);
    const keeper = new Bookkeeper(this.tx, mill);
    this.keeper = keeper;
    const rights = await readRights(this.tx, new Set(this.fresh.map(({ entry }) => entry.by)));
    const grants = await this.readGrants();
    const facts = { mill, people: await this.readPeople(), tabletShedId: this.context.tabletShedId };
    const targets = await this.readTargets();

    let run: { candidate: Candidate; entry: NewEntry }[] = [];
    const storeRun = async () => {
      await this.store(run);
      run = [];
    };
    for (const candidate of this.fresh) {
      const { entry, index } = candidate;
      const refuse = (refusal: Pick<PushResult, 'code' | 'detail'>) => {
        this.results[index] = { id: entry.id, index, result: 'refused', ...refusal };
      };
      const { deviceId } = this.context;
      const granted = grants.get(entry.grantId);
      if (
        (deviceId !== null && entry.deviceId !== deviceId) ||
        granted?.personId !== entry.by ||
        granted.deviceId !== entry.deviceId
      ) {
        refuse({ code: 'grant-unknown' });
        continue;
      }
      const place = await keeper.shifts.placeOf(entry, candidate.changedAt ?? candidate.at);
      const targetId = 'targetId' in entry ? entry.targetId : undefined;
      const target = targetId === undefined ? null : (targets.get(targetId) ?? null);
      const checked: CheckedEntry = { ...candidate, namedShift: place.named, target };
      const refusal = refusalOf(checked, facts);
      if (refusal) {
        refuse(refusal);
        continue;
      }
      const judgement = judge(rights.get(entry.by) ?? [], entry.kind, entry.shedId, candidate.at);
      if (judgement === 'never' || judgement === 'other-shed') {
        refuse({ code: judgement === 'never' ? 'entry-not-permitted' : 'entry-other-shed' });
        continue;
      }
      const uncertain = endsBeforeItsStop(candidate, target);
      const hold = this.holdOf(candidate, judgement === 'lost', place, uncertain);
      const control = CONTROL.has(entry.kind);
      if (control) await storeRun();
      const reclosed = entry.kind === 'close' && hold === null && place.shift?.state === 'open';
      if (reclosed && (await undecidedOf(this.tx, entry.shiftKey)) > 0) {
        refuse({ code: 'held-undecided' });
        continue;
      }
      run.push({ candidate, entry: { row: this.rowOf(candidate, place.shift?.key ?? null), hold } });
      if (control) await storeRun();
    }
    await storeRun();
  }

  async finish(): Promise<Ingested> {
    const changed = this.keeper ? await this.keeper.finish() : { shedIds: [], seq: null };
    for (const { candidate, shiftKey } of this.booked) {
      const { index, entry, at } = candidate;
      const hold = this.keeper?.held.get(entry.id);
      this.results[index] = {
        id: entry.id,
        index,
        result: hold ? 'held' : 'stored',
        ...(hold ? { hold } : {}),
        at,
        shiftKey,
      };
    }
    for (const { index, first, same } of this.again) {
      const before = this.results[first];
      if (!before) continue;
      this.results[index] = same
        ? { ...before, index, result: before.result === 'refused' ? 'refused' : 'duplicate' }
        : { id: before.id, index, result: 'refused', code: 'id-reused' };
    }
    return { results: this.results, changed };
  }

  private keeper: Bookkeeper | null = null;
  private readonly booked: { candidate: Candidate; shiftKey: string | null }[] = [];

  private async store(run: readonly { candidate: Candidate; entry: NewEntry }[]): Promise<void> {
    if (run.length === 0 || !this.keeper) return;
    const { stored, freed } = await this.keeper.store(run.map((one) => one.entry));
    for (const { candidate, entry } of run)
      this.booked.push({ candidate, shiftKey: entry.row.shiftKey as string | null });
    const decisions = [...stored, ...freed].filter(
      (one) => CONTROL.has(one.kind) && !this.keeper?.held.has(one.id),
    );
    for (const decision of decisions) await carryOut(this.keeper, decision);
  }

  /** The first reason for which an entry waits, whatever its shift. */
  private holdOf(
    candidate: Candidate,
    rightsLost: boolean,
    place: Place,
    uncertain: boolean,
  ): HoldReason | null {
    const { entry, at, changedAt } = candidate;
    if (this.context.deviceRevoked) return 'device-revoked';
    if (rightsLost) return 'rights-lost';
    if (uncertain || isDoubtful(entry, at, this.context)) return 'time-doubtful';
    if (changedAt !== null && isDoubtful(entry, changedAt, this.context)) return 'time-doubtful';
    const isStop = entry.kind === 'stop' || entry.kind === 'standing' || entry.kind === 'shed-stop';
    return place.shift === null && (isStop || place.named !== undefined) ? 'no-shift' : null;
  }

  private rowOf(candidate: Candidate, shiftKey: string | null): NewEntry['row'] {
    const { entry, body, at, until, changedAt } = candidate;
    return {
      id: entry.id,
      kind: entry.kind,
      shedId: entry.shedId,
      at,
      until,
      changedAt,
      shiftKey,
      targetId: ('targetId' in entry ? entry.targetId : null) ?? null,
      targetBatchId: ('targetBatchId' in entry ? entry.targetBatchId : null) ?? null,
      batchId: entry.batchId ?? null,
      by: entry.by,
      deviceId: entry.deviceId,
      deviceSeq: entry.deviceSeq,
      receivedAt: this.context.serverNow,
      body,
    };
  }

  private async openHolds(ids: Iterable<string>): Promise<Map<string, HoldReason>> {
    const open = (await holdsOf(this.tx, ids)).filter((one) => one.state === 'held');
    open.sort((a, b) => HOLD_REASONS.indexOf(b.reason) - HOLD_REASONS.indexOf(a.reason));
    return new Map(open.map((one) => [one.entryId, one.reason]));
  }

  private async readGrants() {
    type Grant = { id: string; personId: string; deviceId: string };
    const rows = await this.tx.query<Grant[]>(
      `SELECT "id", "personId", "deviceId" FROM "access_grant" WHERE "id" IN (SELECT value FROM json_each(?))`,
      [list(new Set(this.fresh.map(({ entry }) => entry.grantId)))],
    );
    return new Map(rows.map((row) => [row.id, row]));
  }

  /** Which of the people that entries name the book knows. */
  private async readPeople(): Promise<ReadonlySet<string>> {
    const named = this.fresh.flatMap(({ entry }) =>
      entry.kind === 'assign' || entry.kind === 'sheet' ? (entry.weaverId ?? []) : [],
    );
    if (named.length === 0) return new Set();
    const rows = await this.tx.query<{ id: string }[]>(
      `SELECT "id" FROM "person" WHERE "id" IN (SELECT value FROM json_each(?))`,
      [list(new Set(named))],
    );
    return new Set(rows.map((row) => row.id));
  }

  /** What entries name, from the book and from this very request. */
  private async readTargets(): Promise<ReadonlyMap<string, BookEntry>> {
    const ids = new Set(
      this.fresh.flatMap(({ entry }) => ('targetId' in entry ? (entry.targetId ?? []) : [])),
    );
    const targets = new Map<string, BookEntry>();
    for (const candidate of this.fresh)
      if (ids.has(candidate.entry.id)) targets.set(candidate.entry.id, { ...candidate, shiftKey: null });
    for (const one of ids.size > 0 ? await entriesById(this.tx, ids) : []) targets.set(one.id, one);
    return targets;
  }
}

function duplicateOf(
  before: StoredEntry,
  body: string,
  index: number,
  hold: HoldReason | undefined,
): PushResult {
  if (before.body !== body) return { id: before.id, index, result: 'refused', code: 'id-reused' };
  return {
    id: before.id,
    index,
    result: 'duplicate',
    ...(hold ? { hold } : {}),
    at: before.at,
    shiftKey: before.shiftKey,
  };
}
