import type { Shift } from '../contract/reference.js';
import { isAnotherClock, picksBetween, type PickClock } from '../figures/pick-clock.js';
import { isNoFigure } from '../figures/no-figure.js';
import type { Span } from '../figures/standing-time.js';
import {
  lastOf,
  ownReadings,
  resetReadings,
  served,
  type ReadingsInput,
  type Served,
} from './boundary-readings.js';
import { isKind, type ResolvedOf } from './corrections.js';
import type { LineReading, LoomLine } from './loom-line.js';
import { byText } from './order.js';

type Flag = LoomLine['flags'][number];

/** What a line's readings say. */
export interface LineReadings {
  /** All that serve this line, by moment. */
  readonly readings: readonly LineReading[];
  readonly start: LineReading | null;
  readonly end: LineReading | null;
  readonly picks: number | null;
  readonly picksBy: LoomLine['picksBy'];
  /** What picks are held against; meals are still in it. */
  readonly window: Span;
  /** A reading lies off its boundary: T is the time between the two. */
  readonly offBoundary: boolean;
  readonly sheet: ResolvedOf<'sheet'> | null;
  readonly flags: readonly Flag[];
  /** Picks between two points of the line in time, resets in between included; null: the clock cannot say. */
  picksFrom(from: ClockPoint, to: ClockPoint): number | null;
}

/** A moment at which it is known what the clock shows. */
export interface ClockPoint {
  readonly at: number;
  readonly value: number;
}

/**
 * Finds the readings that serve the line's two boundaries and takes the picks from them.
 *
 * A boundary is served by the shift's own reading and, on a continuous clock, by that of the adjoining shift; if
 * they disagree and nobody has decided, there are no picks. A clock that is zeroed each shift starts at 0 unless
 * somebody read it; a register of its own stands where its last shift left it.
 */
export function lineReadings(input: ReadingsInput): LineReadings {
  const { shift } = input;
  const clock = input.clockAt(shift.startsAt);
  const sheets = input.resolved.filter((one) => isKind(one, 'sheet'));
  const sheet = lastOf(sheets.filter((one) => one.entry.shiftKey === shift.key));
  const startServed = served(input, sheets, sheet, 'start', clock);
  const endServed = served(input, sheets, sheet, 'end', clock);
  const impliedStart =
    clock?.kind === 'zeroed-each-shift' && startServed.candidates.length === 0
      ? { at: shift.startsAt, value: 0 }
      : null;
  const own = ownReadings(input).filter((one) => one.boundary === 'change' || one.boundary === 'reset');
  const resets = resetReadings(input, clock);
  const picksFrom = (from: ClockPoint, to: ClockPoint) => picksOver(input, resets, from, to);
  const startPoint = startServed.chosen ?? impliedStart;
  const endPoint = endServed.chosen;
  const readPicks = startPoint && endPoint ? picksFrom(startPoint, endPoint) : null;
  const lent =
    startPoint && endPoint
      ? resets.filter((one) => one.from === 'neighbour' && liesBetween(one, startPoint, endPoint))
      : [];
  const agreed = agreedPicks(input);
  const picks = agreed ?? readPicks ?? sheet?.entry.picks ?? null;
  const picksBy =
    agreed !== null ? 'agreed' : readPicks !== null ? 'readings' : picks !== null ? 'sheet' : 'none';
  const missing = [
    ...boundaryFlags(startServed, 'no-start-reading', impliedStart !== null),
    ...boundaryFlags(endServed, 'no-end-reading', false),
  ];
  const off = [startServed, endServed].flatMap((one) => (one.chosen && one.off ? [one.chosen] : []));
  const between = { from: startPoint?.at ?? shift.startsAt, until: endServed.chosen?.at ?? shift.endsAt };
  const offBoundary = off.length > 0 && picksBy === 'readings' && between.until > between.from;
  return {
    readings: [...startServed.listed, ...own, ...lent, ...endServed.listed].sort(byTime),
    start: startServed.chosen,
    end: endServed.chosen,
    picks,
    picksBy,
    window: offBoundary ? between : { from: shift.startsAt, until: shift.endsAt },
    offBoundary,
    sheet,
    flags: [
      // Picks from a sheet need no readings; two that disagree are still to be looked at.
      ...missing.filter(
        ({ code }) => picksBy !== 'agreed' && (picksBy !== 'sheet' || code === 'readings-disagree'),
      ),
      ...(clock && startPoint && endPoint && picks === null ? [{ code: 'clock-changed' } as const] : []),
      ...off.map((one): Flag => ({ code: 'reading-off-boundary', entryId: one.id })),
      ...sheetFlags(sheet, readPicks, picksBy, clock, sheets, shift),
      ...wovenBetween(input, startServed.chosen),
    ],
    picksFrom,
  };
}

