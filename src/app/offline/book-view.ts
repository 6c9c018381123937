import type { Fitting, PersonCard, Reference, Shift } from '@shared/contract/reference';
import type { PulledEntry, PullResponse } from '@shared/contract/sync';
import { resolveCorrections, isKind, type ResolvedEntry, type ResolvedOf } from '@shared/entries/corrections';
import type { BookEntry, Entry } from '@shared/entries/entry';
import { resolveFittings } from '@shared/entries/fittings';
import type { LoomLine } from '@shared/entries/loom-line';
import { projectLine } from '@shared/entries/projection';
import { loomsFittedIn, type BookContents } from './book-store';
import { EntryIndex } from './entry-index';
import { asEntry, provisional, pulledBookEntry } from './provisional';
import type { BookEvent } from './book-events';
import type { OutboxRecord } from './records';

/**
 * Entries older than this before a shift matter to it only as timed stops, readings and warp changes. It is more than
 * the day by which a device's clock may be off.
 */
const REACH_BACK = 2 * 86_400_000;

const NO_REFERENCE: Reference = {
  mill: { name: '-', timeZone: 'UTC', units: 'metric' },
  sheds: [],
  looms: [],
  loomVersions: [],
  cloths: [],
  clothVersions: [],
  warps: [],
  causeVersions: [],
};

/** What a change touched: the looms whose lines are to be projected again. */
export interface Touched {
  readonly loomIds: ReadonlySet<string>;
  /** Reference data, shifts, or everything: every line. */
  readonly all: boolean;
}

/** Who minds a loom, and who said so ("-" where a tablet is not told). */
export interface Assigned {
  readonly weaverId: string | null;
  readonly by: string;
}

/** An entry of one's own as a list shows it. */
export interface OwnEntry {
  readonly id: string;
  /** As it stands after corrections. */
  readonly entry: Entry;
  readonly at: number;
  readonly until: number | null;
  readonly voided: boolean;
  readonly state: OutboxRecord['state'];
  /** What a correction made now is based on. */
  readonly basedOn: string | null;
}

/**
 * The book as this device sees it, in memory: pulled entries, and one's own that are not pulled yet at their
 * provisional moments. Waiting ones count; held and refused ones do not. Lines are projected by the same code as on
 * the server, one loom at a time.
 */
export class BookView {
  reference: Reference = NO_REFERENCE;
  people: readonly PersonCard[] = [];
  shifts: readonly Shift[] = [];
  readonly outbox = new Map<string, OutboxRecord>();
  private readonly pulled = new Map<string, PulledEntry>();
  private fittings = new Map<string, Fitting>();
  private index = new EntryIndex([]);
  /** How many entries about each loom are not sent; null: to be counted again. */
  private unsent: ReadonlyMap<string, number> | null = null;

  /** @param offset server minus device, ms, for entries that carry no measure of their own */
  constructor(private readonly offset: () => number) {}

  load(contents: BookContents, records: readonly OutboxRecord[]): void {
    this.reference = contents.reference ?? NO_REFERENCE;
    this.people = contents.people;
    this.shifts = sortShifts(contents.shifts);
    this.fittings = new Map(contents.fittings.map((fitting) => [fitting.id, fitting]));
    for (const pulled of contents.entries) this.keepPulled(pulled);
    for (const record of records) {
      const isPulled = record.state === 'stored' && this.pulled.has(record.entry.id);
      if (!isPulled) this.outbox.set(record.entry.id, record);
    }
    this.unsent = null;
    this.rebuildIndex();
  }

  /** Takes in what happened. Says which lines are to be projected again. */
  apply(event: BookEvent): Touched {
    const touched = new Set<string>();
    if (event.kind === 'status') return { loomIds: touched, all: false };
    this.unsent = null;
    if (event.kind === 'outbox') {
      for (const record of event.records) this.takeRecord(record, touched);
      for (const id of event.dismissed) {
        this.touch(id, touched);
        this.outbox.delete(id);
      }
      return { loomIds: touched, all: false };
    }
    const { pull } = event;
    if (pull.snapshot) {
      this.pulled.clear();
      this.fittings.clear();
      this.shifts = [];
    }
    for (const pulled of pull.entries) {
      const entry = this.keepPulled(pulled);
      if (!entry) continue;
      this.index.add(entry);
      this.touch(entry.id, touched);
      if (this.outbox.get(entry.id)?.state === 'stored') this.outbox.delete(entry.id);
    }
    this.takeShifts(pull);
    this.takeFittings(pull, touched);
    if (pull.people) this.people = pull.people;
    if (pull.reference) this.reference = pull.reference;
    const shifts = pull.shifts.length > 0 || pull.goneShifts !== undefined;
    const all = pull.snapshot || shifts || pull.reference !== null;
    if (all) this.rebuildIndex();
    return { loomIds: touched, all };
  }

  shiftsOf(shedId: string | null): readonly Shift[] {
    return this.shifts.filter((shift) => shift.shedId === shedId);
  }

