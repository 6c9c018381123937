import * as z from 'zod/mini';
import { ARISES_FROM } from '../contract/reference.js';
import { LIMITS } from '../contract/limits.js';
import {
  countSchema,
  instantSchema,
  nameSchema,
  reasonSchema,
  refSchema,
  textSchema,
} from '../contract/primitives.js';
import type { Role } from '../contract/roles.js';

/**
 * What a person says happened, as it leaves the tablet. Entries are append-only: a mistake is voided or amended by
 * another entry. Moments are the device's own clock; the server fixes the corrected moment once, at first acceptance.
 */
export const ENTRY_SCHEMA_VERSION = 2;

/**
 * The version in which a kind came, for those that are not of version 1. An entry names the lowest version that can
 * say it: a server that is a version behind still takes every tap, and keeps only the new kinds for later.
 */
const KINDS_SINCE: Readonly<Partial<Record<string, number>>> = { 'pay-word': 2, care: 2 };
/** Likewise fields that came later than their kind. */
const FIELDS_SINCE: Readonly<Partial<Record<string, Readonly<Record<string, number>>>>> = {
  repair: { ran: 2, partId: 2, photoIds: 2 },
  'warp-change': { lengthM: 2, thrumM: 2, sizeSet: 2, weftLot: 2 },
  note: { about: 2, noteId: 2 },
};

/**
 * The schema version that an entry is stamped with.
 *
 * @param said what the entry says beyond its kind
 */
export function schemaOf(kind: string, said: object = {}): number {
  const since = FIELDS_SINCE[kind] ?? {};
  const named = Object.entries(said).flatMap(([field, value]) =>
    value === undefined ? [] : (since[field] ?? []),
  );
  return Math.max(KINDS_SINCE[kind] ?? 1, ...named);
}

export const BOUNDARIES = ['start', 'end', 'change', 'reset'] as const;
export type Boundary = (typeof BOUNDARIES)[number];

const common = {
  /** UUID v7, made on the device: the same id is the same entry, however often it is sent. */
  id: z.uuidv7(),
  schema: z.int().check(z.gte(1), z.lte(ENTRY_SCHEMA_VERSION)),
  shedId: refSchema,
  /** When it happened, by the device's clock. */
  at: instantSchema,
  /** Author. */
  by: refSchema,
  /** The server's word that this person may log on this device. */
  grantId: refSchema,
  deviceId: refSchema,
  /** Counts up by one an entry on each device, allotted in the entry's own IndexedDB transaction. */
  deviceSeq: z.int().check(z.gte(1)),
  /** When it was tapped, by the device's clock. */
  recordedAt: instantSchema,
  /**
   * What the device knew of its clock when it was tapped: server time minus device time, ms, as last measured;
   * `stepped`: the clock jumped between `at` and the tap, so the time is uncertain.
   */
  clock: z.optional(
    z.object({ offset: z.int(), measuredAt: instantSchema, stepped: z.optional(z.boolean()) }),
  ),
  source: z.enum(['tap', 'paper', 'import']),
  /** Entries that were made in one act (a hand-over, a shed stop, an import): one void takes all back. */
  batchId: z.optional(z.uuidv7()),
};

const loom = { loomId: refSchema };
/** `basedOn`: the last correction that the author saw; absent: none. */
const correction = { targetId: z.uuidv7(), basedOn: z.optional(z.uuidv7()), reason: reasonSchema };
const digits = z.int().check(z.gte(0), z.lt(10 ** LIMITS.clockDigits));

