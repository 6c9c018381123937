import type { MarkKind } from './mark-kind.js';

/** One stand of a loom, in the strip's own terms. Moments are ms since 1970. */
export interface StripStop {
  readonly from: number;
  /** Null: the loom still stands. */
  readonly until: number | null;
  readonly mark: MarkKind;
  /** Its length is the cause's allowance, nobody timed it. */
  readonly estimated: boolean;
}

/** A loom's shift as the strip takes it. */
export interface StripLine {
  readonly startsAt: number;
  readonly endsAt: number;
  /** Null: the shift is over. */
  readonly now: number | null;
  readonly stops: readonly StripStop[];
  /** The last reading: from here on the cloth is not proven and its selvedge is broken. Absent: all of it is. */
  readonly readTo?: number | null;
}

export interface StripGap {
  readonly x: number;
  readonly width: number;
  readonly mark: MarkKind;
  readonly estimated: boolean;
  /** Reaches the fell: the loom stands now. */
  readonly open: boolean;
}

export interface StripGeometry {
  readonly width: number;
  /** Where cloth is being made; the whole width once the shift is over. */
  readonly fell: number;
  /** The shift runs: the fell is drawn. */
  readonly live: boolean;
  /** Up to here readings prove the cloth. */
  readonly proven: number;
  readonly gaps: readonly StripGap[];
  /** Pern changes by count, on the lower selvedge. */
  readonly ticks: readonly number[];
}

/** Narrower than this a gap cannot be seen. */
export const SMALLEST_GAP = 3;
/** Neighbours that are both wider than a mark's repeat stay apart; narrower ones could not be told apart. */
const MARK_REPEAT = 6;
/** Gaps nearer than this touch. */
const TOUCHING = 1;

interface Piece {
  x: number;
  end: number;
  open: boolean;
  estimated: boolean;
  ms: Map<MarkKind, number>;
}

/** Where everything on a strip `width` px wide lies. Pure: knows no canvas, no theme, no clock. */
export function stripGeometry(line: StripLine, width: number): StripGeometry {
  const span = line.endsAt - line.startsAt;
  const live = line.now !== null && line.now < line.endsAt;
  const to = Math.min(line.endsAt, Math.max(line.startsAt, line.now ?? line.endsAt));
  const scale = span > 0 ? width / span : 0;
  const x = (at: number) => (at - line.startsAt) * scale;
  const fell = x(to);
  const proven = line.readTo == null ? fell : Math.min(fell, Math.max(0, x(line.readTo)));

  const pieces: Piece[] = [];
  const ticks: number[] = [];
  for (const stop of line.stops) {
    const from = Math.max(line.startsAt, stop.from);
    const until = Math.min(to, stop.until ?? to);
    if (from > to || until < from || (stop.until !== null && stop.until < line.startsAt)) continue;
    if (stop.mark === 'pern' && stop.estimated) {
      ticks.push(x(from));
      continue;
    }
    pieces.push(piece(stop, x(from), x(until), until - from, fell));
  }
  ticks.sort((a, b) => a - b);
  return { width, fell, live, proven, gaps: merged(pieces), ticks };
}

function piece(stop: StripStop, from: number, until: number, ms: number, fell: number): Piece {
  let x = from;
  let end = Math.max(until, x + SMALLEST_GAP);
  // The smallest gap never reaches past the fell: cloth that is not woven cannot have a hole.
  if (end > fell) {
    end = Math.max(fell, Math.min(SMALLEST_GAP, end));
    x = Math.max(0, Math.min(x, end - SMALLEST_GAP));
  }
  return {
    x,
    end,
    open: stop.until === null,
    estimated: stop.estimated,
    ms: new Map([[stop.mark, Math.max(1, ms)]]),
  };
}

function merged(pieces: Piece[]): StripGap[] {
  pieces.sort((a, b) => a.x - b.x || a.end - b.end);
  const kept: Piece[] = [];
  for (const next of pieces) {
    const last = kept.at(-1);
    if (!last || next.x - last.end >= TOUCHING) {
      kept.push(next);
      continue;
    }
    const overlap = last.end - next.x;
    const bothWide = last.end - last.x > MARK_REPEAT && next.end - next.x > MARK_REPEAT;
    if (bothWide && overlap < TOUCHING) {
      kept.push(next);
      continue;
    }
    last.end = Math.max(last.end, next.end);
    last.open ||= next.open;
    last.estimated &&= next.estimated;
    for (const [mark, ms] of next.ms) last.ms.set(mark, (last.ms.get(mark) ?? 0) + ms);
  }
  return kept.map((p) => ({
    x: p.x,
    width: p.end - p.x,
    mark: longest(p.ms),
    estimated: p.estimated,
    open: p.open,
  }));
}

function longest(ms: Map<MarkKind, number>): MarkKind {
  let best: [MarkKind, number] | undefined;
  for (const entry of ms) if (!best || entry[1] > best[1]) best = entry;
  return best ? best[0] : 'planned';
}
