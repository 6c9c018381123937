import type { Amendment, BookEntry, Entry, EntryKind } from './entry.js';

type Field = Exclude<keyof Amendment, 'at' | 'until'>;

/** What an amendment may change, by kind; moments apart. A change that a kind does not have is passed over. */
const FIELDS: Readonly<Partial<Record<EntryKind, readonly Field[]>>> = {
  reading: ['loomId', 'value', 'newValue', 'kept'],
  stop: ['loomId', 'cause', 'count', 'arisesFrom', 'note'],
  standing: ['loomId', 'cause', 'arisesFrom', 'note'],
  'shed-stop': ['cause'],
  resume: ['loomId'],
  count: ['loomId', 'cause', 'total'],
  call: ['loomId'],
  attend: ['loomId'],
  repair: ['loomId', 'cause'],
  'warp-change': ['loomId', 'clothId', 'warpId'],
  sheet: ['loomId'],
};
/** Kinds that have an end of their own. A standing stop gets one by amendment: it then overrules the resumes. */
const WITH_END: readonly EntryKind[] = ['stop', 'standing', 'shed-stop'];

/** An entry and its corrected moments, as far as corrections have changed them. */
export interface Amended {
  readonly entry: Entry;
  readonly at: number;
  readonly until: number | null;
  readonly shiftKey: string | null;
}

/** Applies one amendment. `by` must hold an `amend` entry; any other is passed over. */
export function applyAmendment(state: Amended, by: BookEntry): Amended {
  if (by.entry.kind !== 'amend') return state;
  const { change } = by.entry;
  const fields: Record<string, unknown> = {};
  for (const field of FIELDS[state.entry.kind] ?? [])
    if (change[field] !== undefined) fields[field] = change[field];
  if (state.entry.kind === 'note' && change.note !== undefined) fields['text'] = change.note;
  let { at, until, shiftKey } = state;
  if (change.at !== undefined && by.changedAt !== undefined && by.changedAt !== null) {
    at = by.changedAt;
    fields['at'] = change.at;
    if (!('shiftKey' in state.entry)) shiftKey = by.shiftKey;
  }
  if (change.until !== undefined && WITH_END.includes(state.entry.kind)) {
    until = change.until === null ? null : by.until;
    if (state.entry.kind !== 'standing') fields['until'] = change.until ?? undefined;
  }
  return { entry: { ...state.entry, ...fields } as Entry, at, until, shiftKey };
}