export const readingSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('reading'),
  shiftKey: refSchema,
  boundary: z.enum(BOUNDARIES),
  /** What the pick clock shows, in its own units. For a reset: the old value. */
  value: digits,
  /** For a reset: what it shows afterwards. */
  newValue: z.optional(digits),
  /** The person was asked about an unlikely value on the spot and kept it. */
  kept: z.optional(z.boolean()),
});
export const stopSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('stop'),
  cause: refSchema,
  /** A tap: it stood and runs again. */
  count: countSchema.check(z.gte(1)),
  /** When it ran again, if the person knows both ends. */
  until: z.optional(instantSchema),
  arisesFrom: z.optional(z.enum(ARISES_FROM)),
  note: z.optional(textSchema),
});
export const standingSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('standing'),
  /** `at` is since when it stands. */
  cause: refSchema,
  arisesFrom: z.optional(z.enum(ARISES_FROM)),
  note: z.optional(textSchema),
});
export const resumeSchema = z.object({ ...common, ...loom, kind: z.literal('resume'), targetId: z.uuidv7() });
export const shedStopSchema = z.object({
  ...common,
  kind: z.literal('shed-stop'),
  cause: refSchema,
  /** What stands: the shed, a row, or these looms. */
  scope: z.union([
    z.object({ of: z.literal('shed') }),
    z.object({ of: z.literal('row'), row: z.int() }),
    z.object({
      of: z.literal('looms'),
      loomIds: z.array(refSchema).check(z.minLength(1), z.maxLength(LIMITS.entriesPerPush)),
    }),
  ]),
  until: z.optional(instantSchema),
});
export const assignSchema = z.object({
  ...common,
  kind: z.literal('assign'),
  shiftKey: refSchema,
  /** Null: nobody from now on. */
  weaverId: z.nullable(refSchema),
  loomIds: z.array(refSchema).check(z.minLength(1), z.maxLength(200)),
});
/** A total for the shift, taps included: perns used, counted at hand-over. */
export const countEntrySchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('count'),
  shiftKey: refSchema,
  cause: refSchema,
  total: countSchema,
});
/** A weaver's word on the picks that they are paid for: changes no figure, is held by no closed shift. The last holds. */
export const payWordSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('pay-word'),
  shiftKey: refSchema,
  word: z.enum(['confirmed', 'queried']),
  /** The picks that they saw: figures may be corrected afterwards. */
  picks: z.int().check(z.gte(0)),
  /** What is wrong with them, where they are queried. */
  words: z.optional(textSchema),
});
export const callSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('call'),
  /** The standing stop it is for, if the loom stands. */
  targetId: z.optional(z.uuidv7()),
  words: z.optional(textSchema),
});
export const attendSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('attend'),
  /** The call. */
  targetId: z.uuidv7(),
  step: z.enum(['take', 'arrive', 'done', 'leave']),
});
/** How a loom ran after a repair: well; it runs and wants watching; it stands. */
export const REPAIR_RAN = ['well', 'watch', 'stands'] as const;
export const repairSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('repair'),
  /** The call, if there was one. */
  targetId: z.optional(z.uuidv7()),
  cause: refSchema,
  found: z.optional(textSchema),
  done: z.optional(textSchema),
  /** The part that was put in, in words; `partId` too where it is on the mill's list. */
  part: z.optional(textSchema),
  partId: z.optional(refSchema),
  /** How the loom ran afterwards; `stands`: it does not run yet. */
  ran: z.optional(z.enum(REPAIR_RAN)),
  /** The shuttle flew, say, and hurt nobody: what happened. */
  nearMiss: z.optional(textSchema),
  /** Photos that the device sends after it, in their order. */
  photoIds: z.optional(z.array(z.uuidv7()).check(z.maxLength(LIMITS.photosPerRepair))),
});
/** A job of care that is due by picks was done: it counts anew from here. Changes no figure of the line. */
export const careSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('care'),
  jobId: refSchema,
  note: z.optional(textSchema),
});
export const warpChangeSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('warp-change'),
  how: z.enum(['gaiting', 'knotting', 'as-found']),
  warpId: z.nullable(refSchema),
  clothId: refSchema,
  /** The new warp as it came, metres, where its beam says other than the list or stands on none. */
  lengthM: z.optional(z.number().check(z.gt(0), z.lte(100_000))),
  /** What was left of the old one and cannot be woven, metres. */
  thrumM: z.optional(z.number().check(z.gte(0), z.lte(1_000))),
  /** The sizing set that the new warp is of, and the lot of the weft that goes with it, as their tickets say. */
  sizeSet: z.optional(nameSchema),
  weftLot: z.optional(nameSchema),
});
export const sheetSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('sheet'),
  shiftKey: refSchema,
  start: z.optional(digits),
  end: z.optional(digits),
  picks: z.optional(z.int().check(z.gte(0))),
  counts: z.record(refSchema, countSchema),
  /** Minutes by cause. */
  minutes: z.record(refSchema, z.number().check(z.gte(0))),
  weaverId: z.optional(refSchema),
});
/**
 * The foreman's words to the next one; a loom to watch; a near miss that no repair tells of (or that there was none);
 * relative humidity, %; that the next foreman has read the note.
 */
