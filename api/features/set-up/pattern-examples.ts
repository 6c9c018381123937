import { DateTime } from 'luxon';
import { Not, type EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import type { PatternExamples, patternExamplesRequestSchema } from '../../../shared/contract/set-up.js';
import { MillRow, ShiftPatternRow, type ShiftRow } from '../../database/entities/index.js';
import { ApiError } from '../../middleware/api-error.js';
import { datesBetween, rootOf, shiftsOn } from '../book/pattern-shifts.js';
import { overlapping } from './patterns.service.js';
import { wrongDate, wrongFacts } from './pattern-checks.js';

type Asked = z.infer<typeof patternExamplesRequestSchema>;
type Example = PatternExamples['examples'][number];

/** Both changes of the clocks lie within so many days. */
const AHEAD = 380;

/**
 * The next shift of a pattern as typed, and those in which the clocks go forward and back. A pattern whose shifts all
 * lie beside the change has no example of it.
 */
export async function patternExamples(
  from: EntityManager,
  asked: Asked,
  now: number,
): Promise<PatternExamples> {
  const mill = await from.findOneBy(MillRow, { id: 1 });
  if (!mill) throw new ApiError('not-found');
  const zone = mill.timeZone;
  const today = DateTime.fromMillis(now, { zone });
  const start = asked.from ?? today.toISODate() ?? '';
  const wrong = [...wrongFacts(asked.facts), ...wrongDate(start, 'from')];
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
  const changed =
    asked.patternId === undefined ? null : await from.findOneBy(ShiftPatternRow, { id: asked.patternId });
  const row: ShiftPatternRow = {
    id: changed?.id ?? '-',
    shedId: asked.shedId,
    ...asked.facts,
    rootId: changed ? rootOf(changed) : null,
    from: start,
    until: changed?.until ?? null,
  };
  const dates = [...new Set([...daysFrom(start, 0, 9), ...datesOfChange(start, zone)])];
  const shifts = dates.flatMap((date) => shiftsOn(date, [{ ...row, until: null }], [], zone));
  const offset = (at: number) => DateTime.fromMillis(at, { zone }).offset;
  const turns = (shift: ShiftRow) => offset(shift.endsAt - 1) - offset(shift.startsAt);
  const examples: [Example['of'], ShiftRow | undefined][] = [
    ['next', shifts.find((one) => one.endsAt > now && turns(one) === 0)],
    ['clocks-forward', shifts.find((one) => turns(one) > 0)],
    ['clocks-back', shifts.find((one) => turns(one) < 0)],
  ];
  return {
    examples: examples.flatMap(([of, shift]) => (shift ? [exampleOf(of, shift)] : [])),
    overlaps: await overlapping({ tx: from }, row, changed ? await endedBy(from, changed, start) : []),
  };
}

/** What goes before a changed pattern, ended on the date from which it is otherwise: as saving it would leave it. */
async function endedBy(
  from: EntityManager,
  changed: ShiftPatternRow,
  until: string,
): Promise<ShiftPatternRow[]> {
  const others = await from.findBy(ShiftPatternRow, { shedId: changed.shedId, id: Not(changed.id) });
  return others
    .filter((one) => rootOf(one) === rootOf(changed) && one.until === changed.from)
    .map((one) => ({ ...one, until }));
}

/** Dates so many days after one, first to last. */
function daysFrom(date: string, first: number, last: number): string[] {
  const at = DateTime.fromISO(date, { zone: 'utc' });
  return datesBetween(at.plus({ days: first }).toISODate() ?? '', at.plus({ days: last }).toISODate() ?? '');
}

/** Dates on which a shift may begin during which the clocks change: asked at each keystroke, so no year of shifts. */
function datesOfChange(start: string, zone: string): string[] {
  const noon = (date: string) => DateTime.fromISO(`${date}T12:00`, { zone }).offset;
  return daysFrom(start, 0, AHEAD).flatMap((date, i, dates) => {
    const next = dates[i + 1];
    return next !== undefined && noon(date) !== noon(next) ? [date, next] : [];
  });
}

function exampleOf(of: Example['of'], shift: ShiftRow): Example {
  const { date, startsAt, endsAt, mealStartsAt, mealEndsAt, mealLooms } = shift;
  const meal = mealLooms === 'stopped' ? (mealEndsAt ?? 0) - (mealStartsAt ?? 0) : 0;
  return { of, date, startsAt, endsAt, minutes: (endsAt - startsAt - meal) / 60_000 };
}
