import type { CauseVersion, Loom } from '@shared/contract/reference';
import type { LineStop, LineTotals, LoomLine } from '@shared/entries/loom-line';
import { WAIT_TACKLER } from '@shared/entries/phases';
import { efficiency } from '@shared/figures/efficiency';
import { lineTotals } from '@shared/figures/loom-line';
import { noFigure, type Figure } from '@shared/figures/no-figure';
import { standsAs } from '@shared/figures/standing-time';
import { mostPicks } from '@shared/figures/totals';
import type { OpenCallView } from '../../offline/offline-book';
import type { StripLine } from '../../ui/strip-geometry';

/** What a loom stands for, since when. */
export interface Standing {
  /** "Picking, tackler at work". */
  readonly words: string;
  readonly since: number;
  /** No order, a holiday: nobody is wanted. */
  readonly planned: boolean;
}

/** A call for the tackler that is not done with. */
export interface FloorCall {
  readonly at: number;
  /** Since when `words` are so: his own last word, or the call. */
  readonly since: number;
  /** He has not come yet. */
  readonly waits: boolean;
  readonly words: string;
  /** Only this device knows of it: somebody must fetch him. */
  readonly unsent: boolean;
}

/** A loom as the Floor shows it. */
export interface FloorLoom {
  readonly loom: Loom;
  readonly cloth: string;
  /** Who minds it; empty: not known, or not for whoever looks. */
  readonly weaver: string;
  readonly line: LoomLine;
  readonly strip: StripLine;
  readonly totals: LineTotals;
  readonly standing: Standing | null;
  /** Less shed stops and planned stands: the one that may be shown beside a weaver's looms. */
  readonly efficiency: Figure;
  /** Picks are not read yet: the most that it can be. */
  readonly atMost: boolean;
  /** What its cloth's looms should reach, a share; null: the mill has set none. */
  readonly target: number | null;
  readonly call: FloorCall | null;
  /** Entries about it that only this device knows. */
  readonly notSent: number;
  /** When it last stood or ran again, be it by a tap; the shift's start if it did not. */
  readonly lastStop: number;
  /** As of when all this is so. */
  readonly at: number;
}

export interface LoomFacts {
  readonly loom: Loom;
  readonly line: LoomLine;
  readonly strip: StripLine;
  readonly clothName: (clothId: string | null) => string;
  readonly causeAt: (cause: string, at: number) => CauseVersion | undefined;
  /** Absent: no cloth has a target. */
  readonly targetOf?: (clothId: string, at: number) => number | null;
  readonly weaver: string;
  readonly call: OpenCallView | null;
  readonly notSent: number;
  /** Corrected, ms since 1970. */
  readonly at: number;
}

export function floorLoom(facts: LoomFacts): FloorLoom {
  const { line, at } = facts;
  const totals = lineTotals(line, at);
  const clothId = line.stretches.filter((stretch) => stretch.from <= at).at(-1)?.clothId ?? null;
  return {
    loom: facts.loom,
    cloth: facts.clothName(clothId),
    weaver: facts.weaver,
    line,
    strip: facts.strip,
    totals,
    standing: standingOf(facts),
    efficiency: efficiency(line.picks ?? mostPicks(totals), totals.possibleLessShed ?? noFigure('no-speed')),
    atMost: line.picks === null,
    target: clothId === null ? null : (facts.targetOf?.(clothId, at) ?? null),
    call: callOf(facts.call),
    notSent: facts.notSent,
    lastStop: lastStopOf(line, at),
    at,
  };
}

function standingOf({ line, at, causeAt, call }: LoomFacts): Standing | null {
  if (at >= line.shift.endsAt) return null;
  const open = line.stops.filter((stop) => stop.timed && stop.until === null && stop.from <= at);
  const stop = mostTelling(open);
  if (!stop) return null;
  const name = (cause: string) => causeAt(cause, stop.from)?.name ?? cause;
  const now = stop.phases.filter((phase) => phase.from <= at).at(-1)?.cause ?? stop.cause;
  const waits = now === WAIT_TACKLER && stop.cause !== WAIT_TACKLER;
  const words = waits
    ? `${name(stop.cause)}, waiting for tackler`
    : call?.step === 'arrive' && now !== WAIT_TACKLER
      ? `${name(now)}, tackler at work`
      : name(now);
  return { words, since: stop.from, planned: standsAs(stop.group, stop.shedWide) === 'planned' };
}

/** Its own stop before a shed-wide one, the later one before the earlier: what was last said of this loom. */
function mostTelling(open: readonly LineStop[]): LineStop | undefined {
  const own = open.filter((stop) => !stop.shedWide);
  return (own.length ? own : open).reduce<LineStop | undefined>(
    (best, stop) => (!best || stop.from >= best.from ? stop : best),
    undefined,
  );
}

function callOf(call: OpenCallView | null): FloorCall | null {
  if (!call) return null;
  const { at, step, stepAt, state } = call;
  const since = stepAt ?? at;
  if (step === 'arrive') return { at, since, waits: false, words: 'Tackler there', unsent: false };
  if (step === 'take') return { at, since, waits: true, words: 'Tackler coming', unsent: false };
  const unsent = state === 'waiting' || state === 'later';
  return { at, since: at, waits: true, words: unsent ? 'Call not sent' : 'Tackler called', unsent };
}

function lastStopOf(line: LoomLine, at: number): number {
  return line.stops
    .filter((stop) => stop.from <= at)
    .reduce((last, stop) => Math.max(last, Math.min(at, stop.until ?? at)), line.shift.startsAt);
}
