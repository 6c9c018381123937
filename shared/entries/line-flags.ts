import { LIMITS } from '../contract/limits.js';
import type { Shift } from '../contract/reference.js';
import type { ResolvedEntry } from './corrections.js';
import { LINE_FLAGS, type LineStop, type LoomLine } from './loom-line.js';
import { byText } from './order.js';
import type { TimedStop } from './stands.js';

type Flag = LoomLine['flags'][number];

/** How far a device's measured offset may wander between a stop's start and end before its clock was stepped. */
const OFFSET_WANDER = 5_000;

/** What is odd about the line's stops. */
export function stopFlags(stops: readonly LineStop[], timed: readonly TimedStop[]): Flag[] {
  const shown = new Map(stops.filter((one) => one.timed).map((one) => [one.id, one]));
  const own = [...shown.values()].filter((one) => !one.shedWide);
  const flags: Flag[] = [];
  for (const stop of shown.values())
    if (stop.until === null) flags.push({ code: 'stop-still-open', entryId: stop.id });
  for (const inner of own) {
    const inside = own.some(
      (outer) =>
        outer.id !== inner.id &&
        (outer.from < inner.from || (outer.from === inner.from && outer.id < inner.id)) &&
        (outer.until === null || inner.from < outer.until),
    );
    if (inside) flags.push({ code: 'stop-inside-stop', entryId: inner.id });
  }
  for (const one of timed)
    if (shown.has(one.stop.root.entry.id) && isUncertain(one))
      flags.push({ code: 'time-uncertain', entryId: one.stop.root.entry.id });
  return flags;
}

/**
 * Whether a timed stop's duration is in doubt: a clock was stepped, its end lies before its beginning, or the offset
 * of the one tablet that logged both ends changed in between (unchanged, it only slept).
 */
function isUncertain({ stop, resume, endBeforeStart }: TimedStop): boolean {
  const [began, ended] = [stop.root.entry, resume?.root.entry];
  if (endBeforeStart || began.clock?.stepped || ended?.clock?.stepped) return true;
  if (!ended?.clock || !began.clock || ended.deviceId !== began.deviceId) return false;
  return Math.abs(ended.clock.offset - began.clock.offset) > OFFSET_WANDER;
}

/**
 * What is odd about how the line's entries were logged: corrections made without sight of each other, a counted tap
 * whose clock was stepped, and the device clock that was furthest off, if by more than 2 min.
 *
 * @param resolved entries that can touch the loom, voided ones among them
 */
export function loggingFlags(
  resolved: readonly ResolvedEntry[],
  shift: Shift,
  loomId: string,
  stops: readonly LineStop[],
): Flag[] {
  const shown = new Set(stops.map((one) => one.id));
  const touches = (one: ResolvedEntry) =>
    shown.has(one.root.entry.id) ||
    ('shiftKey' in one.entry
      ? one.entry.shiftKey === shift.key
      : one.at >= shift.startsAt && one.at < shift.endsAt);
  const ofLoom = ({ entry }: ResolvedEntry) => !('loomId' in entry) || entry.loomId === loomId;
  const touching = resolved.filter((one) => ofLoom(one) && touches(one));
  const offsets = touching.filter((one) => !one.voided).map((one) => one.root.entry);
  const counted = new Set(stops.filter((one) => !one.timed).map((one) => one.id));
  const [furthest] = offsets
    .filter((entry) => Math.abs(entry.clock?.offset ?? 0) > LIMITS.clockOffsetShown)
    .sort((a, b) => Math.abs(b.clock?.offset ?? 0) - Math.abs(a.clock?.offset ?? 0) || byText(a.id, b.id));
  return [
    ...touching
      .filter((one) => one.correctedTwice)
      .map((one): Flag => ({ code: 'corrected-twice', entryId: one.root.entry.id })),
    ...offsets
      .filter((entry) => entry.clock?.stepped && counted.has(entry.id))
      .map((entry): Flag => ({ code: 'time-uncertain', entryId: entry.id })),
    ...(furthest
      ? [{ code: 'clock-offset', value: furthest.clock?.offset ?? 0, entryId: furthest.id } as const]
      : []),
  ];
}

/** Flags in one order, each once, with their fields in one order. */
export function sortedFlags(flags: readonly Flag[]): Flag[] {
  const key = (flag: Flag) => `${flag.code} ${flag.entryId ?? ''} ${flag.value ?? ''}`;
  return [...new Map(flags.map((flag) => [key(flag), flag])).values()]
    .sort(
      (a, b) =>
        LINE_FLAGS.indexOf(a.code) - LINE_FLAGS.indexOf(b.code) ||
        byText(a.entryId ?? '', b.entryId ?? '') ||
        (a.value ?? 0) - (b.value ?? 0),
    )
    .map(({ code, value, entryId }) => ({
      code,
      ...(value === undefined ? {} : { value }),
      ...(entryId === undefined ? {} : { entryId }),
    }));
}
