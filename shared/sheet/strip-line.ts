import type { LoomLine } from '../entries/loom-line.js';
import { MARK_KINDS, MARK_WORDS, markOf } from './mark-kind.js';
import type { MarkKind } from './mark-kind.js';
import type { StripLine, StripStop } from './strip-geometry.js';

/**
 * A loom line as a strip. A tap was made after mending, so its allowance lies before it; a timed stop shows its
 * phases (until called for, waiting, the tackler's).
 */
export function stripLineOf(line: LoomLine, now: number | null): StripLine {
  const stops: StripStop[] = [];
  for (const stop of line.stops) {
    if (!stop.timed) {
      stops.push({
        from: stop.from - stop.estimatedMs,
        until: stop.from,
        mark: markOf(stop.cause, stop.group),
        estimated: true,
      });
    } else if (stop.phases.length === 0) {
      stops.push({
        from: stop.from,
        until: stop.until,
        mark: markOf(stop.cause, stop.group),
        estimated: false,
      });
    } else {
      for (const phase of stop.phases)
        stops.push({
          from: phase.from,
          until: phase.until,
          mark: markOf(phase.cause, phase.group),
          estimated: false,
        });
    }
  }
  const readings = line.readings.filter((r) => r.boundary !== 'start').map((r) => r.at);
  return {
    startsAt: line.shift.startsAt,
    endsAt: line.shift.endsAt,
    now: now !== null && now < line.shift.endsAt ? now : null,
    stops,
    readTo: now === null || readings.length === 0 ? null : Math.max(...readings),
  };
}

/** What a strip says to somebody who does not see it. */
export function stripWords(line: StripLine): string {
  const to = Math.min(line.endsAt, line.now ?? line.endsAt);
  const counts = new Map<MarkKind, number>();
  let open: StripStop | undefined;
  for (const stop of line.stops) {
    counts.set(stop.mark, (counts.get(stop.mark) ?? 0) + 1);
    if (stop.until === null && line.now !== null) open = stop;
  }
  const parts = [
    line.now === null
      ? `the whole shift of ${hours(line.endsAt - line.startsAt)}`
      : `${hours(to - line.startsAt)} of ${hours(line.endsAt - line.startsAt)}`,
  ];
  const stops = MARK_KINDS.filter((mark) => counts.has(mark)).map(
    (mark) => `${counts.get(mark)} ${MARK_WORDS[mark]}`,
  );
  parts.push(stops.length ? `stops: ${stops.join(', ')}` : 'no stops');
  if (open && line.now !== null)
    parts.push(`stands for ${hours(line.now - open.from)}, ${MARK_WORDS[open.mark]}`);
  return parts.join('; ');
}

function hours(ms: number): string {
  const minutes = Math.max(0, Math.round(ms / 60_000));
  const h = Math.floor(minutes / 60);
  const m = minutes % 60;
  return h === 0 ? `${m} min` : m === 0 ? `${h} h` : `${h} h ${m} min`;
}
