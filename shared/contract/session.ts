import * as z from 'zod/mini';
import { LIMITS } from './limits.js';
import { instantSchema, nameSchema, refSchema } from './primitives.js';
import { PERMISSIONS, ROLES } from './roles.js';

export const pinSchema = z.string().check(z.regex(/^\d{6}$/));
/** Length in characters here; the 72 bytes that bcrypt reads are checked where it is hashed. */
export const passwordSchema = z.string().check(z.minLength(1), z.maxLength(200));
export const emailSchema = z.string().check(z.trim(), z.toLowerCase(), z.email(), z.maxLength(254));
export const worksNumberSchema = z.string().check(z.regex(/^\d{1,6}$/));

export const officeSignInSchema = z.object({
  email: emailSchema,
  password: passwordSchema,
  /** The browser's own id: entries made in an office browser carry it as their device. */
  browserId: z.uuidv7(),
});
export const floorSignInSchema = z.object({ worksNumber: worksNumberSchema, pin: pinSchema });
export const refreshSchema = z.object({ browserId: z.optional(z.uuidv7()) });

export const signedInPersonSchema = z.object({
  id: refSchema,
  name: nameSchema,
  shortName: nameSchema,
  worksNumber: z.nullable(z.string()),
  roles: z.array(z.enum(ROLES)),
  permissions: z.array(z.enum(PERMISSIONS)),
  /** Sheds the person may see; empty: all. */
  shedIds: z.array(refSchema),
});
export type SignedInPerson = z.infer<typeof signedInPersonSchema>;

/** The server's word that this person may log on this device. Entries carry its id. */
export const grantSchema = z.object({
  id: refSchema,
  personId: refSchema,
  deviceId: refSchema,
  issuedAt: instantSchema,
});
export type Grant = z.infer<typeof grantSchema>;

export const deviceStateSchema = z.object({
  id: refSchema,
  kind: z.enum(['tablet', 'browser']),
  name: nameSchema,
  /** The shed a tablet belongs to; null: an office browser. */
  shedId: z.nullable(refSchema),
  revoked: z.boolean(),
});
export type DeviceState = z.infer<typeof deviceStateSchema>;

/** Answer to sign-in and refresh. Not signed in is `person: null`, with status 200. */
export const sessionSchema = z.object({
  /** JWT, 15 min, kept in memory only. Null: neither a person nor a tablet is known here. */
  accessToken: z.nullable(z.string()),
  accessExpiresAt: z.nullable(instantSchema),
  serverNow: instantSchema,
  person: z.nullable(signedInPersonSchema),
  grant: z.nullable(grantSchema),
  device: z.nullable(deviceStateSchema),
  /** The mill has no manager yet: the first-run screen is next. */
  needsFirstManager: z.boolean(),
});
export type Session = z.infer<typeof sessionSchema>;

export const firstManagerSchema = z.object({
  /** The one-time code that the server prints while the mill has no manager. */
  code: z.string().check(z.minLength(4), z.maxLength(40)),
  millName: nameSchema,
  timeZone: z.string().check(z.minLength(1), z.maxLength(60)),
  /** What is shown and typed; metric unless said. */
  units: z.optional(z.enum(['metric', 'imperial'])),
  name: nameSchema,
  email: emailSchema,
  password: passwordSchema,
  browserId: z.uuidv7(),
});

export const registerDeviceSchema = z.object({ name: nameSchema, shedId: refSchema });
export const deviceRowSchema = z.object({
  ...deviceStateSchema.shape,
  registeredAt: instantSchema,
  revokedAt: z.nullable(instantSchema),
  lastSeenAt: z.nullable(instantSchema),
  /** Server minus device, ms, at the last exchange. */
  clockOffset: z.nullable(z.int()),
  appVersion: z.nullable(z.string()),
  /** How many entries waited there when it last sent some, these not counted. Null: it has sent none. */
  waiting: z.nullable(z.int()),
  /** Whether its browser has promised to keep its storage; null: not said. */
  persisted: z.nullable(z.boolean()),
  /** Highest deviceSeq stored, and how many numbers below it are missing. */
  lastSeq: z.int(),
  gaps: z.int(),
});
export const deviceListSchema = z.object({ devices: z.array(deviceRowSchema) });
export type DeviceRow = z.infer<typeof deviceRowSchema>;

export const personRowSchema = z.object({
  id: refSchema,
  name: nameSchema,
  shortName: nameSchema,
  worksNumber: z.nullable(z.string()),
  email: z.nullable(z.string()),
  roles: z.array(z.enum(ROLES)),
  shedIds: z.array(refSchema),
  disabledAt: z.nullable(instantSchema),
  /** Looms in walking order. */
  usualSet: z.array(refSchema),
  hasPassword: z.boolean(),
  hasPin: z.boolean(),
  /** A letter's link by which this person may choose a password works until then; null: none does. */
  linkUntil: z.nullable(instantSchema),
});
export type PersonRow = z.infer<typeof personRowSchema>;
export const peopleListSchema = z.object({ people: z.array(personRowSchema) });
export const newPersonSchema = z.object({
  name: nameSchema,
  shortName: nameSchema,
  worksNumber: z.nullable(worksNumberSchema),
  email: z.nullable(emailSchema),
  roles: z.array(z.enum(ROLES)).check(z.minLength(1)),
  shedIds: z.array(refSchema),
  usualSet: z.optional(z.array(refSchema).check(z.maxLength(LIMITS.usualSet))),
  pin: z.optional(pinSchema),
  password: z.optional(passwordSchema),
});
export const changePersonSchema = z.object({
  name: z.optional(nameSchema),
  shortName: z.optional(nameSchema),
  worksNumber: z.optional(z.nullable(worksNumberSchema)),
  email: z.optional(z.nullable(emailSchema)),
  usualSet: z.optional(z.array(refSchema).check(z.maxLength(LIMITS.usualSet))),
  roles: z.optional(z.array(z.enum(ROLES)).check(z.minLength(1))),
  shedIds: z.optional(z.array(refSchema)),
  disabled: z.optional(z.boolean()),
  pin: z.optional(pinSchema),
  password: z.optional(passwordSchema),
});
