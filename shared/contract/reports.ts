import * as z from 'zod/mini';
import { figuresSchema, groupFiguresSchema, loomLineSchema } from '../entries/loom-line.js';
import { dateSchema, instantSchema, nameSchema, refSchema } from './primitives.js';
import { shiftSchema } from './reference.js';

export const shiftListQuerySchema = z.object({
  shedId: refSchema,
  /** First and last date, inclusive. */
  from: dateSchema,
  to: dateSchema,
});
export const shiftListSchema = z.object({
  shifts: z.array(
    z.object({
      shift: shiftSchema,
      group: z.nullable(groupFiguresSchema),
      flaggedLines: z.int(),
      held: z.int(),
    }),
  ),
});
export type ShiftList = z.infer<typeof shiftListSchema>;

/** A shift's sheet: its loom lines with their figures, and the shed's. */
export const shiftSheetSchema = z.object({
  asOf: instantSchema,
  shift: shiftSchema,
  shedName: nameSchema,
  lines: z.array(
    z.object({
      loomNumber: z.int(),
      row: z.int(),
      position: z.int(),
      clothNames: z.array(z.string()),
      weaverNames: z.array(z.string()),
      line: loomLineSchema,
      figures: figuresSchema,
    }),
  ),
  total: groupFiguresSchema,
  held: z.int(),
  closed: z.nullable(z.object({ at: instantSchema, by: z.string(), version: z.int() })),
});
export type ShiftSheet = z.infer<typeof shiftSheetSchema>;

export const weeksQuerySchema = z.object({
  shedId: refSchema,
  by: z.enum(['loom', 'row']),
  /** Mondays, inclusive (ISO 8601 weeks, by the date on which a shift starts). */
  from: dateSchema,
  to: dateSchema,
});
/** Looms (or rows) week over week: a row's cells stand in the order of `weeks`. */
export const weeksSchema = z.object({
  by: z.enum(['loom', 'row']),
  weeks: z.array(dateSchema),
  rows: z.array(
    z.object({
      key: z.string(),
      /** Loom number or row number. */
      label: z.string(),
      clothNames: z.array(z.string()),
      cells: z.array(z.nullable(groupFiguresSchema)),
    }),
  ),
  total: z.array(z.nullable(groupFiguresSchema)),
  /** Lines of open shifts are not in Weeks. */
  openShifts: z.int(),
});
export type Weeks = z.infer<typeof weeksSchema>;

export const shedListSchema = z.object({ sheds: z.array(z.object({ id: refSchema, name: nameSchema })) });

export const healthSchema = z.object({
  status: z.enum(['ok', 'closing-down']),
  version: z.string(),
  serverNow: instantSchema,
  epoch: z.string(),
  writerWaiting: z.int(),
});
