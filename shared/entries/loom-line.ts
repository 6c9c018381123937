import * as z from 'zod/mini';
import { ATTENDED_BY, ARISES_FROM, CAUSE_GROUPS, shiftSchema } from '../contract/reference.js';
import { instantSchema, refSchema } from '../contract/primitives.js';
import { figureSchema } from '../figures/no-figure.js';
import { BOUNDARIES } from './entry.js';

/**
 * A loom line: one loom in one shift, projected from its entries. It holds nothing that depends on "now": a stop
 * that still stands has `until: null`, and `lineTotals(line, asOf)` does the sums as of a moment. So a rebuild gives
 * the same bytes.
 */

export const LINE_FLAGS = [
  /** No reading serves this boundary. */
  'no-start-reading',
  'no-end-reading',
  /** Two readings of one boundary (or one's end and the next one's start) disagree; value: by how many picks. */
  'readings-disagree',
  /** A reading was taken more than 5 min off its boundary: T is the time between the readings; value: T, min. */
  'reading-off-boundary',
  /**
   * Both readings are there and do not go together: the clock was exchanged in between without a reset reading, or
   * cannot show one of them.
   */
  'clock-changed',
  /** More picks than speed × T × 1.05 + one unit; value: picks. */
  'more-than-possible',
  'agreed-picks',
  /** Picks woven between the last shift's end reading and this one's start reading; value: picks. */
  'woven-between-shifts',
  /** A stop is still open at the shift's end. */
  'stop-still-open',
  /** A new stop was logged while one was open; both stand on record. */
  'stop-inside-stop',
  'time-uncertain',
  /** Two corrections made without sight of each other. */
  'corrected-twice',
  /** Device clock off by more than 2 min; value: ms. */
  'clock-offset',
  /** Logged stops exceed the picks lost; value: picks. */
  'over-logged',
  /** Share of the shift unaccounted for above 10%; value: minutes. */
  'much-unaccounted',
  'estimated-split',
  'no-weaver',
  'no-cloth',
  'no-speed',
] as const;
export type LineFlagCode = (typeof LINE_FLAGS)[number];

export const lineStopSchema = z.object({
  /** The root entry. */
  id: z.string(),
  cause: refSchema,
  group: z.enum(CAUSE_GROUPS),
  attendedBy: z.enum(ATTENDED_BY),
  arisesFrom: z.enum(ARISES_FROM),
  breakOf: z.nullable(z.enum(['warp', 'weft'])),
  /** Where it began (may lie before the shift, then it counts no stop here, only minutes). */
  from: instantSchema,
  /** Null: still stands. Equal to `from` for a tap: no duration of its own. */
  until: z.nullable(instantSchema),
  /** Timed by two moments; else estimated by the cause's allowance. */
  timed: z.boolean(),
  /** How many stops this stands for in this shift (0 where it began in an earlier one). */
  count: z.int(),
  /** For a tap: allowance × count in ms, 0 when it lies inside an open timed stop or the cause is always timed. */
  estimatedMs: z.number(),
  /** A timed stop's time by cause: until called for, waiting for tackler, the tackler's cause. */
  phases: z.array(
    z.object({
      cause: refSchema,
      group: z.enum(CAUSE_GROUPS),
      from: instantSchema,
      until: z.nullable(instantSchema),
    }),
  ),
  /** A shed stop's scope, else null. */
  shedWide: z.boolean(),
  note: z.nullable(z.string()),
});
export type LineStop = z.infer<typeof lineStopSchema>;

export const lineReadingSchema = z.object({
  id: z.string(),
  boundary: z.enum(BOUNDARIES),
  at: instantSchema,
  value: z.int(),
  newValue: z.nullable(z.int()),
  kept: z.boolean(),
  /** `own`: entered for this shift; `neighbour`: the adjoining shift's reading serves here. */
  from: z.enum(['own', 'neighbour']),
});
export type LineReading = z.infer<typeof lineReadingSchema>;

export const stretchSchema = z.object({
  from: instantSchema,
  until: instantSchema,
  loomVersionId: z.nullable(refSchema),
  ppm: z.nullable(z.number()),
  clothId: z.nullable(refSchema),
  clothVersionId: z.nullable(refSchema),
  warpId: z.nullable(refSchema),
  ends: z.nullable(z.int()),
  weaverId: z.nullable(refSchema),
  /** Picks by its own readings, or by its share of running time (`shared`). Null: not known. */
  picks: z.nullable(z.number()),
  picksBy: z.enum(['readings', 'shared', 'agreed', 'sheet', 'none']),
});
export type Stretch = z.infer<typeof stretchSchema>;

