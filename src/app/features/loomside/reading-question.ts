import type { LoomVersion } from '@shared/contract/reference';
import type { LoomLine } from '@shared/entries/loom-line';
import { LIMITS } from '@shared/contract/limits';
import { stoppedMeal } from '@shared/figures/loom-line';
import type { LastReading } from '../../offline/last-reading';
import type { ClockQuestion } from '../../ui/pick-reading';

const MINUTE = 60_000;

/** A start reading is held against the loom's last one: picks between shifts are possible, more than possible is not. */
export function startQuestion(
  version: LoomVersion,
  last: LastReading | null,
  shiftKey: string,
  now: number,
): ClockQuestion {
  // Another shift's register, or a clock that goes to nought, is no measure of this reading.
  const comparable =
    last !== null && (version.clock.kind === 'continuous' || last.shiftKey === shiftKey) ? last : null;
  return {
    id: `${version.loomId} start`,
    clock: version.clock,
    ppm: version.ppm,
    previous: comparable?.value ?? null,
    minutes: comparable ? Math.max(0, (now - comparable.at) / MINUTE) : null,
  };
}

/** An end reading is held against the start reading, over the time between. */
export function endQuestion(version: LoomVersion, line: LoomLine, now: number): ClockQuestion {
  const start = line.readings.find((reading) => reading.id === line.startReadingId);
  const zeroed = version.clock.kind === 'zeroed-each-shift' && !start;
  const from =
    start && Math.abs(start.at - line.shift.startsAt) > LIMITS.readingOffBoundary
      ? start.at
      : line.shift.startsAt;
  const until = Math.abs(now - line.shift.endsAt) > LIMITS.readingOffBoundary ? now : line.shift.endsAt;
  const meal = stoppedMeal(line.shift);
  const eaten = meal ? Math.max(0, Math.min(meal.until, until) - Math.max(meal.from, from)) : 0;
  const previous = start ? (start.newValue ?? start.value) : zeroed ? 0 : null;
  return {
    id: `${line.loomId} end`,
    clock: version.clock,
    ppm: version.ppm,
    previous,
    minutes: previous === null ? null : Math.max(0, (until - from - eaten) / MINUTE),
  };
}
