import * as z from 'zod/mini';
import { dateSchema, instantSchema, nameSchema, reasonSchema, refSchema } from './primitives.js';
import {
  alleySchema,
  causeVersionSchema,
  clothSchema,
  clothVersionSchema,
  jobSchema,
  loomSchema,
  loomVersionSchema,
  millSchema,
  partSchema,
  shedSchema,
  shiftSchema,
  targetSchema,
  warpSchema,
} from './reference.js';

/**
 * Set-up: what a manager says of the mill. Bodies of `/api/set-up/…`, which the forms validate by as one types; the
 * server asks again. Stored units: cm, picks/cm, tex, m, g, seconds, shares; the forms convert.
 */

const positive = (most: number) => z.number().check(z.gt(0), z.lte(most));
const share = z.number().check(z.gte(0), z.lt(1));

/** Local time of day, HH:mm (ISO 8601). */
export const localTimeSchema = z.string().check(z.regex(/^([01]\d|2[0-3]):[0-5]\d$/));

export const millFormSchema = z.object({
  name: nameSchema,
  units: millSchema.shape.units,
  figuresByPerson: z.enum(['nobody', 'own', 'foremen', 'managers']),
  /** Minutes after which a shared tablet that nobody touches locks. */
  lockAfterMinutes: z.int().check(z.gte(1), z.lte(240)),
});
export type MillForm = z.infer<typeof millFormSchema>;

export const shedFormSchema = z.object({ name: nameSchema });

/** What of a loom is true from a moment on. */
export const loomFactsSchema = z.object({
  ppm: positive(2_000),
  reedSpaceCm: positive(1_000),
  clock: z.object({
    kind: loomVersionSchema.shape.clock.shape.kind,
    unit: z.int().check(z.gte(1), z.lte(100_000)),
    digits: z.int().check(z.gte(2), z.lte(9)),
  }),
  shuttles: z.int().check(z.gte(1), z.lte(16)),
  battery: z.boolean(),
});
export type LoomFacts = z.infer<typeof loomFactsSchema>;

export const loomPlaceSchema = z.object({
  number: z.int().check(z.gte(1), z.lte(99_999)),
  row: z.int().check(z.gte(1), z.lte(200)),
  position: z.int().check(z.gte(1), z.lte(500)),
  alley: nameSchema,
});
export type LoomPlace = z.infer<typeof loomPlaceSchema>;

/** Several looms at once, alike but for their places. */
export const newLoomsSchema = z.object({
  shedId: refSchema,
  /** In the shed from. */
  from: instantSchema,
  places: z.array(loomPlaceSchema).check(z.minLength(1), z.maxLength(500)),
  /** Hold from the beginning, as a cloth's and a cause's first facts do: `effectiveAt` 2000-01-01. */
  facts: loomFactsSchema,
});
/** Moves looms on the plan, renumbers them; history goes with them. All or none. */
export const moveLoomsSchema = z.object({
  looms: z
    .array(z.object({ id: refSchema, ...loomPlaceSchema.shape }))
    .check(z.minLength(1), z.maxLength(500)),
});
/** Takes a loom out of use from a moment (null: it stays after all). Its history is kept. */
export const loomUntilSchema = z.object({ until: z.nullable(instantSchema) });
/** New facts of several looms from a moment; what is left out stays as it was. */
export const newLoomVersionsSchema = z.object({
  loomIds: z.array(refSchema).check(z.minLength(1), z.maxLength(500)),
  effectiveAt: instantSchema,
  facts: z.partial(loomFactsSchema),
});

export const alleyFormSchema = z.object({
  shedId: refSchema,
  name: nameSchema,
  newName: z.optional(nameSchema),
  tacklerIds: z.array(refSchema).check(z.maxLength(50)),
});

export const clothFactsSchema = z.object({
  ends: z.int().check(z.gte(1), z.lte(100_000)),
  picksPerCmOnLoom: positive(500),
  picksPerCmLoomState: positive(500),
  reedWidthCm: positive(1_000),
  crimp: z.number().check(z.gte(0), z.lte(1)),
  abreast: z.int().check(z.gte(1), z.lte(8)),
  /** Shares add up to 1. */
  wefts: z
    .array(
      z.object({
        name: nameSchema,
        tex: positive(20_000),
        share: positive(1),
        waste: share,
        pernMassG: positive(2_000),
      }),
    )
    .check(z.minLength(1), z.maxLength(8)),
});
export type ClothFacts = z.infer<typeof clothFactsSchema>;
export const newClothSchema = z.object({ name: nameSchema, facts: clothFactsSchema });
export const clothFormSchema = z.object({ name: nameSchema, retired: z.boolean() });
export const newClothVersionSchema = z.object({ effectiveAt: instantSchema, facts: clothFactsSchema });

