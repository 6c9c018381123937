import { HOLDS, sentenceOf } from '@shared/contract/errors';
import { inForceAt, type Reference } from '@shared/contract/reference';
import type { Entry } from '@shared/entries/entry';
import { formatCount } from '@shared/figures/format';
import type { OutboxRecord } from './records';

/** An entry that is not simply in the book, as the header's list shows it. */
export interface OutboxItem {
  readonly id: string;
  readonly state: 'waiting' | 'held' | 'refused' | 'later';
  /** What it is: "Loom 7: warp break". */
  readonly what: string;
  /** Why it is where it is, and what to do. */
  readonly why: string;
  /** When it happened, by the device's clock. */
  readonly at: number;
  /** Whether it may be dismissed: refused and exported. */
  readonly dismissible: boolean;
  readonly exported: boolean;
}

const WAITING = 'Saved on this device. It is sent as soon as the book can be reached.';
const LATER =
  'Saved on this device. The server is older than this application; it is sent after the server’s upgrade.';

export function outboxItem(record: OutboxRecord, reference: Reference): OutboxItem | null {
  const { state } = record;
  if (state === 'stored') return null;
  return {
    id: record.entry.id,
    state,
    what: describeEntry(record.entry, reference),
    why: whyThere(record),
    at: record.entry.at,
    dismissible: state === 'refused' && record.exportedAt !== null,
    exported: record.exportedAt !== null,
  };
}

function whyThere(record: OutboxRecord): string {
  switch (record.state) {
    case 'held':
      return record.hold ? HOLDS[record.hold] : 'The foreman decides whether it counts.';
    case 'refused': {
      const why = sentenceOf(record.code ?? 'entry-malformed');
      return record.detail ? `${why} (${record.detail})` : why;
    }
    case 'later':
      return LATER;
    case 'waiting':
    case 'stored':
      return WAITING;
  }
}

/** A line that says which entry this is, in the trade's words. */
export function describeEntry(entry: Entry, reference: Reference): string {
  const loom = reference.looms.find((one) => 'loomId' in entry && one.id === entry.loomId);
  const where = loom ? `Loom ${loom.number}: ` : '';
  const said = wordsFor(entry, reference);
  return where ? where + said : said.charAt(0).toUpperCase() + said.slice(1);
}

function wordsFor(entry: Entry, reference: Reference): string {
  const cause = (id: string): string => {
    const versions = reference.causeVersions.filter((version) => version.causeId === id);
    return (inForceAt(versions, entry.at)?.name ?? id).toLocaleLowerCase('en-GB');
  };
  switch (entry.kind) {
    case 'reading':
      return `reading at the ${entry.boundary}, ${formatCount(entry.value)}`;
    case 'stop':
      return entry.count === 1 ? cause(entry.cause) : `${entry.count} × ${cause(entry.cause)}`;
    case 'standing':
      return `standing, ${cause(entry.cause)}`;
    case 'resume':
      return 'running again';
    case 'shed-stop':
      return `shed stop, ${cause(entry.cause)}`;
    case 'assign':
      return `${entry.loomIds.length} looms ${entry.weaverId === null ? 'handed over' : 'taken over'}`;
    case 'count':
      return `${entry.total} × ${cause(entry.cause)}, counted for the shift`;
    case 'pay-word':
      return `${formatCount(entry.picks)} picks for pay, ${entry.word}`;
    case 'call':
      return 'call for the tackler';
    case 'attend':
      return `tackler: ${entry.step}`;
    case 'repair':
      return `repair, ${cause(entry.cause)}`;
    case 'care':
      return `${reference.jobs?.find((job) => job.id === entry.jobId)?.name ?? entry.jobId}, done`;
    case 'warp-change':
      return `warp change, ${entry.how}`;
    case 'sheet':
      return 'paper card';
    case 'note':
      return 'note';
    case 'void':
      return 'taken back';
    case 'amend':
      return 'correction';
    case 'decide':
      return 'decision on a reading';
    case 'close':
      return 'shift closed';
    case 'reopen':
      return 'shift reopened';
    case 'accept':
      return 'held entry accepted';
    case 'refuse':
      return 'held entry refused';
  }
}
