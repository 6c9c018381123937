import * as z from 'zod/mini';
import { ERROR_CODES, HOLD_REASONS } from './errors.js';
import { LIMITS } from './limits.js';
import { instantSchema, refSchema } from './primitives.js';
import { fittingSchema, personCardSchema, referenceSchema, shiftSchema } from './reference.js';

/**
 * A push. Entries are looked at one by one (`entrySchema`), so that one bad entry never blocks its neighbours:
 * here they are any JSON objects.
 */
export const pushRequestSchema = z.object({
  /** The device's clock at the moment of sending: the server measures the offset by it. */
  sentAt: instantSchema,
  appVersion: z.optional(z.string().check(z.maxLength(40))),
  /** How many entries wait on the device, these included. */
  waiting: z.optional(z.int().check(z.gte(0))),
  /** Whether the browser has promised to keep the storage that they lie in. */
  persisted: z.optional(z.boolean()),
  /** `mark` of the last answer: a book that does not know it is another one, or an older copy. */
  seen: z.optional(z.string().check(z.maxLength(300))),
  entries: z.array(z.record(z.string(), z.unknown())).check(z.maxLength(LIMITS.entriesPerPush)),
});
export type PushRequest = z.infer<typeof pushRequestSchema>;

/**
 * stored: in the book. duplicate: was in the book already (with what was fixed then). held: in the book, waits for
 * a decision (or, `target-missing`, for its target). refused: not in the book, `code` says why; it stays on the
 * device. later: a schema newer than this server; keep it and send it after the server's upgrade.
 */
export const pushResultSchema = z.object({
  /** As sent; null where the entry had no readable id. */
  id: z.nullable(z.string()),
  /** Its place in the request. */
  index: z.int(),
  result: z.enum(['stored', 'duplicate', 'held', 'refused', 'later']),
  code: z.optional(z.enum(ERROR_CODES)),
  /** What exactly, for `entry-malformed`. */
  detail: z.optional(z.string()),
  hold: z.optional(z.enum(HOLD_REASONS)),
  /** Fixed once, at first acceptance. */
  at: z.optional(instantSchema),
  /** Likewise; null: none was there then, and the entry gets one when it is made. */
  shiftKey: z.optional(z.nullable(refSchema)),
});
export type PushResult = z.infer<typeof pushResultSchema>;

export const pushResponseSchema = z.object({
  serverNow: instantSchema,
  /** Server minus device, ms, as measured by this request. */
  offset: z.int(),
  results: z.array(pushResultSchema),
  /** Where the book stands with these in it; opaque. To be kept with the results, and said at the next exchange. */
  mark: z.optional(z.string()),
  /** True: as in a pull. */
  resend: z.optional(z.boolean()),
});
export type PushResponse = z.infer<typeof pushResponseSchema>;

/** Entries from a file that a device exported: whoever may bring it in vouches for nothing but having it. */
export const bringInRequestSchema = z.object({ entries: pushRequestSchema.shape.entries });
export const bringInResponseSchema = z.object({ results: pushResponseSchema.shape.results });
export type BringInResponse = z.infer<typeof bringInResponseSchema>;

/** `<epoch>.<scope>.<seq>.<id at seq>`: opaque to devices. */
export const cursorSchema = z.string().check(z.maxLength(300));

/** An entry as pulled: the entry (others' authors left out in a floor scope), what the server fixed, and its holds. */
export const pulledEntrySchema = z.object({
  /** An `Entry`; in a floor scope `by`, `grantId` and `deviceId` of others are "-". */
  entry: z.record(z.string(), z.unknown()),
  at: instantSchema,
  until: z.nullable(instantSchema),
  changedAt: z.nullable(instantSchema),
  shiftKey: z.nullable(refSchema),
  /** Per shift (or "*" for all): why it waits, and what was decided. */
  holds: z.array(
    z.object({
      shiftKey: z.string(),
      reason: z.enum(HOLD_REASONS),
      state: z.enum(['held', 'accepted', 'refused']),
    }),
  ),
});
export type PulledEntry = z.infer<typeof pulledEntrySchema>;

export const pullResponseSchema = z.object({
  serverNow: instantSchema,
  /** True: forget what you have of this book (your own waiting entries excepted), this is the whole again. */
  snapshot: z.boolean(),
  /** True: the server's book is not the one you last spoke to; send again what was acknowledged in the last 14 days. */
  resend: z.boolean(),
  cursor: cursorSchema,
  /** More rows wait behind this cursor. */
  more: z.boolean(),
  entries: z.array(pulledEntrySchema),
  shifts: z.array(shiftSchema),
  /** Keys of shifts that are no more. */
  goneShifts: z.optional(z.array(refSchema)),
  fittings: z.array(fittingSchema),
  /** Looms whose fittings stand here whole, though there may be none: what else is known of them is no more. */
  fittingsOf: z.optional(z.array(refSchema)),
  /** Sent whole whenever something of it changed. */
  reference: z.nullable(referenceSchema),
  people: z.nullable(z.array(personCardSchema)),
});
export type PullResponse = z.infer<typeof pullResponseSchema>;

/** The live feed says only that there is something after a number: `event: changed`, `data: {"seq": N}`. */
export const feedEventSchema = z.object({ seq: z.int() });
