import type { CauseVersion, Cloth, Loom } from '@shared/contract/reference';
import type { LineStop, LoomLine } from '@shared/entries/loom-line';
import { BREAKS_PER, noInterval } from '@shared/figures/breaks';
import { efficiency, ratio } from '@shared/figures/efficiency';
import { lineFigures, lineTotals } from '@shared/figures/loom-line';
import { mostPicks } from '@shared/figures/totals';
import { numberOrNull, noFigure, type Figure } from '@shared/figures/no-figure';
import type { StripLine } from '../../ui/strip-geometry';
import { stripLineOf } from '../../ui/strip-line';

/** A loom that stands now. */
export interface StandingNow {
  /** The root entry, which Running, a call and a changed cause name. */
  readonly stopId: string;
  readonly cause: string;
  readonly words: string;
  readonly since: number;
  readonly minutes: number;
  /** Every stop of the loom that is open: Running ends them all. */
  readonly openIds: readonly string[];
  /** A power cut, say: its cause is not this loom's to change. */
  readonly shedWide: boolean;
}

/** How a call for the tackler stands. */
export interface CallView {
  readonly id: string;
  /** not-sent: only this device knows. sent: in the book. Later steps are the tackler's own word. */
  readonly state: 'not-sent' | 'sent' | 'needs-look' | 'taken' | 'arrived';
  /** When it reached the book, or the tackler answered. */
  readonly at: number | null;
  /** When it was made. */
  readonly since: number;
}

export interface LoomView {
  readonly loom: Loom;
  readonly cloth: string;
  readonly line: LoomLine;
  readonly strip: StripLine;
  readonly standing: StandingNow | null;
  /** What is on the loom now; null: not known. */
  readonly clothId: string | null;
  /** By readings, or (`soFar`) at most. */
  readonly picks: Figure;
  /** Less shed stops: the one that is fair to show beside a weaver's looms. */
  readonly efficiency: Figure;
  /** No end reading yet: efficiency is at most this, rates are at least these. */
  readonly soFar: boolean;
  /** Per 10⁵ picks. */
  readonly warpRate: Figure;
  readonly weftRate: Figure;
  readonly warpBreaks: number;
  readonly weftBreaks: number;
  readonly perns: number;
  /** All stops but perns. */
  readonly stops: number;
  /** Minutes unaccounted for up to the last reading; null: not known. */
  readonly unlogged: number | null;
  readonly needsStart: boolean;
  /** The readings say more than the loom can weave. */
  readonly overPossible: boolean;
  readonly needsEnd: boolean;
  readonly notSent: number;
  readonly call: CallView | null;
}

export interface LoomFacts {
  readonly loom: Loom;
  readonly line: LoomLine;
  readonly cloths: readonly Cloth[];
  readonly causeAt: (cause: string, at: number) => CauseVersion | undefined;
  readonly notSent: number;
  readonly call: CallView | null;
  /** Corrected now. */
  readonly now: number;
}

/** What a loom's card shows, from its line as this device projects it. */
export function loomView(facts: LoomFacts): LoomView {
  const { line, loom, now } = facts;
  const over = now >= line.shift.endsAt;
  const figures = lineFigures(line, now, noInterval);
  const totals = lineTotals(line, now);
  const soFar = line.picks === null;
  const picks: Figure = line.picks ?? mostPicks(totals);
  const clothId = line.stretches.filter((stretch) => stretch.from <= now).at(-1)?.clothId;
  const has = (code: LoomLine['flags'][number]['code']) => line.flags.some((flag) => flag.code === code);
  return {
    loom,
    cloth: facts.cloths.find((cloth) => cloth.id === clothId)?.name ?? 'cloth not known',
    line,
    clothId: clothId ?? null,
    picks,
    strip: stripLineOf(line, over ? null : now),
    standing: over ? null : standingNow(line, facts, now),
    efficiency: soFar
      ? efficiency(picks, totals.possibleLessShed ?? noFigure('no-speed'))
      : figures.efficiencyLessShed,
    soFar,
    warpRate: ratio(totals.warpBreaks * BREAKS_PER, picks, 'no-picks'),
    weftRate: ratio(totals.weftBreaks * BREAKS_PER, picks, 'no-picks'),
    warpBreaks: totals.warpBreaks,
    weftBreaks: totals.weftBreaks,
    perns: totals.perns,
    stops: totals.stops,
    unlogged: soFar ? null : numberOrNull(figures.unaccountedMinutes),
    needsStart: has('no-start-reading'),
    overPossible: has('more-than-possible') || (numberOrNull(figures.efficiency) ?? 0) > 1,
    needsEnd: line.endReadingId === null && !line.readings.some(isOwnEnd),
    notSent: facts.notSent,
    call: facts.call,
  };
}

/** The shift's own end reading: where it disagrees with the neighbour's, the weaver is done and a foreman decides. */
function isOwnEnd({ boundary, from }: LoomLine['readings'][number]): boolean {
  return boundary === 'end' && from === 'own';
}

function standingNow(line: LoomLine, facts: LoomFacts, now: number): StandingNow | null {
  const open = line.stops.filter((stop) => stop.timed && stop.until === null && stop.from <= now);
  const stop = chosen(open);
  if (!stop) return null;
  return {
    stopId: stop.id,
    cause: stop.cause,
    words: facts.causeAt(stop.cause, stop.from)?.name ?? stop.cause,
    since: stop.from,
    minutes: Math.max(0, (now - stop.from) / 60_000),
    openIds: open.map((one) => one.id),
    shedWide: stop.shedWide,
  };
}

/** Its own stop before a shed-wide one, the later one before the earlier: what the weaver last said of this loom. */
function chosen(open: readonly LineStop[]): LineStop | undefined {
  const own = open.filter((stop) => !stop.shedWide);
  return (own.length ? own : open).reduce<LineStop | undefined>(
    (best, stop) => (!best || stop.from >= best.from ? stop : best),
    undefined,
  );
}
