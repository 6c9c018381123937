import * as z from 'zod/mini';
import { dateSchema, instantSchema, nameSchema, refSchema } from './primitives.js';
import { ROLES } from './roles.js';

/** What the mill is made of. A versioned thing has its own row a version, in force from `effectiveAt`. */

export const millSchema = z.object({
  name: nameSchema,
  /** IANA time zone, e.g. Europe/London. */
  timeZone: z.string(),
  units: z.enum(['metric', 'imperial']),
  /** Who may see figures by person; absent: a book from before this could be said. */
  figuresByPerson: z.optional(z.enum(['nobody', 'own', 'foremen', 'managers'])),
  /** Minutes after which a shared tablet that nobody touches locks; absent: 5. */
  lockAfterMinutes: z.optional(z.int()),
});
export type Mill = z.infer<typeof millSchema>;

export const shedSchema = z.object({ id: refSchema, name: nameSchema });
export type Shed = z.infer<typeof shedSchema>;

export const loomSchema = z.object({
  id: refSchema,
  shedId: refSchema,
  /** What is painted on the loom. */
  number: z.int(),
  /** Row and place in the row, from 1; the alley beside it. */
  row: z.int(),
  position: z.int(),
  alley: z.string(),
  /** In the shed from, and until (null: still there). */
  from: instantSchema,
  until: z.nullable(instantSchema),
});
export type Loom = z.infer<typeof loomSchema>;

export const CLOCK_KINDS = ['continuous', 'zeroed-each-shift', 'register-a-shift'] as const;

export const loomVersionSchema = z.object({
  id: refSchema,
  loomId: refSchema,
  effectiveAt: instantSchema,
  /** Running speed, picks a minute. */
  ppm: z.number(),
  reedSpaceCm: z.number(),
  clock: z.object({
    kind: z.enum(CLOCK_KINDS),
    /** Picks that one step of the clock stands for: 1, 100, 1,000. */
    unit: z.int(),
    digits: z.int(),
  }),
  shuttles: z.int(),
  /** An automatic loom changes perns from a battery; an ordinary pern change costs it no time. */
  battery: z.boolean(),
});
export type LoomVersion = z.infer<typeof loomVersionSchema>;

/** The passage between two rows, and the tacklers who serve it. Looms name it by `alley`. */
export const alleySchema = z.object({ shedId: refSchema, name: nameSchema, tacklerIds: z.array(refSchema) });
export type Alley = z.infer<typeof alleySchema>;

/** `retired`: no longer offered; what names it keeps its name. */
export const clothSchema = z.object({ id: refSchema, name: nameSchema, retired: z.optional(z.boolean()) });
export type Cloth = z.infer<typeof clothSchema>;

export const clothVersionSchema = z.object({
  id: refSchema,
  clothId: refSchema,
  effectiveAt: instantSchema,
  ends: z.int(),
  picksPerCmOnLoom: z.number(),
  picksPerCmLoomState: z.number(),
  reedWidthCm: z.number(),
  /** Crimp (L − S)/S of the warp, a share. */
  crimp: z.number(),
  /** Cloths woven side by side. */
  abreast: z.int(),
  wefts: z.array(
    z.object({
      name: nameSchema,
      tex: z.number(),
      share: z.number(),
      waste: z.number(),
      pernMassG: z.number(),
    }),
  ),
});
export type ClothVersion = z.infer<typeof clothVersionSchema>;

/** A warp on its beam. */
export const warpSchema = z.object({
  id: refSchema,
  name: nameSchema,
  clothId: refSchema,
  lengthM: z.number(),
  thrumM: z.number(),
});
export type Warp = z.infer<typeof warpSchema>;

export const CAUSE_GROUPS = [
  'warp',
  'weft',
  'loom',
  'waiting',
  'warp-change',
  'care',
  'shed',
  'planned',
] as const;
export type CauseGroup = (typeof CAUSE_GROUPS)[number];
export const ATTENDED_BY = ['weaver', 'tackler', 'knotter', 'nobody'] as const;
export const ARISES_FROM = [
  'yarn',
  'winding',
  'sizing',
  'loom',
  'cloth',
  'supply',
  'planning',
  'unknown',
] as const;

