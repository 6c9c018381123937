import { LIMITS } from '../contract/limits.js';
import { inForceAt, type ClothVersion, type Fitting, type LoomVersion } from '../contract/reference.js';
import { overlapMs, without, type Span, type Standing } from '../figures/standing-time.js';
import type { LineReading, Stretch } from './loom-line.js';
import type { LineReadings } from './line-readings.js';
import type { WeaverChange } from './weavers.js';

/** Versions and fittings of one loom, and who minds it. */
export interface StretchInput {
  readonly window: Span;
  readonly loomVersions: readonly LoomVersion[];
  readonly clothVersions: readonly ClothVersion[];
  readonly fittings: readonly Fitting[];
  readonly weavers: readonly WeaverChange[];
  /** When the loom stood by its timed stops, whatever for: spans that may overlap. */
  readonly stood: readonly Span[];
  readonly changeReadings: readonly LineReading[];
}

/** Stretches without their picks, and which of their boundaries have a reading of their own. */
export interface BareStretches {
  readonly stretches: readonly Stretch[];
  /** Boundary moment → the change reading that serves it. */
  readonly readings: ReadonlyMap<number, LineReading>;
}

/**
 * Cuts a line at each change of warp, cloth, weaver or speed within its window. Every stretch uses what is in force
 * at its start. A change reading serves the nearest such change within 5 min, or as far away as the loom stood all
 * the time in between; a reading that serves none cuts the line where it was taken.
 */
export function cutStretches(input: StretchInput): BareStretches {
  const { window } = input;
  const within = (at: number) => at > window.from && at < window.until;
  const changes = [
    ...changesOf(input.fittings, window, (one) => `${one?.warpId} ${one?.clothId}`),
    ...changesOf(input.loomVersions, window, (one) => `${one?.ppm}`),
    ...input.weavers.map((one) => one.at),
  ].filter(within);
  const moments = [...new Set(changes)].sort((a, b) => a - b);
  const readings = new Map<number, LineReading>();
  for (const reading of input.changeReadings.filter((one) => within(one.at))) {
    const at = nearest(moments, reading.at, input.stood) ?? reading.at;
    const rival = readings.get(at);
    if (!rival || Math.abs(reading.at - at) < Math.abs(rival.at - at)) readings.set(at, reading);
  }
  const cuts = [...new Set([window.from, ...moments, ...readings.keys()])].sort((a, b) => a - b);
  const stretches = cuts.map((from, i) => stretchAt(input, from, cuts[i + 1] ?? window.until));
  return { stretches, readings };
}

/** Moments in the window at which something that matters differs from what was in force just before. */
function changesOf<V extends { id: string; effectiveAt: number }>(
  versions: readonly V[],
  window: Span,
  what: (version: V | undefined) => string,
): number[] {
  const moments = [...new Set(versions.map((one) => one.effectiveAt))].filter(
    (at) => at > window.from && at < window.until,
  );
  return moments.filter((at) => what(inForceAt(versions, at - 1)) !== what(inForceAt(versions, at)));
}

function nearest(moments: readonly number[], at: number, stood: readonly Span[]): number | null {
  const close = moments.filter((moment) => {
    const between = { from: Math.min(moment, at), until: Math.max(moment, at) };
    const stoodAllTheTime = stood.some((span) => span.from <= between.from && between.until <= span.until);
    return between.until - between.from <= LIMITS.readingOffBoundary || stoodAllTheTime;
  });
  return close.sort((a, b) => Math.abs(a - at) - Math.abs(b - at) || a - b)[0] ?? null;
}

function stretchAt(input: StretchInput, from: number, until: number): Stretch {
  const version = inForceAt(input.loomVersions, from);
  const fitting = inForceAt(input.fittings, from);
  const cloth =
    fitting &&
    inForceAt(
      input.clothVersions.filter((one) => one.clothId === fitting.clothId),
      from,
    );
  return {
    from,
    until,
    loomVersionId: version?.id ?? null,
    ppm: version?.ppm ?? null,
    clothId: fitting?.clothId ?? null,
    clothVersionId: cloth?.id ?? null,
    warpId: fitting?.warpId ?? null,
    ends: cloth?.ends ?? null,
    weaverId: input.weavers.filter((one) => one.at <= from).at(-1)?.weaverId ?? null,
    picks: null,
    picksBy: 'none',
  };
}

