import * as z from 'zod/mini';
import { LIMITS } from './limits.js';

/** Milliseconds since 1970-01-01T00:00Z. */
export type Instant = number;

/** A moment: whole milliseconds since 1970, between 2000 and 2100. */
export const instantSchema = z.int().check(z.gte(946_684_800_000), z.lte(4_102_444_800_000));
/** The id of a thing of the mill (loom, cloth, person, shift …): short, printable, no spaces. */
export const refSchema = z.string().check(z.regex(/^[A-Za-z0-9][A-Za-z0-9_.:-]{0,63}$/));
export const nameSchema = z.string().check(z.trim(), z.minLength(1), z.maxLength(LIMITS.nameLength));
export const reasonSchema = z.string().check(z.trim(), z.minLength(1), z.maxLength(LIMITS.reasonLength));
export const textSchema = z.string().check(z.maxLength(LIMITS.textLength));
/** A calendar date, YYYY-MM-DD (ISO 8601). */
export const dateSchema = z.string().check(z.regex(/^\d{4}-\d{2}-\d{2}$/));
export const countSchema = z.int().check(z.gte(0), z.lte(LIMITS.count));