  shiftAt(shedId: string | null, at: number): Shift | null {
    return this.shifts.find((s) => s.shedId === shedId && s.startsAt <= at && at < s.endsAt) ?? null;
  }

  /** One loom in one shift, as this device knows it. */
  project(loomId: string, shift: Shift): LoomLine {
    const ofShed = this.shiftsOf(shift.shedId);
    return projectLine({
      shift,
      previous: ofShed.find((other) => other.endsAt === shift.startsAt) ?? null,
      next: ofShed.find((other) => other.startsAt === shift.endsAt) ?? null,
      loomId,
      looms: this.reference.looms,
      entries: this.entriesOf(loomId, shift),
      loomVersions: this.reference.loomVersions,
      clothVersions: this.reference.clothVersions,
      causeVersions: this.reference.causeVersions,
      fittings: this.fittingsOf(loomId),
    });
  }

  /** The loom's entries that a shift's line may look at, with their corrections; held and refused ones left out. */
  entriesOf(loomId: string, shift: Shift): BookEntry[] {
    const from = shift.startsAt - REACH_BACK;
    return this.index
      .ofLoom(loomId, (entry) => entry.at >= from || REACHING.has(entry.kind))
      .map((id) => this.bookEntry(id, shift.key))
      .filter((book) => book !== null);
  }

  /** Who minds which loom in a shift by what this device knows; looms in the order in which they were taken. */
  assignments(shift: Shift): ReadonlyMap<string, Assigned> {
    const books = this.index
      .ofKind('assign')
      .map((id) => this.bookEntry(id, shift.key))
      .filter((book) => book !== null);
    const found = new Map<string, Assigned>();
    const effective = resolveCorrections(books)
      .filter((one) => isKind(one, 'assign'))
      .filter((one) => !one.voided && one.entry.shiftKey === shift.key)
      .sort((a, b) => a.at - b.at || (a.entry.id < b.entry.id ? -1 : 1));
    for (const { entry } of effective) {
      for (const loomId of entry.loomIds) {
        found.delete(loomId);
        found.set(loomId, { weaverId: entry.weaverId, by: entry.by });
      }
    }
    return found;
  }

  /** Causes of the loom's stops that this device knows, the commonest first; as logged, corrected or not. */
  causesOf(loomId: string): string[] {
    const counts = new Map<string, number>();
    for (const id of this.index.ofLoom(loomId)) {
      const entry = this.index.get(id);
      if (entry?.kind !== 'stop' && entry?.kind !== 'standing') continue;
      const count = entry.kind === 'stop' ? entry.count : 1;
      counts.set(entry.cause, (counts.get(entry.cause) ?? 0) + count);
    }
    return [...counts].sort((a, b) => b[1] - a[1] || (a[0] < b[0] ? -1 : 1)).map(([cause]) => cause);
  }

  /** Effective entries of a kind that name a shift or fall in it, whatever their loom, oldest first. */
  ofKind<K extends Entry['kind']>(kind: K, shift: Shift): ResolvedOf<K>[] {
    const books = this.index
      .ofKind(kind)
      .map((id) => this.bookEntry(id, shift.key))
      .filter((book) => book !== null);
    return resolveCorrections(books)
      .filter((one): one is ResolvedOf<K> => isKind(one, kind) && !one.voided)
      .filter((one) => one.shiftKey === shift.key && one.entry.shedId === shift.shedId)
      .sort((a, b) => a.at - b.at || (a.entry.id < b.entry.id ? -1 : 1));
  }

  /** Effective entries of a loom around a shift, oldest first. */
  resolvedOf(loomId: string, shift: Shift): ResolvedEntry[] {
    return resolveCorrections(this.entriesOf(loomId, shift)).sort((a, b) => a.at - b.at);
  }

  /** One's own entries of a loom since a moment, newest first, voided and refused ones among them. */
  ownOf(loomId: string, author: string, since: number): OwnEntry[] {
    const books: BookEntry[] = [];
    const of = (entry: Entry) => entry.by === author && entry.at >= since - REACH_BACK;
    for (const id of this.index.ofLoom(loomId, of)) {
      const book = this.bookEntry(id, null);
      if (book) books.push(book);
    }
    return resolveCorrections(books)
      .filter((one) => one.root.entry.by === author && one.root.at >= since)
      .map((one) => ({
        id: one.root.entry.id,
        entry: one.entry,
        at: one.at,
        until: one.until,
        voided: one.voided,
        state: this.stateOf(one.root.entry.id),
        basedOn: one.latestCorrectionId,
      }))
      .sort((a, b) => b.at - a.at || (a.id < b.id ? 1 : -1));
  }

  /** The last correction of an entry that this device knows. */
  latestCorrection(id: string): string | null {
    const books = [id, ...this.index.correctionsOf(id)]
      .map((one) => this.bookEntry(one, null))
      .filter((book) => book !== null);
    return resolveCorrections(books).find((one) => one.root.entry.id === id)?.latestCorrectionId ?? null;
  }