/** A cause of stops, versioned: the mill edits name, allowance and who attends. */
export const causeVersionSchema = z.object({
  id: refSchema,
  causeId: refSchema,
  effectiveAt: instantSchema,
  name: nameSchema,
  group: z.enum(CAUSE_GROUPS),
  attendedBy: z.enum(ATTENDED_BY),
  /** Seconds counted for a stop without duration; null: the cause is always timed, a tap without time counts none. */
  allowanceS: z.nullable(z.number()),
  /** Does it count as a break of warp or weft in "breaks per 10⁵ picks"? */
  breakOf: z.nullable(z.enum(['warp', 'weft'])),
});
export type CauseVersion = z.infer<typeof causeVersionSchema>;

export const shiftSchema = z.object({
  /** `<shedId>:<date>:<patternId>`, or an extra one's own. */
  key: refSchema,
  shedId: refSchema,
  /** The date on which it starts, in the mill's time zone. */
  date: dateSchema,
  patternId: refSchema,
  name: nameSchema,
  /** Half-open [startsAt, endsAt), frozen when made from the pattern. */
  startsAt: instantSchema,
  endsAt: instantSchema,
  /** Meal break; `looms: 'stopped'` lies outside shift minutes. */
  meal: z.nullable(
    z.object({ startsAt: instantSchema, endsAt: instantSchema, looms: z.enum(['stopped', 'running']) }),
  ),
  state: z.enum(['open', 'closed']),
});
export type Shift = z.infer<typeof shiftSchema>;

/** What is on a loom from a moment: the warp and its cloth. Derived from `warp-change` entries. */
export const fittingSchema = z.object({
  /** The root entry's id. */
  id: refSchema,
  loomId: refSchema,
  effectiveAt: instantSchema,
  warpId: z.nullable(refSchema),
  clothId: refSchema,
  how: z.enum(['gaiting', 'knotting', 'as-found']),
});
export type Fitting = z.infer<typeof fittingSchema>;

/** A person as tablets see one: enough to sign in and to name, nothing private. */
export const personCardSchema = z.object({
  id: refSchema,
  worksNumber: z.nullable(z.string()),
  name: nameSchema,
  shortName: nameSchema,
  roles: z.array(z.enum(ROLES)),
  /** Looms of the usual set, in walking order. */
  usualSet: z.array(refSchema),
});
export type PersonCard = z.infer<typeof personCardSchema>;

/** What a cloth's looms should reach from a moment on; null: no target. */
export const targetSchema = z.object({
  id: refSchema,
  clothId: refSchema,
  effectiveAt: instantSchema,
  /** Loom efficiency, a share. */
  efficiency: z.nullable(z.number()),
  /** Per 10⁵ picks. */
  warpBreaks: z.nullable(z.number()),
  weftBreaks: z.nullable(z.number()),
});
export type Target = z.infer<typeof targetSchema>;

/** A spare part, as repairs name it. */
export const partSchema = z.object({ id: refSchema, name: nameSchema, retired: z.boolean() });
export type Part = z.infer<typeof partSchema>;

/** A job of care (oil, picking bands, clean) that is due again after so many picks. */
export const jobSchema = z.object({
  id: refSchema,
  name: nameSchema,
  everyPicks: z.int(),
  retired: z.boolean(),
});
export type Job = z.infer<typeof jobSchema>;

/** Everything a projection or a tablet needs to know of the mill. */
export const referenceSchema = z.object({
  mill: millSchema,
  sheds: z.array(shedSchema),
  looms: z.array(loomSchema),
  loomVersions: z.array(loomVersionSchema),
  cloths: z.array(clothSchema),
  clothVersions: z.array(clothVersionSchema),
  warps: z.array(warpSchema),
  causeVersions: z.array(causeVersionSchema),
  /** Absent in what a device kept from before these were there. */
  alleys: z.optional(z.array(alleySchema)),
  targets: z.optional(z.array(targetSchema)),
  parts: z.optional(z.array(partSchema)),
  jobs: z.optional(z.array(jobSchema)),
});
export type Reference = z.infer<typeof referenceSchema>;

/** The version in force at a moment: the latest that is not later. The list may be in any order. */
export function inForceAt<V extends { effectiveAt: number; id: string }>(
  versions: readonly V[],
  at: number,
): V | undefined {
  let best: V | undefined;
  for (const version of versions) {
    if (version.effectiveAt > at) continue;
    if (
      !best ||
      version.effectiveAt > best.effectiveAt ||
      (version.effectiveAt === best.effectiveAt && version.id > best.id)
    )
      best = version;
  }
  return best;
}
