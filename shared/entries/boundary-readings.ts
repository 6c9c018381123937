import { LIMITS } from '../contract/limits.js';
import type { Shift } from '../contract/reference.js';
import { disagreement, isAnotherClock, type PickClock } from '../figures/pick-clock.js';
import { isKind, type ResolvedEntry, type ResolvedOf } from './corrections.js';
import type { LineReading } from './loom-line.js';
import { byMoment, byText } from './order.js';

export interface ReadingsInput {
  readonly shift: Shift;
  readonly previous: Shift | null;
  readonly next: Shift | null;
  /** Of this loom, voided ones left out, sorted by id. */
  readonly resolved: readonly ResolvedEntry[];
  /** The clock that the loom had at a moment; null: not known. */
  clockAt(at: number): PickClock | null;
}

/** What serves one of the line's two boundaries. */
export interface Served {
  readonly candidates: readonly LineReading[];
  readonly chosen: LineReading | null;
  /** Those to show: the chosen one, and its rivals. */
  readonly listed: readonly LineReading[];
  readonly off: boolean;
  /** By how many picks they disagree, undecided; null: they agree. */
  readonly apart: number | null;
}

/**
 * The readings that serve a boundary and the one that holds: the decided one; else, where all agree, the shift's own
 * that was taken nearest to the moment, or the neighbour's.
 *
 * @param sheet the paper sheet that holds for this line; its readings count as the shift's own
 */
export function served(
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
  return {
    candidates,
    chosen,
    listed: rivals ? candidates : [...mine, ...(chosen?.from === 'neighbour' ? [chosen] : [])],
    off: chosen !== null && Math.abs(chosen.at - moment) > LIMITS.readingOffBoundary,
    apart: rivals && !decided ? widest(candidates, clock) : null,
  };
}

/** The shift's own tapped readings, of all four boundaries. */
export function ownReadings({ resolved, shift }: ReadingsInput): LineReading[] {
  return resolved
    .filter((one) => isKind(one, 'reading'))
    .filter((one) => one.entry.shiftKey === shift.key)
    .map((one) => toReading(one, one.entry.boundary, 'own'));
}

/**
 * Resets of the clock: the shift's own, and on a continuous clock also those that name an adjoining shift, since a
 * reset counts where it was read. A tablet may name the shift that ends, a minute after its end reading.
 */
export function resetReadings({ resolved, shift, previous, next }: ReadingsInput, clock: PickClock | null) {
  const adjoining = clock?.kind === 'continuous' ? [previous?.key, next?.key] : [];
  return resolved
    .filter((one) => isKind(one, 'reading'))
    .filter(({ entry }) => entry.boundary === 'reset')
    .filter(({ entry }) => entry.shiftKey === shift.key || adjoining.includes(entry.shiftKey))
    .map((one) => toReading(one, 'reset', one.entry.shiftKey === shift.key ? 'own' : 'neighbour'));
}

/**
 * Readings of adjoining shifts that serve here: only a continuous clock runs on from shift to shift, and only while
 * it is the same clock.
 */
function neighbourReadings(
  { resolved, shift, previous, next, clockAt }: ReadingsInput,
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
    return last ? [{ ...toReading(last, boundary, 'neighbour'), at: moment }] : [];
  }
  const neighbour = boundary === 'start' ? previous : next;
  if (!neighbour || (clock && clock.kind !== 'continuous')) return [];
  if (isAnotherClock(clockAt(moment - 1), clockAt(moment))) return [];
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

function widest(candidates: readonly LineReading[], clock: PickClock | null): number | null {
  if (!clock) return null;
  return Math.max(...candidates.flatMap((a) => candidates.map((b) => disagreement(clock, a.value, b.value))));
}

/** The latest by corrected moment; ties by device and its sequence. */
export function lastOf<R extends ResolvedEntry>(all: readonly R[]): R | null {
  return [...all].sort((a, b) => a.at - b.at || byMoment(a.root, b.root)).at(-1) ?? null;
}
