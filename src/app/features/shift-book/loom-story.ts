import { HOLDS } from '@shared/contract/errors';
import type { LoomRecord, RecordedEntry } from '@shared/contract/shift-records';
import { applyAmendment, type Amended } from '@shared/entries/amendments';
import { resolveCorrections, type ResolvedEntry } from '@shared/entries/corrections';
import type { BookEntry, EntryKind } from '@shared/entries/entry';
import { asEntry, pulledBookEntry } from '../../offline/provisional';
import { changesBetween, entryWords, type Change } from './entry-words';
import type { Say } from './say';

/** Somebody's word on an entry: a correction, or what was decided of it. */
export interface StoryWord {
  readonly id: string;
  readonly at: number;
  readonly time: string;
  readonly who: string;
  readonly words: string;
  readonly reason: string;
  readonly changes: readonly Change[];
  /** Why it does not count; empty: it does. */
  readonly waits: string;
}

/** One entry as the record tells it. */
export interface StoryEntry {
  readonly id: string;
  readonly kind: EntryKind;
  readonly at: number;
  readonly time: string;
  readonly who: string;
  readonly device: string;
  readonly words: string;
  /** As it was logged, where corrections say something else now; empty: as it stands. */
  readonly asLogged: string;
  readonly voided: boolean;
  /** Why it does not count in this shift; empty: it does. */
  readonly waits: string;
  readonly refused: boolean;
  readonly since: readonly StoryWord[];
  /** As it stands, for a correction's form. */
  readonly resolved: ResolvedEntry;
  /** The last correction of it that is in the book; null: none. */
  readonly basedOn: string | null;
  readonly correctable: boolean;
}

const DECISIONS: ReadonlySet<EntryKind> = new Set(['close', 'reopen', 'accept', 'refuse']);

interface Known {
  readonly recorded: RecordedEntry;
  readonly book: BookEntry;
}

/** A line's entries in order of time, each with its corrections and what was decided of it. */
export function storyOf(record: Pick<LoomRecord, 'shift' | 'entries'>, say: Say): readonly StoryEntry[] {
  const known = new Map<string, Known>();
  for (const recorded of record.entries) {
    const entry = asEntry(recorded);
    if (entry) known.set(entry.id, { recorded, book: pulledBookEntry(entry, recorded) });
  }
  const out = (one: Known) => holdOf(one.recorded, record.shift.key);
  const isCorrection = ({ book }: Known) => book.entry.kind === 'void' || book.entry.kind === 'amend';
  const all = [...known.values()];
  // A correction that waits changes nothing yet; an entry that waits is told as it is.
  const counted = all.filter((one) => !isCorrection(one) || out(one) === null);
  const waiting = all.filter((one) => isCorrection(one) && out(one) !== null);
  return resolveCorrections(counted.map(({ book }) => book))
    .filter(({ root }) => !DECISIONS.has(root.entry.kind))
    .map((resolved) => tell(resolved, { known, waiting, all, shiftKey: record.shift.key, say }))
    .sort((a, b) => a.at - b.at || (a.id < b.id ? -1 : 1));
}

/** The entries that count in the shift, as the projection takes them. */
export function countedEntries(record: Pick<LoomRecord, 'shift' | 'entries'>): BookEntry[] {
  return record.entries
    .filter((one) => holdOf(one, record.shift.key) === null)
    .flatMap((one) => {
      const entry = asEntry(one);
      return entry ? [pulledBookEntry(entry, one)] : [];
    });
}

interface Around {
  readonly known: ReadonlyMap<string, Known>;
  readonly waiting: readonly Known[];
  readonly all: readonly Known[];
  readonly shiftKey: string;
  readonly say: Say;
}

function tell(resolved: ResolvedEntry, { known, waiting, all, shiftKey, say }: Around): StoryEntry {
  const { root } = resolved;
  const { id, kind } = root.entry;
  const own = known.get(id);
  const hold = own ? holdOf(own.recorded, shiftKey) : null;
  const now = entryWords(resolved, say);
  const then = entryWords(root, say);
  const moved = say.time(root.at) !== say.time(resolved.at) ? `${say.time(root.at)} ` : '';
  const corrections = correctionWords(resolved, known, say);
  const held = waiting
    .filter(({ book }) => targets(book, root))
    .map((one) => correctionWord(one, resolved, say, holdOf(one.recorded, shiftKey)));
  const decisions = all
    .filter(({ book: { entry } }) => entry.kind === 'accept' || entry.kind === 'refuse')
    .filter(({ book }) => targets(book, root))
    .map(({ book, recorded }) => ({
      id: book.entry.id,
      at: book.at,
      time: say.time(book.at),
      who: recorded.by,
      words: book.entry.kind === 'accept' ? 'Accepted' : 'Refused',
      reason: 'reason' in book.entry ? book.entry.reason : '',
      changes: [],
      waits: '',
    }));
  return {
    id,
    kind,
    at: resolved.at,
    time: say.time(resolved.at),
    who: own?.recorded.by ?? '',
    device: own?.recorded.device ?? '',
    words: now,
    asLogged: moved !== '' || then !== now ? `${moved}${then}` : '',
    voided: resolved.voided,
    waits: hold === null ? '' : hold.state === 'held' ? HOLDS[hold.reason] : 'Refused: it does not count.',
    refused: hold?.state === 'refused',
    since: [...corrections, ...held, ...decisions].sort((a, b) => a.at - b.at || (a.id < b.id ? -1 : 1)),
    resolved,
    basedOn: resolved.latestCorrectionId,
    correctable: hold === null,
  };
}

/** The corrections that count, each with what it changed of the state before it. */
function correctionWords(resolved: ResolvedEntry, known: ReadonlyMap<string, Known>, say: Say): StoryWord[] {
  const { root } = resolved;
  let state: Amended = { entry: root.entry, at: root.at, until: root.until, shiftKey: root.shiftKey };
  return resolved.history.flatMap((book) => {
    const one = known.get(book.entry.id);
    const before = state;
    state = applyAmendment(state, book);
    return one ? [correctionWord(one, before, say, null)] : [];
  });
}

function correctionWord(
  { book, recorded }: Known,
  before: Pick<Amended, 'entry' | 'at' | 'until'>,
  say: Say,
  hold: Hold | null,
): StoryWord {
  const { entry } = book;
  const after = applyAmendment({ ...before, shiftKey: book.shiftKey }, book);
  return {
    id: entry.id,
    at: book.at,
    time: say.time(book.at),
    who: recorded.by,
    words: entry.kind === 'void' ? 'Taken back' : 'Corrected',
    reason: 'reason' in entry ? entry.reason : '',
    changes: entry.kind === 'amend' ? changesBetween(before, after, say) : [],
    waits: hold === null ? '' : hold.state === 'held' ? HOLDS[hold.reason] : 'Refused: it does not count.',
  };
}

type Hold = RecordedEntry['holds'][number];

/** What keeps an entry from counting in a shift: it waits, or was refused. Null: it counts. */
export function holdOf(recorded: RecordedEntry, shiftKey: string): Hold | null {
  return (
    recorded.holds.find(
      (hold) => hold.state !== 'accepted' && (hold.shiftKey === '*' || hold.shiftKey === shiftKey),
    ) ?? null
  );
}

function targets({ entry }: BookEntry, root: BookEntry): boolean {
  const batch = 'targetBatchId' in entry ? entry.targetBatchId : undefined;
  return (
    ('targetId' in entry && entry.targetId === root.entry.id) ||
    (batch !== undefined && batch === root.entry.batchId)
  );
}
