import { LIMITS } from '../contract/limits.js';
import type { Shift } from '../contract/reference.js';
import { disagreement, picksBetween, type PickClock } from '../figures/pick-clock.js';
import { isNoFigure } from '../figures/no-figure.js';
import type { Span } from '../figures/standing-time.js';
import { isKind, type ResolvedEntry, type ResolvedOf } from './corrections.js';
import type { LineReading, LoomLine } from './loom-line.js';
import { byMoment, byText } from './order.js';

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

export interface ReadingsInput {
  readonly shift: Shift;
  readonly previous: Shift | null;
  readonly next: Shift | null;
  /** Of this loom, voided ones left out, sorted by id. */
  readonly resolved: readonly ResolvedEntry[];
  /** The clock that the loom had at a moment; null: not known. */
  clockAt(at: number): PickClock | null;
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
  const resets = own.filter((one) => one.boundary === 'reset');
  const picksFrom = (from: ClockPoint, to: ClockPoint) => picksOver(input, resets, from, to);
  const startPoint = startServed.chosen ?? impliedStart;
  const readPicks = startPoint && endServed.chosen ? picksFrom(startPoint, endServed.chosen) : null;
  const agreed = agreedPicks(input);
  const picks = agreed ?? readPicks ?? sheet?.entry.picks ?? null;
  const picksBy =
    agreed !== null ? 'agreed' : readPicks !== null ? 'readings' : picks !== null ? 'sheet' : 'none';
  const off = [startServed, endServed].flatMap((one) => (one.chosen && one.off ? [one.chosen] : []));
  const between = { from: startPoint?.at ?? shift.startsAt, until: endServed.chosen?.at ?? shift.endsAt };
  const offBoundary = off.length > 0 && picksBy === 'readings' && between.until > between.from;
  return {
    readings: [...startServed.listed, ...own, ...endServed.listed].sort(byTime),
    start: startServed.chosen,
    end: endServed.chosen,
    picks,
    picksBy,
    window: offBoundary ? between : { from: shift.startsAt, until: shift.endsAt },
    offBoundary,
    sheet,
    flags: [
      ...(picksBy === 'agreed' || picksBy === 'sheet'
        ? []
        : [
            ...boundaryFlags(startServed, 'no-start-reading', impliedStart !== null),
            ...boundaryFlags(endServed, 'no-end-reading', false),
          ]),
      ...off.map((one): Flag => ({ code: 'reading-off-boundary', entryId: one.id })),
      ...sheetFlags(sheet, readPicks, picksBy, clock, sheets, shift),
      ...wovenBetween(input, startServed.chosen),
    ],
    picksFrom,
  };
}

interface Served {
  readonly candidates: readonly LineReading[];
  readonly chosen: LineReading | null;
  /** Those to show: the chosen one, and its rivals. */
  readonly listed: readonly LineReading[];
  readonly off: boolean;
  /** By how many picks they disagree, undecided; null: they agree. */
  readonly apart: number | null;
}

function served(
  input: ReadingsInput,
  sheets: readonly ResolvedOf<'sheet'>[],
  sheet: ResolvedOf<'sheet'> | null,
  boundary: 'start' | 'end',
  clock: PickClock | null,
): Served {
  const { shift } = input;
  const moment = boundary === 'start' ? shift.startsAt : shift.endsAt;
  const own = ownReadings(input).filter((one) => one.boundary === boundary);
  const onSheet = sheet ? sheetReading(sheet, boundary, moment, 'own', boundary) : [];
  const mine = [...own, ...onSheet];
  const neighbours = neighbourReadings(input, sheets, boundary, moment, clock);
  const candidates = [...mine, ...(clock?.kind === 'register-a-shift' && mine.length > 0 ? [] : neighbours)];
  const rivals = new Set(candidates.map((one) => one.value)).size > 1;
  const decided = decision(input, boundary, candidates);
  const nearest = [...candidates].sort(
    (a, b) =>
      Number(a.from === 'neighbour') - Number(b.from === 'neighbour') ||
      Math.abs(a.at - moment) - Math.abs(b.at - moment) ||
      byText(a.id, b.id),
  )[0];
  const chosen = decided ?? (rivals ? null : (nearest ?? null));
  const isOff = chosen !== null && Math.abs(chosen.at - moment) > LIMITS.readingOffBoundary;
  const register = clock?.kind === 'register-a-shift' && chosen?.from === 'neighbour';
  return {
    candidates,
    chosen: register && chosen ? { ...chosen, at: moment } : chosen,
    listed: rivals ? candidates : [...mine, ...(chosen?.from === 'neighbour' ? [chosen] : [])],
    off: isOff && !register,
    apart: rivals && !decided ? widest(candidates, clock) : null,
  };
}

function ownReadings({ resolved, shift }: ReadingsInput): LineReading[] {
  return resolved
    .filter((one) => isKind(one, 'reading'))
    .filter((one) => one.entry.shiftKey === shift.key)
    .map((one) => toReading(one, one.entry.boundary, 'own'));
}

