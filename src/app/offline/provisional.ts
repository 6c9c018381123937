import type { PulledEntry } from '@shared/contract/sync';
import type { BookEntry, Entry } from '@shared/entries/entry';
import { upgradeEntry } from '@shared/entries/upgrades';
import type { OutboxRecord } from './records';

/**
 * An entry of one's own as the tablet sees it before the server has fixed its moments: device time plus the offset
 * that was known when it was tapped. Once the server has answered, the moments that it fixed.
 *
 * @param offset server minus device, ms, where the entry carries no measure
 */
export function provisional(
  record: OutboxRecord,
  offset: number,
  shiftAt: (shedId: string, at: number) => string | null,
): BookEntry {
  const { entry } = record;
  const off = entry.clock?.offset ?? offset;
  const at = record.at ?? entry.at + off;
  // What the server fixed for `at` tells the offset that it used for the rest.
  const used = at - entry.at;
  const named = 'shiftKey' in entry ? entry.shiftKey : undefined;
  return {
    entry,
    at,
    until: moved(untilOf(entry), used),
    changedAt: entry.kind === 'amend' ? moved(entry.change.at, used) : null,
    shiftKey: record.shiftKey ?? named ?? shiftAt(entry.shedId, at),
  };
}

/**
 * A pulled entry in today's schema. The server has checked it when it took it; others' authors are "-" on a tablet,
 * which the schema for sending would not take. Null: newer than this application.
 */
export function asEntry(pulled: PulledEntry): Entry | null {
  const upgraded = upgradeEntry(pulled.entry);
  if (upgraded.is !== 'current') return null;
  const { id, kind } = upgraded.entry;
  return typeof id === 'string' && typeof kind === 'string' ? (upgraded.entry as unknown as Entry) : null;
}

export function pulledBookEntry(entry: Entry, pulled: PulledEntry): BookEntry {
  const { at, until, changedAt, shiftKey } = pulled;
  return { entry, at, until, changedAt, shiftKey };
}

function untilOf(entry: Entry): number | null | undefined {
  if (entry.kind === 'amend') return entry.change.until;
  return entry.kind === 'stop' || entry.kind === 'shed-stop' ? entry.until : null;
}

function moved(moment: number | null | undefined, by: number): number | null {
  return moment === null || moment === undefined ? null : moment + by;
}
