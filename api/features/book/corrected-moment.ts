import { LIMITS } from '../../../shared/contract/limits.js';
import type { Entry } from '../../../shared/entries/entry.js';

/**
 * The offset (server minus device, ms) that an entry's moments are corrected by: the one that this request measured,
 * unless the device knew another one when the entry was tapped: then its clock was changed in between.
 */
export function offsetOf(entry: Entry, measured: number): number {
  const then = entry.clock?.offset;
  return then !== undefined && Math.abs(then - measured) > LIMITS.clockOffsetShown ? then : measured;
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