/** Readings of adjoining shifts that serve here: only a continuous clock runs on from shift to shift. */
function neighbourReadings(
  { resolved, shift, previous, next }: ReadingsInput,
  sheets: readonly ResolvedOf<'sheet'>[],
  boundary: 'start' | 'end',
  moment: number,
  clock: PickClock | null,
): LineReading[] {
  const readings = resolved.filter((one) => isKind(one, 'reading'));
  if (clock?.kind === 'register-a-shift' && boundary === 'start') {
    // The register stood still since its own shift last ended, whenever that was.
    const ofRegister = (key: string) =>
      key !== shift.key && key.startsWith(`${shift.shedId}:`) && key.endsWith(`:${shift.patternId}`);
    const earlier = readings.filter(
      (one) => one.entry.boundary === 'end' && one.at < moment && ofRegister(one.entry.shiftKey),
    );
    const last = lastOf(earlier);
    return last ? [toReading(last, boundary, 'neighbour')] : [];
  }
  const neighbour = boundary === 'start' ? previous : next;
  if (!neighbour || (clock && clock.kind !== 'continuous')) return [];
  const theirs = boundary === 'start' ? 'end' : 'start';
  const sheet = lastOf(sheets.filter((one) => one.entry.shiftKey === neighbour.key));
  return [
    ...readings
      .filter((one) => one.entry.shiftKey === neighbour.key && one.entry.boundary === theirs)
      .map((one) => toReading(one, boundary, 'neighbour')),
    ...(sheet ? sheetReading(sheet, theirs, moment, 'neighbour', boundary) : []),
  ];
}

function toReading(
  one: ResolvedOf<'reading'>,
  boundary: LineReading['boundary'],
  from: LineReading['from'],
): LineReading {
  const { value, newValue, kept } = one.entry;
  return {
    id: one.root.entry.id,
    boundary,
    at: one.at,
    value,
    newValue: newValue ?? null,
    kept: kept ?? false,
    from,
  };
}

/** A sheet's reading is taken as read on the boundary itself: paper names no minute. */
function sheetReading(
  sheet: ResolvedOf<'sheet'>,
  which: 'start' | 'end',
  at: number,
  from: LineReading['from'],
  boundary: 'start' | 'end',
): LineReading[] {
  const value = sheet.entry[which];
  if (value === undefined) return [];
  return [{ id: sheet.root.entry.id, boundary, at, value, newValue: null, kept: false, from }];
}

/** The reading that the foreman's last decision names, if it still stands. The neighbour's decision holds here too. */
function decision(
  { resolved, shift, previous, next }: ReadingsInput,
  boundary: 'start' | 'end',
  candidates: readonly LineReading[],
): LineReading | null {
  const neighbour = boundary === 'start' ? previous : next;
  const theirs = boundary === 'start' ? 'end' : 'start';
  const decisions = resolved
    .filter((one) => isKind(one, 'decide'))
    .filter(({ entry: { about, shiftKey } }) => {
      if (!('readingId' in about)) return false;
      if (!candidates.some((one) => one.id === about.readingId)) return false;
      return about.boundary === boundary
        ? shiftKey === shift.key
        : shiftKey === neighbour?.key && about.boundary === theirs;
    });
  const about = lastOf(decisions)?.entry.about;
  if (!about || !('readingId' in about)) return null;
  return candidates.find((one) => one.id === about.readingId) ?? null;
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
  const within = resets.filter((one) => one.at >= from.at && one.at <= to.at).sort(byTime);
  let sum = 0;
  let last = from;
  for (const point of [...within, { ...to, newValue: null }]) {
    const clock = input.clockAt(Math.max(last.at, input.shift.startsAt));
    const picks = clock ? picksBetween(clock, last.value, point.value) : null;
    if (picks === null || isNoFigure(picks)) return null;
    sum += picks;
    last = { at: point.at, value: point.newValue ?? 0 };
  }
  return sum;
}

function widest(candidates: readonly LineReading[], clock: PickClock | null): number | null {
  if (!clock) return null;
  return Math.max(...candidates.flatMap((a) => candidates.map((b) => disagreement(clock, a.value, b.value))));
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
  const then = last && input.clockAt(last.at);
  if (!last || !then || then.unit !== clock.unit || then.digits !== clock.digits) return [];
  const picks = picksBetween(clock, last.entry.value, start.value);
  return isNoFigure(picks) || picks === 0
    ? []
    : [{ code: 'woven-between-shifts', value: picks, entryId: start.id }];
}

const byTime = (a: LineReading, b: LineReading) =>
  a.at - b.at || byText(a.id, b.id) || byText(a.boundary, b.boundary);

/** The latest by corrected moment; ties by device and its sequence. */
export function lastOf<R extends ResolvedEntry>(all: readonly R[]): R | null {
  return [...all].sort((a, b) => a.at - b.at || byMoment(a.root, b.root)).at(-1) ?? null;
}
