import { LIMITS } from '../contract/limits.js';
import type { Shift } from '../contract/reference.js';
import type { Span } from '../figures/standing-time.js';
import { isKind, type ResolvedEntry } from './corrections.js';
import { byMoment } from './order.js';

export interface WeaverChange {
  readonly at: number;
  readonly weaverId: string | null;
}

/**
 * Who minds the loom, from the assignments that name this shift: changes in order of time, the first at `window.from`.
 *
 * - Who takes over within 5 min of the start has woven since the start. What names the shift but lies outside its
 *   window (put down the evening before, or the morning after) holds from the start.
 * - Who takes over within 5 min of the last one's leaving has woven since then; who leaves within 5 min of the end
 *   has woven to the end.
 * - Who puts the loom down after another has taken it over puts nothing down: it is not theirs any more, whatever
 *   their tablet still shows.
 * - A relief during a meal with looms running does not split the line: a change in the meal, or within 5 min of its
 *   beginning, counts only if it still stands 5 min after the meal.
 *
 * @param fallback the weaver that a paper sheet names, for a shift without assignments
 */
export function weaverChanges(
  resolved: readonly ResolvedEntry[],
  shift: Shift,
  window: Span,
  loomId: string,
  fallback: string | null,
): WeaverChange[] {
  const assigned = resolved
    .filter((one) => isKind(one, 'assign'))
    .filter((one) => !one.voided && one.entry.shiftKey === shift.key && one.entry.loomIds.includes(loomId))
    .sort((a, b) => a.at - b.at || byMoment(a.root, b.root))
    .map((one) => ({ at: one.at, weaverId: one.entry.weaverId, by: one.entry.by }));
  const end = Math.max(window.until, shift.endsAt);
  const moved = withoutGaps(
    notTooLate(assigned).filter((one) => one.weaverId !== null || one.at < end - NEAR),
  ).map((one) => ({ ...one, at: countsFrom(one.at, shift, window) }));
  const first = { at: window.from, weaverId: assigned.length === 0 ? fallback : null };
  // A stable sort: of two that count from the same moment the later said holds.
  return distinct([first, ...moved.sort((a, b) => a.at - b.at)]);
}

/** Leaves out who puts down what another has taken over since. */
function notTooLate(assigned: readonly (WeaverChange & { readonly by: string })[]): WeaverChange[] {
  const minded = new Set<string>();
  let minds: string | null = null;
  const kept: WeaverChange[] = [];
  for (const { at, weaverId, by } of assigned) {
    if (weaverId === null && by !== minds && minded.has(by)) continue;
    if (weaverId !== null) minded.add(weaverId);
    minds = weaverId;
    kept.push({ at, weaverId });
  }
  return kept;
}

const NEAR = LIMITS.readingOffBoundary;

function withoutGaps(changes: readonly WeaverChange[]): WeaverChange[] {
  return changes.map((change, i) => {
    const before = changes[i - 1];
    const follows = before?.weaverId === null && change.at - before.at <= NEAR;
    return follows ? { ...change, at: before.at } : change;
  });
}

function countsFrom(at: number, shift: Shift, window: Span): number {
  const begun = Math.max(window.from, shift.startsAt) + NEAR;
  if (at <= begun || at >= Math.max(window.until, shift.endsAt)) return window.from;
  const { meal } = shift;
  if (meal?.looms !== 'running') return at;
  return at >= meal.startsAt - NEAR && at <= meal.endsAt + NEAR ? meal.endsAt : at;
}

function distinct(changes: readonly WeaverChange[]): WeaverChange[] {
  const kept: WeaverChange[] = [];
  for (const change of changes) {
    if (kept.at(-1)?.at === change.at) kept.pop();
    if (kept.length === 0 || kept.at(-1)?.weaverId !== change.weaverId) kept.push(change);
  }
  return kept;
}
