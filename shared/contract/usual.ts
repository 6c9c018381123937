import * as z from 'zod/mini';
import { rateSchema } from '../entries/loom-line.js';
import { dateSchema, refSchema } from './primitives.js';

/** How many weeks, the running one apart, say what is usual. */
export const USUAL_WEEKS = 8;

export const usualQuerySchema = z.object({ shedId: refSchema });

/**
 * What each loom usually gives with each cloth, whoever minded it: ratios of sums over the closed shifts of the last
 * weeks. Small enough for a tablet to keep.
 */
export const usualSchema = z.object({
  shedId: refSchema,
  /** Mondays, inclusive. */
  from: dateSchema,
  to: dateSchema,
  rows: z.array(
    z.object({
      loomId: refSchema,
      /** Null: the book did not know the cloth. */
      clothId: z.nullable(refSchema),
      /** Shifts that it is from. */
      shifts: z.int(),
      /** Each per 10⁵ picks with its 95% interval, widened where shifts differ more than chance has it. */
      warp: rateSchema,
      weft: rateSchema,
      /** All stops but pern changes. */
      stops: rateSchema,
    }),
  ),
});
export type Usual = z.infer<typeof usualSchema>;
export type UsualRow = Usual['rows'][number];
