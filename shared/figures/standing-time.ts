import type { CauseGroup } from '../contract/reference.js';
import type { LineStop } from '../entries/loom-line.js';

/** A span of time, half-open [from, until), ms since 1970. */
export interface Span {
  readonly from: number;
  readonly until: number;
}

/** A span in which the loom stood, for one cause. Spans of one loom never overlap: a loom stands once. */
export interface Standing extends Span {
  readonly cause: string;
  readonly as: 'planned' | 'shed' | 'own';
}

/** Length of the part that two spans share, ms. */
export function overlapMs(a: Span, b: Span): number {
  return Math.max(0, Math.min(a.until, b.until) - Math.max(a.from, b.from));
}

type TimedStop = Pick<LineStop, 'id' | 'from' | 'phases' | 'shedWide'>;

interface Claim extends Standing {
  readonly rank: number;
  readonly began: number;
  readonly id: string;
}

const RANK = { planned: 0, shed: 1, own: 2 } as const;

/**
 * When a loom stood within a window, and for what: the union of its timed stops, clipped to the window. Where stops
 * overlap, a planned one has precedence over all, then a shed stop; otherwise the one that began first keeps the
 * time. A stop that still stands is taken to stand until the window ends.
 *
 * @param stops timed stops with their phases (a tap has none), in any order
 * @returns spans in order of time
 */
export function standingTime(stops: readonly TimedStop[], window: Span): Standing[] {
  const claims = stops.flatMap((stop) => claimsOf(stop, window));
  claims.sort(
    (a, b) => a.rank - b.rank || a.began - b.began || (a.id < b.id ? -1 : a.id > b.id ? 1 : a.from - b.from),
  );
  const moments = [...new Set(claims.flatMap((claim) => [claim.from, claim.until]))].sort((a, b) => a - b);
  const spans: { from: number; until: number; cause: string; as: Standing['as'] }[] = [];
  moments.forEach((from, i) => {
    const until = moments[i + 1];
    const owner = claims.find((claim) => claim.from <= from && from < claim.until);
    if (until === undefined || !owner) return;
    const last = spans.at(-1);
    if (last && last.until === from && last.cause === owner.cause && last.as === owner.as) last.until = until;
    else spans.push({ from, until, cause: owner.cause, as: owner.as });
  });
  return spans;
}

function claimsOf(stop: TimedStop, window: Span): Claim[] {
  return stop.phases.flatMap((phase) => {
    const from = Math.max(phase.from, window.from);
    const until = Math.min(phase.until ?? Infinity, window.until);
    if (until <= from) return [];
    const as = standsAs(phase.group, stop.shedWide);
    return [{ from, until, cause: phase.cause, as, rank: RANK[as], began: stop.from, id: stop.id }];
  });
}

/** Whose minutes a stop's are: P, H, or the loom's own. A holiday tapped for the whole shed is planned all the same. */
export function standsAs(group: CauseGroup, shedWide: boolean): Standing['as'] {
  if (group === 'planned') return 'planned';
  return shedWide || group === 'shed' ? 'shed' : 'own';
}

/** Spans less another one (a meal with the looms stopped), in order. */
export function without<S extends Span>(spans: readonly S[], hole: Span | null): S[] {
  if (!hole) return [...spans];
  return spans
    .flatMap((span) => [
      { ...span, until: Math.min(span.until, hole.from) },
      { ...span, from: Math.max(span.from, hole.until) },
    ])
    .filter((span) => span.until > span.from);
}