/** A beam in store (or on a loom): its warp. Changing one that was gaited changes no closed shift. */
export const beamFormSchema = z.object({
  name: nameSchema,
  clothId: refSchema,
  lengthM: positive(100_000),
  thrumM: z.number().check(z.gte(0), z.lte(1_000)),
});
export type BeamForm = z.infer<typeof beamFormSchema>;

export const causeFactsSchema = z.object({
  name: nameSchema,
  group: causeVersionSchema.shape.group,
  attendedBy: causeVersionSchema.shape.attendedBy,
  allowanceS: z.nullable(z.number().check(z.gte(0), z.lte(36_000))),
  breakOf: causeVersionSchema.shape.breakOf,
});
export type CauseFacts = z.infer<typeof causeFactsSchema>;
export const newCauseSchema = z.object({ facts: causeFactsSchema });
export const newCauseVersionSchema = z.object({ effectiveAt: instantSchema, facts: causeFactsSchema });

/** What a cloth's looms should reach: a share and breaks per 10⁵ picks; null: no target. */
export const targetFactsSchema = z.object({
  efficiency: z.nullable(z.number().check(z.gt(0), z.lte(1))),
  warpBreaks: z.nullable(z.number().check(z.gte(0), z.lte(1_000))),
  weftBreaks: z.nullable(z.number().check(z.gte(0), z.lte(1_000))),
});
export type TargetFacts = z.infer<typeof targetFactsSchema>;
export const newTargetSchema = z.object({
  clothId: refSchema,
  effectiveAt: instantSchema,
  facts: targetFactsSchema,
});

export const partFormSchema = z.object({ name: nameSchema, retired: z.boolean() });
/** A job of care that is due again after so many picks. */
export const jobFormSchema = z.object({
  name: nameSchema,
  everyPicks: z.int().check(z.gte(1_000), z.lte(10_000_000_000)),
  retired: z.boolean(),
});

export const patternFactsSchema = z.object({
  name: nameSchema,
  startsLocal: localTimeSchema,
  /** Not after the start: it lies on the next day. */
  endsLocal: localTimeSchema,
  /** ISO weekdays on which it starts, 1 Monday … 7 Sunday. */
  weekdays: z.array(z.int().check(z.gte(1), z.lte(7))).check(z.minLength(1), z.maxLength(7)),
  meal: z.nullable(
    z.object({
      startsLocal: localTimeSchema,
      endsLocal: localTimeSchema,
      looms: z.enum(['stopped', 'running']),
    }),
  ),
});
export type PatternFacts = z.infer<typeof patternFactsSchema>;
export const newPatternSchema = z.object({ shedId: refSchema, from: dateSchema, facts: patternFactsSchema });
/** From a date on the pattern is so; before it stays as it was. */
export const changePatternSchema = z.object({ from: dateSchema, facts: patternFactsSchema });
/** The pattern's last date is the day before. */
export const endPatternSchema = z.object({ from: dateSchema });
/** A pattern that was changed from a date is several of these, one after the other, each with its own id. */
export const patternSchema = z.object({
  id: refSchema,
  shedId: refSchema,
  ...patternFactsSchema.shape,
  /** First date, and the first date on which it is no more; null: from the beginning, without end. */
  from: z.nullable(dateSchema),
  until: z.nullable(dateSchema),
});
export type Pattern = z.infer<typeof patternSchema>;

/** Worked examples of a pattern as typed: shifts on an ordinary date and on the nights when the clocks change. */
export const patternExamplesRequestSchema = z.object({
  shedId: refSchema,
  facts: patternFactsSchema,
  /** The pattern that it is to change: it overlaps not that one. */
  patternId: z.optional(refSchema),
  /** From when on; absent: from today. */
  from: z.optional(dateSchema),
});
export const patternExamplesSchema = z.object({
  examples: z.array(
    z.object({
      of: z.enum(['next', 'clocks-forward', 'clocks-back']),
      date: dateSchema,
      startsAt: instantSchema,
      endsAt: instantSchema,
      /** Shift minutes: real elapsed time without a meal at which the looms stand. */
      minutes: z.number(),
    }),
  ),
  /** Patterns of the shed that it would overlap, by name. */
  overlaps: z.array(nameSchema),
});
export type PatternExamples = z.infer<typeof patternExamplesSchema>;

export const calendarDaySchema = z.object({
  shedId: refSchema,
  date: dateSchema,
  /** `*`: all patterns of the day. */
  patternId: z.string().check(z.minLength(1), z.maxLength(64)),
  kind: z.enum(['off', 'short', 'overtime']),
  startsLocal: z.nullable(localTimeSchema),
  endsLocal: z.nullable(localTimeSchema),
  reason: reasonSchema,
});
export type CalendarDay = z.infer<typeof calendarDaySchema>;
export const dropCalendarDaySchema = z.object({ shedId: refSchema, date: dateSchema, patternId: z.string() });

