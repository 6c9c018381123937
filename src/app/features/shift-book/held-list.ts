import { HOLDS } from '@shared/contract/errors';
import type { HeldEntries } from '@shared/contract/shift-records';
import { applyAmendment } from '@shared/entries/amendments';
import { asEntry, pulledBookEntry } from '../../offline/provisional';
import { changesBetween, entryWords, type Change } from './entry-words';
import { holdOf } from './loom-story';
import type { Say } from './say';
import { sumsChanges } from './sums-words';

/** A held entry as the foreman decides about it. */
export interface HeldItem {
  readonly id: string;
  /** "Loom 3", "Looms 1, 2, 3", "The shift". */
  readonly where: string;
  readonly loomId: string | null;
  readonly time: string;
  readonly who: string;
  readonly device: string;
  /** When it came to the book. */
  readonly came: string;
  readonly words: string;
  /** What it corrects or ends; empty: it stands for itself. */
  readonly about: string;
  readonly reason: string;
  /** What a held correction says of its entry. */
  readonly says: readonly Change[];
  /** What it would change, line by line. */
  readonly changes: readonly { readonly loomNumber: number; readonly changes: readonly Change[] }[];
}

export function heldItems(held: HeldEntries, say: Say): readonly HeldItem[] {
  return held.entries
    .flatMap((one) => {
      const entry = asEntry(one);
      if (!entry) return [];
      const target = one.target && asEntry(one.target);
      const about = one.target && target ? pulledBookEntry(target, one.target) : null;
      const book = pulledBookEntry(entry, one);
      const amended = about && entry.kind === 'amend' ? applyAmendment(about, book) : null;
      const reason = 'reason' in entry ? `: “${entry.reason}”` : '';
      const words =
        entry.kind === 'void'
          ? `Takes back${reason}`
          : entry.kind === 'amend'
            ? `Corrects${reason}`
            : entryWords(book, say);
      return {
        at: one.at,
        id: entry.id,
        where: whereWords(one.looms.map((loom) => loom.loomNumber)),
        loomId: one.looms[0]?.loomId ?? null,
        time: say.time(one.at),
        who: one.by,
        device: one.device,
        came: say.time(one.receivedAt),
        words,
        about: about ? `${say.time(about.at)} ${entryWords(about, say)}` : '',
        reason: HOLDS[holdOf(one, held.shift.key)?.reason ?? 'shift-closed'],
        says: about && amended ? changesBetween(about, amended, say) : [],
        changes: one.changes.map(({ loomNumber, before, after }) => ({
          loomNumber,
          changes: sumsChanges(before, after),
        })),
      };
    })
    .sort((a, b) => a.at - b.at || (a.id < b.id ? -1 : 1));
}

function whereWords(looms: readonly number[]): string {
  if (looms.length === 0) return 'The shift';
  const sorted = [...looms].sort((a, b) => a - b);
  return sorted.length === 1 ? `Loom ${sorted[0] ?? ''}` : `Looms ${sorted.join(', ')}`;
}