function agreedPicks({ resolved, shift }: ReadingsInput): number | null {
  const decisions = resolved
    .filter((one) => isKind(one, 'decide'))
    .filter((one) => one.entry.shiftKey === shift.key && 'agreedPicks' in one.entry.about);
  const about = lastOf(decisions)?.entry.about;
  return about && 'agreedPicks' in about ? about.agreedPicks : null;
}

/** Picks over a span with resets in it: those before a reset and those after add up. */
function picksOver(
  input: ReadingsInput,
  resets: readonly LineReading[],
  from: ClockPoint,
  to: ClockPoint,
): number | null {
  const within = resets.filter((one) => liesBetween(one, from, to)).sort(byTime);
  let sum = 0;
  let last = from;
  const points: (ClockPoint & { newValue?: number | null })[] = [...within, { at: to.at, value: to.value }];
  for (const point of points) {
    const clock = input.clockAt(Math.max(last.at, input.shift.startsAt));
    // A clock that was exchanged without a reset reading cannot say how far the old one got.
    const until = input.clockAt(Math.min(point.at, input.shift.endsAt) - 1);
    const exchanged = point.newValue === undefined && point.at > last.at && isAnotherClock(clock, until);
    const picks = clock && !exchanged ? picksBetween(clock, last.value, point.value) : null;
    if (picks === null || isNoFigure(picks)) return null;
    sum += picks;
    last = { at: point.at, value: point.newValue ?? 0 };
  }
  return sum;
}

/** Of a reset and a reading of one moment, what the reading shows tells which came first. */
function liesBetween(reset: LineReading, from: ClockPoint, to: ClockPoint): boolean {
  const follows = reset.at > from.at || (reset.at === from.at && (reset.newValue ?? 0) !== from.value);
  return follows && (reset.at < to.at || (reset.at === to.at && reset.value !== to.value));
}

function boundaryFlags(
  one: Served,
  missing: 'no-start-reading' | 'no-end-reading',
  implied: boolean,
): Flag[] {
  if (one.candidates.length === 0) return implied ? [] : [{ code: missing }];
  if (one.chosen) return [];
  const [first] = [...one.candidates].sort((a, b) => byText(a.from, b.from) || byText(a.id, b.id)).reverse();
  return [{ code: 'readings-disagree', value: one.apart ?? 0, entryId: first?.id ?? '' }];
}

/** A sheet whose picks and readings disagree by more than a unit, and a line typed in twice. */
function sheetFlags(
  sheet: ResolvedOf<'sheet'> | null,
  readPicks: number | null,
  picksBy: LoomLine['picksBy'],
  clock: PickClock | null,
  sheets: readonly ResolvedOf<'sheet'>[],
  shift: Shift,
): Flag[] {
  if (!sheet) return [];
  const apart = Math.abs((sheet.entry.picks ?? readPicks ?? 0) - (readPicks ?? 0));
  const twice = sheets.filter((one) => one.entry.shiftKey === shift.key).length > 1;
  const id = sheet.root.entry.id;
  return [
    ...(picksBy === 'readings' && sheet.entry.picks !== undefined && apart > (clock?.unit ?? 1)
      ? [{ code: 'readings-disagree', value: apart, entryId: id } as const]
      : []),
    ...(twice ? [{ code: 'corrected-twice', entryId: id } as const] : []),
  ];
}

/** Picks since the last end reading, where no shift adjoins: nobody's, but not hidden. */
function wovenBetween(input: ReadingsInput, start: LineReading | null): Flag[] {
  const { shift, previous, resolved } = input;
  const clock = input.clockAt(shift.startsAt);
  if (previous || !start || clock?.kind !== 'continuous') return [];
  const earlier = resolved
    .filter((one) => isKind(one, 'reading'))
    .filter(({ entry, at }) => entry.boundary === 'end' && entry.shiftKey !== shift.key && at < start.at);
  const last = lastOf(earlier);
  const clockThen = last && input.clockAt(last.at);
  if (!last || !clockThen || isAnotherClock(clockThen, clock)) return [];
  const before = { at: last.at, value: last.entry.value };
  const picks = picksOver(input, resetReadings(input, clock), before, start);
  return picks === null || picks === 0
    ? []
    : [{ code: 'woven-between-shifts', value: picks, entryId: start.id }];
}

const byTime = (a: LineReading, b: LineReading) =>
  a.at - b.at || byText(a.id, b.id) || byText(a.boundary, b.boundary);