export const loomLineSchema = z.object({
  shift: shiftSchema,
  shedId: refSchema,
  loomId: refSchema,
  stretches: z.array(stretchSchema),
  stops: z.array(lineStopSchema),
  readings: z.array(lineReadingSchema),
  /** The readings that the picks are taken from. */
  startReadingId: z.nullable(z.string()),
  endReadingId: z.nullable(z.string()),
  /** Picks woven between the two boundaries; null: not known. */
  picks: z.nullable(z.number()),
  picksBy: z.enum(['readings', 'agreed', 'sheet', 'none']),
  /** The minutes that picks are held against, when a reading lies off its boundary; null: the shift's own. */
  readingMinutes: z.nullable(z.number()),
  /** Hand-over totals by cause (taps included); where a cause is not here its taps count. */
  handOverCounts: z.record(z.string(), z.int()),
  /** Minutes by cause from a paper sheet (what was timed by taps included). */
  sheetMinutes: z.record(z.string(), z.number()),
  /** What the sums need to know of each cause in the two records above; allowance 0: costs no time of its own. */
  totalledCauses: z.record(
    z.string(),
    z.object({
      group: z.enum(CAUSE_GROUPS),
      breakOf: z.nullable(z.enum(['warp', 'weft'])),
      allowanceMs: z.number(),
      versionId: z.nullable(refSchema),
    }),
  ),
  flags: z.array(
    z.object({ code: z.enum(LINE_FLAGS), value: z.optional(z.number()), entryId: z.optional(z.string()) }),
  ),
  /** Ids of every version that the line used: closing keeps them. */
  versionIds: z.array(z.string()),
});
export type LoomLine = z.infer<typeof loomLineSchema>;

/**
 * What of a line adds up. Totals of a group are sums of these, figures of a group are ratios of the sums.
 * Minutes are minutes, picks are picks. `picks` and what needs it are null where the picks are not known.
 */
export const lineTotalsSchema = z.object({
  /** T: minutes the picks are held against (shift length less meals with looms stopped, or between readings). */
  minutes: z.number(),
  /** P, H, S: planned, shed-stop, and all stop minutes (union of intervals plus estimates), within T. */
  plannedMinutes: z.number(),
  shedStopMinutes: z.number(),
  stopMinutes: z.number(),
  measuredMinutes: z.number(),
  estimatedMinutes: z.number(),
  /** n·T, n·(T − P), n·(T − P − H), each stretch at its own speed. Null: speed unknown. */
  possiblePicks: z.nullable(z.number()),
  possibleScheduled: z.nullable(z.number()),
  possibleLessShed: z.nullable(z.number()),
  /** Lost picks by logged stops at the loom's speed. */
  measuredPicks: z.nullable(z.number()),
  estimatedPicks: z.nullable(z.number()),
  picks: z.nullable(z.number()),
  /** Minutes that the picks take at the loom's own speed, A/n summed over stretches: adds up over looms. */
  weavingMinutes: z.nullable(z.number()),
  warpBreaks: z.int(),
  weftBreaks: z.int(),
  /** All stops counted but pern changes. */
  stops: z.int(),
  perns: z.int(),
  /** picks × ends, for breaks per 10³ ends. */
  pickEnds: z.nullable(z.number()),
  /** Minutes lost by cause (after precedence and clipping; estimates included). */
  minutesByCause: z.record(z.string(), z.object({ measured: z.number(), estimated: z.number() })),
});
export type LineTotals = z.infer<typeof lineTotalsSchema>;

export const rateSchema = z.object({
  count: z.int(),
  /** Per 10⁵ picks. */
  rate: figureSchema,
  /** 95% interval of the rate; null where there is no figure. */
  low: z.nullable(z.number()),
  high: z.nullable(z.number()),
});
export type Rate = z.infer<typeof rateSchema>;

/** Figures of a line or of a group of lines. Shares are 0…1 (and above, flagged). */
export const figuresSchema = z.object({
  efficiency: figureSchema,
  efficiencyScheduled: figureSchema,
  efficiencyLessShed: figureSchema,
  picks: figureSchema,
  picksPerHour: figureSchema,
  picksPerRunningHour: figureSchema,
  warp: rateSchema,
  weft: rateSchema,
  warpPer1000Ends: figureSchema,
  lostPicks: figureSchema,
  /** Minutes at the loom's own speed; negative is over-logged. */
  unaccountedMinutes: figureSchema,
  measuredMinutes: z.number(),
  estimatedMinutes: z.number(),
  stopMinutes: z.number(),
  minutes: z.number(),
  /** For a shift that still runs: what it can be at most by logged stops alone. Null once it is over and read. */
  atMost: z.nullable(z.object({ efficiency: figureSchema, picks: figureSchema, asOf: instantSchema })),
});
export type Figures = z.infer<typeof figuresSchema>;

export const groupFiguresSchema = z.object({
  figures: figuresSchema,
  lines: z.int(),
  /** Lines left out since they have no figure (a reading is missing) or agreed picks. */
  linesLeftOut: z.int(),
  /** Picks of the lines left out for agreed picks: paid, but not in the ratios. */
  agreedPicks: z.number(),
});
export type GroupFigures = z.infer<typeof groupFiguresSchema>;
