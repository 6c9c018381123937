import * as z from 'zod/mini';
import { figureSchema } from '../figures/no-figure.js';
import { LIMITS } from './limits.js';
import { instantSchema, refSchema } from './primitives.js';

/** What the tackler's screens ask beyond the book that lies on the device. */

/** Which repair a photo belongs to; the picture itself is the body, as it is. */
export const photoQuerySchema = z.object({ repairId: z.uuidv7() });
export const photoSchema = z.object({
  id: z.uuidv7(),
  /** Its place among the repair's photos, from 0. */
  place: z.int().check(z.gte(0), z.lt(LIMITS.photosPerRepair)),
  /** As kept: re-encoded, without what the camera wrote of place and device. */
  width: z.int(),
  height: z.int(),
  bytes: z.int(),
});
export type PhotoOnWire = z.infer<typeof photoSchema>;

/** The server's public key for web push (VAPID, RFC 8292). */
export const pushKeySchema = z.object({ publicKey: z.string() });
/** What a browser's push manager says of itself (Push API, `PushSubscription.toJSON()`). */
export const pushSubscriptionSchema = z.object({
  endpoint: z.url().check(z.maxLength(1_000)),
  keys: z.object({
    p256dh: z.string().check(z.regex(/^[\w-]{80,100}={0,2}$/)),
    auth: z.string().check(z.regex(/^[\w-]{16,40}={0,2}$/)),
  }),
});
export type PushSubscriptionOnWire = z.infer<typeof pushSubscriptionSchema>;
export const pushEndSchema = z.object({ endpoint: z.string().check(z.maxLength(1_000)) });
export const pushDoneSchema = z.object({ subscribed: z.boolean() });

/** Breaks per 10⁵ picks over some shifts, with the interval of the count, widened by the dispersion between shifts. */
const breaksSchema = z.object({
  count: z.int(),
  rate: figureSchema,
  low: z.nullable(z.number()),
  high: z.nullable(z.number()),
});
const sideSchema = z.object({
  shifts: z.int(),
  picks: z.number(),
  warp: breaksSchema,
  weft: breaksSchema,
});
/** After ÷ before with its 95% interval; `shown`: the interval leaves out 1. */
const changeSchema = z.object({
  ratio: figureSchema,
  low: z.nullable(z.number()),
  high: z.nullable(z.number()),
  shown: z.boolean(),
});

export const repairRecordSchema = z.object({
  id: z.string(),
  at: instantSchema,
  cause: refSchema,
  causeName: z.string(),
  found: z.nullable(z.string()),
  done: z.nullable(z.string()),
  part: z.nullable(z.string()),
  ran: z.nullable(z.enum(['well', 'watch', 'stands'])),
  nearMiss: z.nullable(z.string()),
  /** Null: not for the asker's eyes. */
  by: z.nullable(z.string()),
  /** `kept` false: the tablet has not sent it yet. */
  photos: z.array(z.object({ id: z.string(), kept: z.boolean() })),
  /** Among repairs for the same cause: this is the nth within so many shifts of the loom; null: the only one. */
  repeat: z.nullable(z.object({ nth: z.int(), shifts: z.int() })),
  before: sideSchema,
  after: sideSchema,
  warpChange: changeSchema,
  weftChange: changeSchema,
  /** Another warp lay in the loom on the one side: those shifts are left out. */
  otherWarp: z.boolean(),
});
export type RepairRecord = z.infer<typeof repairRecordSchema>;

const jobStateSchema = z.object({
  jobId: refSchema,
  name: z.string(),
  everyPicks: z.number(),
  /** Picks since it was last done, or since the book knows the loom. */
  picks: z.number(),
  lastAt: z.nullable(instantSchema),
});

export const loomHistoryQuerySchema = z.object({ loomId: refSchema });
export const loomHistorySchema = z.object({
  asOf: instantSchema,
  loomId: refSchema,
  loomNumber: z.int(),
  alley: z.string(),
  /** How far back it reaches. */
  since: instantSchema,
  /** Newest first. */
  repairs: z.array(repairRecordSchema),
  /** What is in the loom now; null: the book does not know. */
  fitting: z.nullable(
    z.object({
      since: instantSchema,
      how: z.enum(['gaiting', 'knotting', 'as-found']),
      warpId: z.nullable(refSchema),
      warpName: z.nullable(z.string()),
      clothId: refSchema,
      clothName: z.string(),
      lengthM: z.nullable(z.number()),
      sizeSet: z.nullable(z.string()),
      weftLot: z.nullable(z.string()),
      /** Woven on it, up to the last reading. */
      picks: z.number(),
    }),
  ),
  jobs: z.array(jobStateSchema),
});
export type LoomHistory = z.infer<typeof loomHistorySchema>;

export const aheadQuerySchema = z.object({ shedId: refSchema });
const place = { loomId: refSchema, loomNumber: z.int(), alley: z.string() };
export const tacklerAheadSchema = z.object({
  asOf: instantSchema,
  /** Soonest first; those without a moment last. */
  beams: z.array(
    z.object({
      ...place,
      warpId: z.nullable(refSchema),
      warpName: z.nullable(z.string()),
      clothId: refSchema,
      clothName: z.string(),
      since: instantSchema,
      /** Woven on it, up to `known`. */
      picks: z.number(),
      known: instantSchema,
      picksLeft: figureSchema,
      metresLeft: figureSchema,
      expected: figureSchema,
      earliest: figureSchema,
      latest: figureSchema,
    }),
  ),
  /** Those that are due, the longest overdue (as a share of its picks) first. */
  jobs: z.array(z.object({ ...place, ...jobStateSchema.shape })),
});
export type TacklerAhead = z.infer<typeof tacklerAheadSchema>;