/** What the picks of stretches are made from. */
export interface PicksInput {
  readonly bare: BareStretches;
  readonly from: LineReadings;
  /** The start as far as it is known, be it implied. */
  readonly shiftStartsAt: number;
  readonly meal: Span | null;
  /** By precedence, not overlapping. */
  readonly standing: readonly Standing[];
  /** Estimated ms of the taps within a span. */
  estimatedMs(span: Span): number;
}

/** Stretches with picks; `inconsistent`: by how many picks the change readings contradict start and end. */
export interface PickedStretches {
  readonly stretches: Stretch[];
  readonly inconsistent: number;
}

/**
 * Gives each stretch its picks: by its own readings where it has them on both sides; else its group's picks by its
 * share of running time (`shared`, estimated). Where only one stretch of the group ran at all, its picks are read.
 */
export function sharePicks(input: PicksInput): PickedStretches {
  const { bare, from } = input;
  const stretches = [...bare.stretches];
  if (from.picks === null) return { stretches, inconsistent: 0 };
  if (from.picksBy !== 'readings')
    return {
      stretches: shareOut(stretches, from.picks, input, from.picksBy === 'agreed' ? 'agreed' : 'sheet'),
      inconsistent: 0,
    };
  const groups = groupsBetweenReadings(input);
  const sum = groups.reduce<number | null>(
    (total, one) => (total === null || one.picks === null ? null : total + one.picks),
    0,
  );
  if (sum !== from.picks)
    return {
      stretches: shareOut(stretches, from.picks, input, 'readings'),
      inconsistent: Math.abs((sum ?? 0) - from.picks),
    };
  return {
    stretches: groups.flatMap((one) => shareOut(one.stretches, one.picks ?? 0, input, 'readings')),
    inconsistent: 0,
  };
}

function groupsBetweenReadings({ bare, from, shiftStartsAt }: PicksInput) {
  const groups: { stretches: Stretch[]; picks: number | null }[] = [];
  let point = from.start ?? { at: shiftStartsAt, value: 0 };
  let open: Stretch[] = [];
  for (const stretch of bare.stretches) {
    const reading = bare.readings.get(stretch.from);
    if (reading && open.length > 0) {
      groups.push({ stretches: open, picks: from.picksFrom(point, reading) });
      point = reading;
      open = [];
    }
    open.push(stretch);
  }
  groups.push({ stretches: open, picks: from.end ? from.picksFrom(point, from.end) : null });
  return groups;
}

function shareOut(
  stretches: readonly Stretch[],
  picks: number,
  input: PicksInput,
  by: 'readings' | 'agreed' | 'sheet',
): Stretch[] {
  const ran = stretches.map((one) => runningMs(one, input));
  const running = ran.some((ms) => ms > 0) ? ran : stretches.map((one) => one.until - one.from);
  const all = running.reduce((sum, ms) => sum + ms, 0);
  const shared = running.filter((ms) => ms > 0).length > 1;
  const lastRunning = running.reduce((last, ms, i) => (ms > 0 ? i : last), 0);
  let left = picks;
  return stretches.map((stretch, i) => {
    const share = i === lastRunning ? left : i > lastRunning ? 0 : (picks * (running[i] ?? 0)) / all;
    left -= share;
    return { ...stretch, picks: share, picksBy: shared ? 'shared' : by };
  });
}

function runningMs(stretch: Stretch, { standing, meal, estimatedMs }: PicksInput): number {
  const length = without([stretch], meal).reduce((sum, one) => sum + one.until - one.from, 0);
  const stood = without(standing, meal).reduce((sum, one) => sum + overlapMs(one, stretch), 0);
  const running = length - stood;
  // Allowances are estimates: they cannot make a stretch that ran not have run.
  return running <= 0 ? 0 : Math.max(1, running - estimatedMs(stretch));
}
