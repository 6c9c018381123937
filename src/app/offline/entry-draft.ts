import { entrySchema, type Entry, type EntryKind, type EntryOf, schemaOf } from '@shared/entries/entry';
import { NotSaved } from './not-saved';

type Stamped =
  | 'id'
  | 'schema'
  | 'shedId'
  | 'by'
  | 'grantId'
  | 'deviceId'
  | 'deviceSeq'
  | 'recordedAt'
  | 'clock'
  | 'source'
  | 'at'
  | 'batchId';

export interface DraftOptions {
  /** Made beforehand, where something else (a photo) must know it before the entry is logged. */
  readonly id?: string;
  /** When it happened, by the device's clock; now unless said. */
  readonly at?: number;
  /** The device's shed unless said. */
  readonly shedId?: string;
  readonly source?: Entry['source'];
}

/** What a screen says; the rest (id, author, grant, device, its sequence, clock) is stamped where it is stored. */
export type EntryDraft = { [K in EntryKind]: Omit<EntryOf<K>, Stamped> & DraftOptions }[EntryKind];

/** What all entries of one act share. */
export interface Stamp {
  readonly shedId: string;
  readonly by: string;
  readonly grantId: string;
  readonly deviceId: string;
  readonly now: number;
  readonly clock: Entry['clock'];
  /** Names the act, where it makes several entries. */
  readonly batchId?: string;
  readonly newId: () => string;
  readonly steppedSince: (at: number) => boolean;
}

/** An entry complete but for its number on the device, which its transaction allots. */
export type Unnumbered = Omit<Entry, 'deviceSeq'> & { readonly kind: EntryKind };

export function stampDraft(draft: EntryDraft, stamp: Stamp): Unnumbered {
  const at = draft.at ?? stamp.now;
  const clock =
    stamp.clock && stamp.steppedSince(Math.min(at, stamp.now))
      ? { ...stamp.clock, stepped: true }
      : stamp.clock;
  return {
    ...draft,
    id: draft.id ?? stamp.newId(),
    schema: schemaOf(draft.kind, draft),
    shedId: draft.shedId ?? stamp.shedId,
    at,
    by: stamp.by,
    grantId: stamp.grantId,
    deviceId: stamp.deviceId,
    recordedAt: stamp.now,
    source: draft.source ?? 'tap',
    ...(clock && { clock }),
    ...(stamp.batchId !== undefined && { batchId: stamp.batchId }),
  };
}

/** Numbers an entry and makes sure that it is one: what the server would refuse as malformed is not stored at all. */
export function numberEntry(unnumbered: Unnumbered, deviceSeq: number): Entry {
  const parsed = entrySchema.safeParse({ ...unnumbered, deviceSeq });
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  throw new NotSaved('malformed', issue ? `${issue.path.join('.')}: ${issue.message}` : '');
}