  /** Entries about a loom that the server has not acknowledged. */
  notSent(loomId: string): number {
    // For all looms at once: every card asks, and after a week without network much waits.
    this.unsent ??= this.countUnsent();
    return this.unsent.get(loomId) ?? 0;
  }

  entry(id: string): Entry | null {
    return this.index.get(id) ?? null;
  }

  /** How far an entry has come on its way to the book. */
  stateOf(id: string): OutboxRecord['state'] {
    const record = this.outbox.get(id);
    if (record) return record.state;
    const states = new Set(this.pulled.get(id)?.holds.map((hold) => hold.state));
    if (states.has('held')) return 'held';
    return states.has('refused') ? 'refused' : 'stored';
  }

  /** As the projection takes it; null where it does not count for the shift. `null` shift: whatever its holds. */
  private bookEntry(id: string, shiftKey: string | null): BookEntry | null {
    const pulled = this.pulled.get(id);
    const record = this.outbox.get(id);
    if (pulled && record?.state !== 'waiting') {
      const out = (hold: PulledEntry['holds'][number]) =>
        hold.state !== 'accepted' && (hold.shiftKey === '*' || hold.shiftKey === shiftKey);
      if (shiftKey !== null && pulled.holds.some(out)) return null;
      const entry = this.index.get(id);
      return entry ? pulledBookEntry(entry, pulled) : null;
    }
    if (!record || (shiftKey !== null && (record.state === 'held' || record.state === 'refused')))
      return null;
    return provisional(record, this.offset(), (shed, at) => this.shiftAt(shed, at)?.key ?? null);
  }

  /** What was put on a loom and when, by what this device knows. */
  fittingsOf(loomId: string): Fitting[] {
    const known = [...this.fittings.values()].filter((fitting) => fitting.loomId === loomId);
    const own = [...this.outbox.values()].filter((r) => isUnsent(r) && r.entry.kind === 'warp-change');
    if (own.length === 0) return known;
    const books = own.map((record) => this.bookEntry(record.entry.id, '')).filter((book) => book !== null);
    return [...known, ...resolveFittings(books).filter((fitting) => fitting.loomId === loomId)];
  }

  private countUnsent(): ReadonlyMap<string, number> {
    const counts = new Map<string, number>();
    for (const record of this.outbox.values()) {
      if (!isUnsent(record)) continue;
      for (const loomId of this.index.loomsAbout(record.entry.id))
        counts.set(loomId, (counts.get(loomId) ?? 0) + 1);
    }
    return counts;
  }

  private takeRecord(record: OutboxRecord, touched: Set<string>): void {
    const known = this.outbox.get(record.entry.id);
    if (known && known.rev > record.rev) return;
    // In the book and pulled: the pulled one says all.
    if (record.state === 'stored' && this.pulled.has(record.entry.id)) this.outbox.delete(record.entry.id);
    else this.outbox.set(record.entry.id, record);
    this.index.add(record.entry);
    this.touch(record.entry.id, touched);
  }

  private takeShifts({ shifts, goneShifts = [] }: PullResponse): void {
    if (shifts.length === 0 && goneShifts.length === 0) return;
    const replaced = new Set([...goneShifts, ...shifts.map((shift) => shift.key)]);
    this.shifts = sortShifts([...this.shifts.filter(({ key }) => !replaced.has(key)), ...shifts]);
  }

  private takeFittings(pull: PullResponse, touched: Set<string>): void {
    const looms = loomsFittedIn(pull);
    for (const [id, known] of this.fittings) if (looms.has(known.loomId)) this.fittings.delete(id);
    for (const fitting of pull.fittings) this.fittings.set(fitting.id, fitting);
    for (const loomId of looms) touched.add(loomId);
  }

  private keepPulled(pulled: PulledEntry): Entry | null {
    const entry = asEntry(pulled);
    if (entry) this.pulled.set(entry.id, pulled);
    return entry;
  }

  private touch(id: string, touched: Set<string>): void {
    for (const loomId of this.index.loomsOf(id)) touched.add(loomId);
  }

  private rebuildIndex(): void {
    this.index = new EntryIndex(this.reference.looms);
    for (const pulled of this.pulled.values()) {
      const entry = asEntry(pulled);
      if (entry) this.index.add(entry);
    }
    for (const record of this.outbox.values()) this.index.add(record.entry);
  }
}

/** Kinds that reach forward beyond their day: a stop that still stands, the last reading, what is on the loom. */
const REACHING: ReadonlySet<Entry['kind']> = new Set([
  'standing',
  'shed-stop',
  'resume',
  'reading',
  'warp-change',
]);

export function isUnsent(record: OutboxRecord): boolean {
  return record.state === 'waiting' || record.state === 'later';
}

function sortShifts(shifts: readonly Shift[]): Shift[] {
  return [...shifts].sort((a, b) => a.startsAt - b.startsAt);
}
