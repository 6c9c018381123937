import * as z from 'zod/mini';
import { figuresSchema, groupFiguresSchema, loomLineSchema } from '../entries/loom-line.js';
import { HOLD_REASONS } from './errors.js';
import { instantSchema, nameSchema, refSchema } from './primitives.js';
import { shiftSchema } from './reference.js';
import { pulledEntrySchema } from './sync.js';

/** An entry with what the foreman asks of it: who, on which device, when it came, why it waits and who decided. */
export const recordedEntrySchema = z.object({
  ...pulledEntrySchema.shape,
  /** The author's name, and the device's. */
  by: z.string(),
  device: z.string(),
  receivedAt: instantSchema,
  holds: z.array(
    z.object({
      /** `*`: whatever the shift. */
      shiftKey: z.string(),
      reason: z.enum(HOLD_REASONS),
      state: z.enum(['held', 'accepted', 'refused']),
      /** Who decided; null: nobody yet. */
      decidedBy: z.nullable(z.string()),
    }),
  ),
});
export type RecordedEntry = z.infer<typeof recordedEntrySchema>;

/** One loom line with all that was ever said of it, held and voided entries too. */
export const loomRecordSchema = z.object({
  asOf: instantSchema,
  shift: shiftSchema,
  shedName: nameSchema,
  loomId: refSchema,
  loomNumber: z.int(),
  /** The looms before and after it on the sheet; null: none. */
  before: z.nullable(z.object({ loomId: refSchema, loomNumber: z.int() })),
  after: z.nullable(z.object({ loomId: refSchema, loomNumber: z.int() })),
  clothNames: z.array(z.string()),
  weaverNames: z.array(z.string()),
  line: loomLineSchema,
  figures: figuresSchema,
  entries: z.array(recordedEntrySchema),
});
export type LoomRecord = z.infer<typeof loomRecordSchema>;

/** What of a line's totals is set side by side, before and after. */
export const lineSumsSchema = z.object({
  picks: z.nullable(z.number()),
  possiblePicks: z.nullable(z.number()),
  measuredMinutes: z.number(),
  estimatedMinutes: z.number(),
  warpBreaks: z.int(),
  weftBreaks: z.int(),
  stops: z.int(),
  perns: z.int(),
});
export type LineSums = z.infer<typeof lineSumsSchema>;

export const changedLineSchema = z.object({
  loomId: refSchema,
  loomNumber: z.int(),
  before: lineSumsSchema,
  after: lineSumsSchema,
});
export type ChangedLine = z.infer<typeof changedLineSchema>;

/** Entries that wait for a decision about a shift, each with what it would change alone, and all of them together. */
export const heldEntriesSchema = z.object({
  asOf: instantSchema,
  shift: shiftSchema,
  shedName: nameSchema,
  entries: z.array(
    z.object({
      ...recordedEntrySchema.shape,
      /** What it corrects, ends or decides; null: it stands for itself. */
      target: z.nullable(recordedEntrySchema),
      /** The looms it is about. */
      looms: z.array(z.object({ loomId: refSchema, loomNumber: z.int() })),
      /** Lines whose totals it would change. */
      changes: z.array(changedLineSchema),
    }),
  ),
  /** The shed's figures as they are, and with all of these accepted. */
  before: groupFiguresSchema,
  after: groupFiguresSchema,
});
export type HeldEntries = z.infer<typeof heldEntriesSchema>;

/** What was signed of a shift, version by version; every version is kept. */
export const signedVersionsSchema = z.object({
  shift: shiftSchema,
  versions: z.array(
    z.object({
      version: z.int(),
      at: instantSchema,
      by: z.string(),
      /** Signed at a closing, restated when a held entry was accepted, or by a manager's *recalculate from a date*. */
      how: z.enum(['close', 'accept', 'recalculate']),
      /** The closing's note, or why the held entry was accepted, or why it was recalculated. */
      words: z.nullable(z.string()),
      group: groupFiguresSchema,
      /** Lines whose totals are not those of the version before. */
      changed: z.array(changedLineSchema),
    }),
  ),
  /** Reopenings, oldest first. */
  reopened: z.array(z.object({ at: instantSchema, by: z.string(), reason: z.string() })),
});
export type SignedVersions = z.infer<typeof signedVersionsSchema>;