export const NOTE_ABOUT = ['handover', 'watch', 'near-miss', 'humidity', 'read'] as const;
export const noteSchema = z.object({
  ...common,
  kind: z.literal('note'),
  loomId: z.optional(refSchema),
  shiftKey: z.optional(refSchema),
  text: textSchema,
  /** What it is of a shift's handover; absent: a note of its own. */
  about: z.optional(z.enum(NOTE_ABOUT)),
  /** `read`: the handover note that its author has read. */
  noteId: z.optional(z.uuidv7()),
});
export const voidSchema = z.object({
  ...common,
  kind: z.literal('void'),
  /** The root entry, or all of a batch. */
  targetId: z.optional(z.uuidv7()),
  targetBatchId: z.optional(z.uuidv7()),
  basedOn: z.optional(z.uuidv7()),
  reason: reasonSchema,
});
/** What an amendment may change of its target. `at`/`until` are by this entry's device clock. */
export const amendmentSchema = z.object({
  at: z.optional(instantSchema),
  until: z.optional(z.nullable(instantSchema)),
  loomId: z.optional(refSchema),
  cause: z.optional(refSchema),
  count: z.optional(countSchema),
  total: z.optional(countSchema),
  value: z.optional(digits),
  newValue: z.optional(digits),
  kept: z.optional(z.boolean()),
  arisesFrom: z.optional(z.enum(ARISES_FROM)),
  clothId: z.optional(refSchema),
  warpId: z.optional(z.nullable(refSchema)),
  note: z.optional(textSchema),
});
export const amendSchema = z.object({
  ...common,
  kind: z.literal('amend'),
  ...correction,
  change: amendmentSchema,
});
export const decideSchema = z.object({
  ...common,
  ...loom,
  kind: z.literal('decide'),
  shiftKey: refSchema,
  /** Which of two disagreeing readings holds (a root reading's id), or the picks agreed when the clock is out of order. */
  about: z.union([
    z.object({ boundary: z.enum(['start', 'end']), readingId: z.uuidv7() }),
    z.object({ agreedPicks: z.int().check(z.gte(0)) }),
  ]),
  reason: reasonSchema,
});
export const closeSchema = z.object({
  ...common,
  kind: z.literal('close'),
  shiftKey: refSchema,
  note: z.optional(textSchema),
});
export const reopenSchema = z.object({
  ...common,
  kind: z.literal('reopen'),
  shiftKey: refSchema,
  reason: reasonSchema,
});
/** `targetId`: the held entry. */
export const acceptSchema = z.object({
  ...common,
  kind: z.literal('accept'),
  targetId: z.uuidv7(),
  reason: reasonSchema,
});
export const refuseSchema = z.object({
  ...common,
  kind: z.literal('refuse'),
  targetId: z.uuidv7(),
  reason: reasonSchema,
});

export const entrySchema = z.discriminatedUnion('kind', [
  readingSchema,
  stopSchema,
  standingSchema,
  resumeSchema,
  shedStopSchema,
  assignSchema,
  countEntrySchema,
  payWordSchema,
  callSchema,
  attendSchema,
  repairSchema,
  careSchema,
  warpChangeSchema,
  sheetSchema,
  noteSchema,
  voidSchema,
  amendSchema,
  decideSchema,
  closeSchema,
  reopenSchema,
  acceptSchema,
  refuseSchema,
]);
export type Entry = z.infer<typeof entrySchema>;
export type EntryKind = Entry['kind'];
export type EntryOf<K extends EntryKind> = Extract<Entry, { kind: K }>;
export type Amendment = z.infer<typeof amendmentSchema>;

/** Which roles may log a kind, judged as of the entry's corrected moment. */
export const KIND_ROLES: Readonly<Record<EntryKind, readonly Role[]>> = {
  reading: ['weaver', 'tackler', 'foreman', 'manager'],
  stop: ['weaver', 'tackler', 'foreman', 'manager'],
  standing: ['weaver', 'tackler', 'foreman', 'manager'],
  resume: ['weaver', 'tackler', 'foreman', 'manager'],
  'shed-stop': ['weaver', 'tackler', 'foreman', 'manager'],
  assign: ['weaver', 'foreman', 'manager'],
  count: ['weaver', 'foreman', 'manager'],
  'pay-word': ['weaver'],
  call: ['weaver', 'foreman', 'manager'],
  attend: ['tackler', 'foreman', 'manager'],
  repair: ['tackler', 'foreman', 'manager'],
  // Oiling and cleaning are the weaver's where the mill has it so.
  care: ['weaver', 'tackler', 'foreman', 'manager'],
  'warp-change': ['tackler', 'foreman', 'manager'],
  sheet: ['foreman', 'manager'],
  note: ['weaver', 'tackler', 'foreman', 'manager'],
  void: ['weaver', 'tackler', 'foreman', 'manager'],
  amend: ['weaver', 'tackler', 'foreman', 'manager'],
  decide: ['foreman', 'manager'],
  close: ['foreman', 'manager'],
  reopen: ['foreman', 'manager'],
  accept: ['foreman', 'manager'],
  refuse: ['foreman', 'manager'],
};

/**
 * An entry as the book holds it (or as the tablet provisionally sees one of its own that waits): the entry, its
 * corrected moments, and the shift it belongs to. The projection takes nothing else.
 */
export interface BookEntry {
  readonly entry: Entry;
  /** Corrected moment, ms since 1970. */
  readonly at: number;
  /** Corrected `until`, where the entry has one (for an amendment: its change's). */
  readonly until: number | null;
  /** Corrected `at` in an amendment's change. */
  readonly changedAt?: number | null;
  /** The shift whose [start, end) holds `at`, or the shift that the entry names; null: none. */
  readonly shiftKey: string | null;
}

/** The looms an entry names itself (a correction names none: its target's count). `all`: looms of the shed, for shed stops. */
export function loomsNamedBy(
  entry: Entry,
  all: readonly { id: string; shedId: string; row: number }[],
): readonly string[] {
  if (entry.kind === 'shed-stop') {
    const scope = entry.scope;
    if (scope.of === 'looms') return scope.loomIds;
    return all
      .filter((l) => l.shedId === entry.shedId && (scope.of === 'shed' || l.row === scope.row))
      .map((l) => l.id);
  }
  if (entry.kind === 'assign') return entry.loomIds;
  if ('loomId' in entry && entry.loomId) return [entry.loomId];
  return [];
}