/** Closed shifts from a date on, stated again with what is now in force; a new signed version beside the old. */
export const recalculateSchema = z.object({ shedId: refSchema, from: dateSchema, reason: reasonSchema });
export const recalculatedSchema = z.object({
  shifts: z.int(),
  /** Shifts whose totals are now others than those signed before. */
  changed: z.array(refSchema),
});

export const mailFormSchema = z.object({
  host: z.string().check(z.trim(), z.maxLength(253)),
  port: z.int().check(z.gte(1), z.lte(65_535)),
  security: z.enum(['tls', 'starttls', 'none']),
  user: z.string().check(z.maxLength(254)),
  /** Left out: the one that is kept stays. */
  password: z.optional(z.string().check(z.maxLength(500))),
  from: z.string().check(z.trim(), z.maxLength(254)),
});
export type MailForm = z.infer<typeof mailFormSchema>;
/** Null `host`: no server, letters lie in the data folder. The password never leaves the server. */
export const mailSettingsSchema = z.object({
  host: z.nullable(z.string()),
  port: z.int(),
  security: mailFormSchema.shape.security,
  user: z.string(),
  hasPassword: z.boolean(),
  from: z.string(),
  /** What links in letters begin with, e.g. https://mill.example. */
  baseUrl: z.string(),
});
export type MailSettings = z.infer<typeof mailSettingsSchema>;
export const testLetterSchema = z.object({ to: z.string().check(z.trim(), z.email()) });
export const letterSchema = z.object({
  id: refSchema,
  to: z.string(),
  subject: z.string(),
  at: instantSchema,
  /** kept: lies as .eml in the data folder, there being no mail server. */
  state: z.enum(['waiting', 'sent', 'failed', 'kept']),
  trouble: z.nullable(z.string()),
});
export type Letter = z.infer<typeof letterSchema>;
export const lettersSchema = z.object({ letters: z.array(letterSchema) });
/** What a letter says, while it has not gone out. */
export const letterTextSchema = z.object({ ...letterSchema.shape, text: z.string() });
export type LetterText = z.infer<typeof letterTextSchema>;

/** All that set-up shows of the mill, in one answer: 500 looms are some 100 kB. */
export const setUpSchema = z.object({
  mill: millSchema,
  sheds: z.array(shedSchema),
  looms: z.array(loomSchema),
  loomVersions: z.array(loomVersionSchema),
  alleys: z.array(alleySchema),
  cloths: z.array(clothSchema),
  clothVersions: z.array(clothVersionSchema),
  /** `onLoomId`: on a loom now; `used`: some warp change names it. */
  beams: z.array(z.object({ ...warpSchema.shape, onLoomId: z.nullable(refSchema), used: z.boolean() })),
  causeVersions: z.array(causeVersionSchema),
  targets: z.array(targetSchema),
  parts: z.array(partSchema),
  jobs: z.array(jobSchema),
  patterns: z.array(patternSchema),
  calendar: z.array(calendarDaySchema),
  /** Shifts of the next five weeks. */
  shifts: z.array(shiftSchema),
});
export type SetUp = z.infer<typeof setUpSchema>;

/**
 * What a change answers with: the ids it made or touched; `kept`: shifts that stay as they are, since entries or
 * signatures are in them (or a later shift is closed).
 */
export const changedSchema = z.object({ ids: z.array(refSchema), kept: z.optional(z.array(refSchema)) });
export type Changed = z.infer<typeof changedSchema>;

/** The record of what was changed in set-up: never edited, never deleted. */
export const changeRecordQuerySchema = z.object({
  q: z.optional(z.string().check(z.maxLength(100))),
  /** Older than this number. */
  before: z.optional(z.string().check(z.regex(/^\d{1,15}$/))),
});
export const recordedChangeSchema = z.object({
  seq: z.int(),
  at: instantSchema,
  by: z.nullable(refSchema),
  byName: z.string(),
  /** e.g. `loom`, `cloth`, `person`, `pattern`. */
  what: nameSchema,
  /** The thing's own name at that moment, e.g. "Loom 14". */
  name: z.string(),
  action: z.enum(['added', 'changed', 'ended', 'removed', 'command']),
  /** From when it holds, where it is dated. */
  effectiveAt: z.nullable(instantSchema),
  /** Field by field, as JSON values; null: it was not there. */
  before: z.nullable(z.record(z.string(), z.unknown())),
  after: z.nullable(z.record(z.string(), z.unknown())),
  reason: z.nullable(z.string()),
});
export type RecordedChange = z.infer<typeof recordedChangeSchema>;
export const changeRecordSchema = z.object({ changes: z.array(recordedChangeSchema), more: z.boolean() });
