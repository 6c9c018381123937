import { LIMITS } from '../../../shared/contract/limits.js';
import type { Entry } from '../../../shared/entries/entry.js';

/** Measures that differ by less, ms, differ by the network's delay, not by the clock. */
const DELAY = 2_000;

/**
 * The offset (server minus device, ms) that an entry's moments are corrected by: the one that this request measured,
 * unless the device knew another one when the entry was tapped: then its clock was changed in between. Where both are
 * the same but for the network's delay, the device's own: a moment that was typed ("06:00") was put into device time by
 * it, and comes out as typed, not some ms beside the start of its shift.
 */
export function offsetOf(entry: Entry, measured: number): number {
  const then = entry.clock?.offset;
  if (then === undefined) return measured;
  const apart = Math.abs(then - measured);
  return apart > LIMITS.clockOffsetShown || apart < DELAY ? then : measured;
}

/** The moments of an entry, corrected. */
export function correctedMoments(
  entry: Entry,
  measured: number,
): { at: number; until: number | null; changedAt: number | null } {
  const offset = offsetOf(entry, measured);
  const corrected = (moment: number | null | undefined) =>
    moment === null || moment === undefined ? null : moment + offset;
  const until = entry.kind === 'amend' ? entry.change.until : 'until' in entry ? entry.until : null;
  return {
    at: entry.at + offset,
    until: corrected(until),
    changedAt: entry.kind === 'amend' ? corrected(entry.change.at) : null,
  };
}

/** Whether a corrected moment is to be believed; a doubtful one waits for the foreman. */
export function isDoubtful(
  entry: Entry,
  at: number,
  exchange: { readonly serverNow: number; readonly sentAt: number },
): boolean {
  return (
    at > exchange.serverNow + LIMITS.futureTolerance ||
    at < exchange.serverNow - LIMITS.oldestMoment ||
    entry.recordedAt > exchange.sentAt + LIMITS.futureTolerance
  );
}
