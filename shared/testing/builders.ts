import type { ClothVersion, Fitting, LoomVersion, Shift } from '../contract/reference.js';
import { shippedCauses } from '../entries/causes.js';
import { schemaOf, type BookEntry, type Entry, type EntryKind, type EntryOf } from '../entries/entry.js';
import type { LineInput } from '../entries/projection-input.js';

/**
 * Things for specs: an invented loom, its shift and entries, with every field that a spec does not care about
 * filled in. Nothing here is random: ids count up within one `entryBuilder`.
 */

/** Monday 2026-06-01, 06:00 in London (05:00 UTC): the morning shift of the builders begins. */
export const SHIFT_START = Date.UTC(2026, 5, 1, 5, 0);
export const MINUTE = 60_000;
export const HOUR = 60 * MINUTE;
/** `minutes` after the builders' shift begins. */
export const at = (minutes: number): number => SHIFT_START + minutes * MINUTE;

export const SHED_ID = 'shed-1';
export const LOOM_ID = 'loom-1';
export const WEAVER_ID = 'weaver-1';
export const TABLET_ID = 'tablet-1';

/** A well-formed UUID v7 that sorts by `n`, for any whole n from 0 to 2⁴⁸ − 1. */
export function uuidV7(n: number): string {
  return `019e8000-0000-7000-8000-${n.toString(16).padStart(12, '0')}`;
}

/** The morning shift, 06:00 to 14:00, without a meal. */
export function aShift(changes: Partial<Shift> = {}): Shift {
  const date = changes.date ?? '2026-06-01';
  const patternId = changes.patternId ?? 'morning';
  return {
    key: `${changes.shedId ?? SHED_ID}:${date}:${patternId}`,
    shedId: SHED_ID,
    date,
    patternId,
    name: 'Morning',
    startsAt: at(0),
    endsAt: at(480),
    meal: null,
    state: 'open',
    ...changes,
  };
}

/** 180 ppm, a continuous clock of six digits that counts single picks, no battery. */
export function aLoomVersion(changes: Partial<LoomVersion> = {}): LoomVersion {
  return {
    id: `${changes.loomId ?? LOOM_ID}.1`,
    loomId: LOOM_ID,
    effectiveAt: at(-100_000),
    ppm: 180,
    reedSpaceCm: 180,
    clock: { kind: 'continuous', unit: 1, digits: 6 },
    shuttles: 1,
    battery: false,
    ...changes,
  };
}

/** 3,120 ends, 20 picks/cm on the loom and 21 loom state, 150 cm in the reed, one weft of 25 tex. */
export function aClothVersion(changes: Partial<ClothVersion> = {}): ClothVersion {
  return {
    id: `${changes.clothId ?? 'cloth-1'}.1`,
    clothId: 'cloth-1',
    effectiveAt: at(-100_000),
    ends: 3120,
    picksPerCmOnLoom: 20,
    picksPerCmLoomState: 21,
    reedWidthCm: 150,
    crimp: 0.08,
    abreast: 1,
    wefts: [{ name: 'Flax', tex: 25, share: 1, waste: 0.02, pernMassG: 28 }],
    ...changes,
  };
}

/** Warp 1 of cloth 1, on the loom since long before the shift. */
export function aFitting(changes: Partial<Fitting> = {}): Fitting {
  return {
    id: uuidV7(0xffff_0000),
    loomId: LOOM_ID,
    effectiveAt: at(-100_000),
    warpId: 'warp-1',
    clothId: 'cloth-1',
    how: 'gaiting',
    ...changes,
  };
}

/** The shipped causes, in force since long before the shift. */
export const someCauses = () => shippedCauses(at(-100_000));

type Own<E> = E extends Entry ? Omit<E, keyof Common | 'kind'> & Partial<Common> : never;
type Common = Pick<
  EntryOf<'note'>,
  'id' | 'schema' | 'shedId' | 'at' | 'by' | 'grantId' | 'deviceId' | 'deviceSeq' | 'recordedAt' | 'source'
>;
/** What a spec says of an entry: its own fields, without the loom or shift (filled in), and any common one it cares about. */
export type EntrySpec<K extends EntryKind> =
  Own<EntryOf<K>> extends infer O
    ? Omit<O, 'loomId' | 'shiftKey' | 'reason'> &
        Partial<Pick<O, Extract<keyof O, 'loomId' | 'shiftKey' | 'reason'>>>
    : never;

const KINDS_WITH_LOOM: readonly EntryKind[] = [
  'reading',
  'stop',
  'standing',
  'resume',
  'count',
  'pay-word',
  'call',
  'attend',
  'repair',
  'care',
  'warp-change',
  'sheet',
  'decide',
];
const KINDS_WITH_SHIFT: readonly EntryKind[] = [
  'reading',
  'assign',
  'count',
  'pay-word',
  'sheet',
  'decide',
  'close',
  'reopen',
];
const KINDS_WITH_REASON: readonly EntryKind[] = ['void', 'amend', 'decide', 'reopen', 'accept', 'refuse'];

/** Makes entries of one tablet with ids and sequence numbers that count up from `first`. */
export function entryBuilder(first = 1, shift: Shift = aShift()) {
  let seq = first - 1;
  /** An entry of `kind`, `minutes` after the builders' shift begins. */
  function entry<K extends EntryKind>(kind: K, minutes: number, own: EntrySpec<K>): EntryOf<K> {
    seq += 1;
    return {
      id: uuidV7(seq),
      schema: schemaOf(kind, own),
      kind,
      shedId: SHED_ID,
      ...(KINDS_WITH_LOOM.includes(kind) ? { loomId: LOOM_ID } : {}),
      ...(KINDS_WITH_SHIFT.includes(kind) ? { shiftKey: shift.key } : {}),
      ...(KINDS_WITH_REASON.includes(kind) ? { reason: 'Mistake' } : {}),
      at: at(minutes),
      by: WEAVER_ID,
      grantId: 'grant-1',
      deviceId: TABLET_ID,
      deviceSeq: seq,
      recordedAt: at(minutes),
      source: 'tap',
      ...own,
    } as unknown as EntryOf<K>;
  }
  /** The same as the book holds it, its corrected moments being the entry's own. */
  function book<K extends EntryKind>(kind: K, minutes: number, own: EntrySpec<K>): BookEntry {
    return bookOf(entry(kind, minutes, own), shift);
  }
  return { entry, book };
}

/** An entry as the book holds it when its device's clock is right. */
export function bookOf(entry: Entry, shift: Shift = aShift()): BookEntry {
  const change = entry.kind === 'amend' ? entry.change : undefined;
  const until = change ? change.until : 'until' in entry ? entry.until : undefined;
  const named = 'shiftKey' in entry ? entry.shiftKey : undefined;
  const moment = change?.at ?? entry.at;
  const fallsIn = moment >= shift.startsAt && moment < shift.endsAt ? shift.key : null;
  return {
    entry,
    at: entry.at,
    until: until ?? null,
    changedAt: change?.at ?? null,
    shiftKey: named ?? fallsIn,
  };
}

/** The builders' loom in the builders' shift: no neighbours, one version of each thing, no entries. */
export function aLineInput(changes: Partial<LineInput> = {}): LineInput {
  return {
    shift: aShift(),
    previous: null,
    next: null,
    loomId: LOOM_ID,
    looms: [{ id: LOOM_ID, shedId: SHED_ID, row: 1 }],
    entries: [],
    loomVersions: [aLoomVersion()],
    clothVersions: [aClothVersion()],
    causeVersions: someCauses(),
    fittings: [aFitting()],
    ...changes,
  };
}
