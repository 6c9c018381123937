import { applyAmendment, type Amended } from './amendments.js';
import type { BookEntry, Entry, EntryKind, EntryOf } from './entry.js';
import { byMoment, byText } from './order.js';

/** An entry as it stands after every correction that has come. */
export interface ResolvedEntry {
  /** As it was logged. */
  readonly root: BookEntry;
  /** As amended. */
  readonly entry: Entry;
  /** Corrected moments, as amended. */
  readonly at: number;
  readonly until: number | null;
  /** The shift it names, or falls in; where an amendment moved the moment: as the amendment's book entry says. */
  readonly shiftKey: string | null;
  readonly voided: boolean;
  /** Every correction of it that has come, voided ones too, oldest first. */
  readonly history: readonly BookEntry[];
  /** Two corrections were made without sight of each other, and do not agree. */
  readonly correctedTwice: boolean;
  /** What the next correction is based on; null: none is in force. */
  readonly latestCorrectionId: string | null;
}

/** A resolved entry of one kind. */
export type ResolvedOf<K extends EntryKind> = ResolvedEntry & { readonly entry: EntryOf<K> };

/** Narrows a resolved entry to a kind. */
export function isKind<K extends EntryKind>(resolved: ResolvedEntry, kind: K): resolved is ResolvedOf<K> {
  return resolved.entry.kind === kind;
}

/**
 * Applies voids and amendments to the entries they correct. The result is sorted by id and does not depend on the
 * order of arrival; a correction whose target has not come waits (no effect). An entry given twice counts once.
 *
 * - The last correction in a line of `basedOn` holds: with its amendments, each over the one before; a void at the
 *   end of the line voids. Where lines fork, the later by (corrected moment, device, its sequence) holds, and the
 *   entry is `correctedTwice`, unless all of them void it.
 * - A void may name a void or an amendment: that is then as if never made. Voids that void each other in a ring
 *   are no statement at all and are broken off at the lowest id.
 */
export function resolveCorrections(entries: readonly BookEntry[]): ResolvedEntry[] {
  const byId = new Map(entries.map((book) => [book.entry.id, book]));
  const sorted = [...byId.values()].sort((a, b) => byText(a.entry.id, b.entry.id));
  const corrections = correctionIndex(sorted);
  return sorted.filter((book) => !isCorrection(book)).map((root) => resolve(root, corrections));
}

interface Corrections {
  /** Corrections that name this entry or its batch. */
  of(book: BookEntry): readonly BookEntry[];
  /** Whether a correction counts: no void that counts names it. */
  counts(correction: BookEntry): boolean;
}

function isCorrection(book: BookEntry): boolean {
  return book.entry.kind === 'void' || book.entry.kind === 'amend';
}

function correctionIndex(sorted: readonly BookEntry[]): Corrections {
  const byTarget = new Map<string, BookEntry[]>();
  const byBatch = new Map<string, BookEntry[]>();
  const add = (map: Map<string, BookEntry[]>, key: string, book: BookEntry) => {
    const list = map.get(key);
    if (list) list.push(book);
    else map.set(key, [book]);
  };
  for (const book of sorted) {
    const { entry } = book;
    if (entry.kind === 'amend') add(byTarget, entry.targetId, book);
    if (entry.kind !== 'void') continue;
    if (entry.targetId !== undefined) add(byTarget, entry.targetId, book);
    if (entry.targetBatchId !== undefined) add(byBatch, entry.targetBatchId, book);
  }
  const of = (book: BookEntry): readonly BookEntry[] => {
    const { id, batchId } = book.entry;
    const batch = batchId === undefined ? [] : (byBatch.get(batchId) ?? []);
    const all = new Set([...(byTarget.get(id) ?? []), ...batch]);
    all.delete(book);
    return [...all];
  };
  const known = new Map<string, boolean>();
  const counts = (correction: BookEntry): boolean => {
    const { id } = correction.entry;
    const answer = known.get(id);
    if (answer !== undefined) return answer;
    known.set(id, false); // while it is being asked: breaks rings
    const counted = !of(correction).some((other) => other.entry.kind === 'void' && counts(other));
    known.set(id, counted);
    return counted;
  };
  // Asked in the order of ids once, so that a ring is broken at the same place whatever is looked at first.
  for (const book of sorted) if (isCorrection(book)) counts(book);
  return { of, counts };
}

function basedOn(book: BookEntry): string | undefined {
  return book.entry.kind === 'void' || book.entry.kind === 'amend' ? book.entry.basedOn : undefined;
}

/** The corrections that a correction's author had seen, nearest first. */
function ancestors(correction: BookEntry, byId: ReadonlyMap<string, BookEntry>): BookEntry[] {
  const found: BookEntry[] = [];
  const seen = new Set([correction.entry.id]);
  for (let id = basedOn(correction); id !== undefined && !seen.has(id);) {
    seen.add(id);
    const book = byId.get(id);
    if (!book) break;
    found.push(book);
    id = basedOn(book);
  }
  return found;
}

function resolve(root: BookEntry, corrections: Corrections): ResolvedEntry {
  const history = [...corrections.of(root)].sort(byMoment);
  const byId = new Map(history.map((book) => [book.entry.id, book]));
  const counted = history.filter((book) => corrections.counts(book));
  const overtaken = new Set(counted.flatMap((book) => ancestors(book, byId)));
  const free = counted.filter((book) => !overtaken.has(book));
  const ends = free.length > 0 ? free : counted; // a ring of basedOn overtakes itself: then all are equal
  const last = ends.at(-1);
  const line = last
    ? [last, ...ancestors(last, byId)].filter((book) => counted.includes(book)).reverse()
    : [];
  const asLogged: Amended = { entry: root.entry, at: root.at, until: root.until, shiftKey: root.shiftKey };
  return {
    root,
    ...line.reduce(applyAmendment, asLogged),
    voided: last?.entry.kind === 'void',
    history,
    correctedTwice: ends.length > 1 && ends.some((book) => book.entry.kind !== 'void'),
    latestCorrectionId: last?.entry.id ?? null,
  };
}
