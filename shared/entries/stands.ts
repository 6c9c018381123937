import { isKind, resolveCorrections, type ResolvedEntry, type ResolvedOf } from './corrections.js';
import { loomsNamedBy, type BookEntry } from './entry.js';
import { byMoment, byText } from './order.js';
import type { Stand } from './projection-input.js';

type LoomRow = { id: string; shedId: string; row: number };

/** A timed stop of one loom, with the entries it comes from. */
export interface TimedStop {
  readonly stop: ResolvedOf<'stop'> | ResolvedOf<'standing'> | ResolvedOf<'shed-stop'>;
  readonly loomId: string;
  readonly from: number;
  /** Null: still stands. Never before `from`. */
  readonly until: number | null;
  /** The entry that ended it, where it was a resume. */
  readonly resume: ResolvedOf<'resume'> | null;
  /** What ended it lies before its beginning: it is taken to have ended at once. */
  readonly endBeforeStart: boolean;
}

/**
 * Timed stops as intervals, one a loom: standing stops, shed stops, and stops logged with both ends. A stop that
 * somebody ended by an amendment ends there; else the earliest resume that names it for that loom, and is not before it, ends it; a shed
 * stop's own end holds for the looms that nobody ticked off. Sorted by moment, stop, loom.
 */
export function resolveStands(entries: readonly BookEntry[], looms: readonly LoomRow[]): Stand[] {
  return timedStopsOf(resolveCorrections(entries), looms).map(({ stop, loomId, from, until }) => ({
    stopId: stop.root.entry.id,
    loomId,
    from,
    until,
    cause: stop.entry.cause,
  }));
}

/** The same from entries whose corrections are applied already. */
export function timedStopsOf(resolved: readonly ResolvedEntry[], looms: readonly LoomRow[]): TimedStop[] {
  const resumes = resumesByStop(resolved);
  const found: TimedStop[] = [];
  for (const stop of resolved) {
    if (stop.voided || !isTimed(stop)) continue;
    for (const loomId of new Set(loomsNamedBy(stop.entry, looms))) {
      // A loom's own stop needs no loom in its resume: an amendment may have moved the stop to another loom.
      const ofLoom = stop.entry.kind === 'shed-stop' ? loomId : '';
      const named = resumes.get(resumeKey(stop.root.entry.id, ofLoom)) ?? [];
      // A stop is not ended before it begins: such a resume holds only where there is no other.
      const resume = named.find((one) => one.at >= stop.at) ?? named[0] ?? null;
      found.push(intervalOf(stop, loomId, resume));
    }
  }
  return found.sort(
    (a, b) =>
      a.from - b.from || byText(a.stop.root.entry.id, b.stop.root.entry.id) || byText(a.loomId, b.loomId),
  );
}

function isTimed(one: ResolvedEntry): one is TimedStop['stop'] {
  return isKind(one, 'standing') || isKind(one, 'shed-stop') || (isKind(one, 'stop') && one.until !== null);
}

const resumeKey = (stopId: string, loomId: string) => `${stopId} ${loomId}`;

/** The resumes that count of each stop and loom, earliest first. */
function resumesByStop(resolved: readonly ResolvedEntry[]): ReadonlyMap<string, ResolvedOf<'resume'>[]> {
  const byStop = new Map<string, ResolvedOf<'resume'>[]>();
  const resumes = resolved.filter((one) => isKind(one, 'resume')).filter((one) => !one.voided);
  for (const one of resumes.sort((a, b) => a.at - b.at || byMoment(a.root, b.root))) {
    for (const ofLoom of [one.entry.loomId, '']) {
      const key = resumeKey(one.entry.targetId, ofLoom);
      const known = byStop.get(key);
      if (known) known.push(one);
      else byStop.set(key, [one]);
    }
  }
  return byStop;
}

function intervalOf(stop: TimedStop['stop'], loomId: string, resume: ResolvedOf<'resume'> | null): TimedStop {
  const ownEndHolds = stop.until !== null && !(stop.entry.kind === 'shed-stop' && resume);
  const end = ownEndHolds ? stop.until : (resume?.at ?? null);
  const endBeforeStart = end !== null && end < stop.at;
  return {
    stop,
    loomId,
    from: stop.at,
    until: endBeforeStart ? stop.at : end,
    resume: ownEndHolds ? null : resume,
    endBeforeStart,
  };
}
