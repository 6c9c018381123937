import * as z from 'zod/mini';
import { instantSchema, nameSchema, refSchema } from './primitives.js';
import { emailSchema, passwordSchema } from './session.js';

/** Links that work once, codes that work once, PINs that are shown once. */

/** 256 bits as the letter's link carries them, after `#`: so they reach no server's log on the way. */
export const oneTimeTokenSchema = z.string().check(z.regex(/^[\w-]{43}$/));

export const forgottenSchema = z.object({ email: emailSchema });
/** The same for everybody: who works here is nobody's business. */
export const forgottenAnswerSchema = z.object({ asked: z.literal(true) });

export const lookAtLinkSchema = z.object({ token: oneTimeTokenSchema });
export const linkSchema = z.object({
  name: nameSchema,
  email: z.nullable(z.string()),
  purpose: z.enum(['invite', 'reset']),
});
export type OneTimeLink = z.infer<typeof linkSchema>;

export const redeemLinkSchema = z.object({
  token: oneTimeTokenSchema,
  password: passwordSchema,
  browserId: z.uuidv7(),
});

/** Six digits each are hashed at some 60 ms: not the whole mill at once. */
export const PIN_SLIPS_AT_ONCE = 60;
export const askPinSlipsSchema = z.object({
  ids: z.array(refSchema).check(z.minLength(1), z.maxLength(PIN_SLIPS_AT_ONCE)),
});
export const pinSlipSchema = z.object({
  personId: refSchema,
  name: nameSchema,
  worksNumber: z.string(),
  pin: z.string(),
});
export type PinSlip = z.infer<typeof pinSlipSchema>;
export const pinSlipsSchema = z.object({ slips: z.array(pinSlipSchema) });

/** No letters or digits that are taken for one another. */
export const CODE_LETTERS = 'ABCDEFGHJKMNPQRSTUVWXYZ23456789';
export const TABLET_CODE_LENGTH = 8;

export const newTabletCodeSchema = z.object({ name: nameSchema, shedId: refSchema });
export const tabletCodeSchema = z.object({
  /** In two groups, e.g. `K7PM-3XQD`. */
  code: z.string(),
  expiresAt: instantSchema,
  /** What the square code for the tablet's camera says. */
  url: z.string(),
});
export type TabletCode = z.infer<typeof tabletCodeSchema>;
export const registerByCodeSchema = z.object({ code: z.string().check(z.minLength(1), z.maxLength(40)) });

export const renameDeviceSchema = z.object({ name: nameSchema });

/** A code as somebody types it, without what only parts it: `k7pm 3xqd` is `K7PM3XQD`. */
export function plainCode(typed: string): string {
  return typed.toUpperCase().replace(/[^A-Z0-9]/g, '');
}
