import type * as z from 'zod/mini';
import { inForceAt } from '../../../shared/contract/reference.js';
import type {
  Changed,
  changePatternSchema,
  endPatternSchema,
  newPatternSchema,
  PatternFacts,
} from '../../../shared/contract/set-up.js';
import { LoomRow, LoomVersionRow, ShiftPatternRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { rootOf } from '../book/pattern-shifts.js';
import { remakeShifts } from '../book/remade-shifts.js';
import { whyTooNarrow } from './clock-width.js';
import { lengthOf } from './local-times.js';
import { shortId } from './new-ids.js';
import { overlap, wrongDate, wrongFacts } from './pattern-checks.js';
import type { SetUpChange } from './set-up-change.js';

/** Lines of open shifts that adjoin what was remade look at it. */
const NEIGHBOURS = 2 * 86_400_000;

/** A new pattern of a shed; its shifts are made at once. */
export async function addPattern(
  change: SetUpChange,
  { shedId, from, facts }: z.infer<typeof newPatternSchema>,
): Promise<Changed> {
  await change.requireShed(shedId);
  requireDate(from);
  const row: ShiftPatternRow = { id: shortId(), shedId, ...facts, rootId: null, from, until: null };
  await requireFits(change, row, []);
  await insert(change, row);
  change.record({ what: 'pattern', name: facts.name, action: 'added', after: { ...facts, from } });
  return remake(change, row, from, [row.id]);
}

/** From a date on a pattern is otherwise; before it stays as it was. */
export async function changePattern(
  change: SetUpChange,
  id: string,
  { from, facts }: z.infer<typeof changePatternSchema>,
): Promise<Changed> {
  const { tx } = change;
  const row = await patternOf(change, id, from);
  const before = { ...factsOf(row), from: row.from };
  const splits = row.from === null || from > row.from;
  const after: ShiftPatternRow = splits
    ? { ...row, ...facts, id: shortId(), rootId: rootOf(row), from }
    : { ...row, ...facts, from };
  const earlier = splits ? row : await predecessorOf(change, row);
  if (!splits && earlier && earlier.from !== null && from <= earlier.from)
    throw wrongField('from', `This pattern was another one until then. Choose a date after ${earlier.from}.`);
  const ended = earlier && { ...earlier, until: from };
  await requireFits(change, after, ended ? [ended] : []);
  if (ended) await tx.update(ShiftPatternRow, { id: ended.id }, { until: from });
  await tx.delete(ShiftPatternRow, { id: after.id });
  await insert(change, after);
  change.recordDifference('pattern', row.name, before, { ...facts, from });
  const since = row.from !== null && row.from < from && !splits ? row.from : from;
  return remake(change, row, since, [after.id]);
}

/** A pattern's last date is the day before; what it was to become later is dropped. */
export async function endPattern(
  change: SetUpChange,
  id: string,
  { from }: z.infer<typeof endPatternSchema>,
): Promise<Changed> {
  const { tx } = change;
  const row = await patternOf(change, id, from);
  const chain = (await patternsOf(change, row.shedId)).filter((one) => rootOf(one) === rootOf(row));
  for (const one of chain)
    if (one.from !== null && one.from >= from) await tx.delete(ShiftPatternRow, { id: one.id });
    else if (one.until === null || one.until > from)
      await tx.update(ShiftPatternRow, { id: one.id }, { until: from });
  change.record({
    what: 'pattern',
    name: row.name,
    action: 'ended',
    before: { until: row.until },
    after: { until: from },
  });
  return remake(change, row, from, [id]);
}

async function patternOf(change: SetUpChange, id: string, from: string): Promise<ShiftPatternRow> {
  const row = await change.tx.findOneBy(ShiftPatternRow, { id });
  if (!row) throw new ApiError('not-found');
  change.requireOwn(row.shedId);
  requireDate(from);
  if (row.until !== null && from >= row.until)
    throw wrongField(
      'from',
      `This pattern ends or is another one from ${row.until} on. Choose an earlier date, or the one that follows it.`,
    );
  return row;
}

async function predecessorOf(change: SetUpChange, row: ShiftPatternRow): Promise<ShiftPatternRow | null> {
  const chain = (await patternsOf(change, row.shedId)).filter((one) => rootOf(one) === rootOf(row));
  return chain.find((one) => one.id !== row.id && one.until === row.from) ?? null;
}

function patternsOf({ tx }: SetUpChange, shedId: string): Promise<ShiftPatternRow[]> {
  return tx.findBy(ShiftPatternRow, { shedId });
}

async function insert({ tx }: SetUpChange, row: ShiftPatternRow): Promise<void> {
  await tx.insert(ShiftPatternRow, row);
}

/** Throws where a pattern is wrong by itself, overlaps another of its shed, or is too long for a loom's clock. */
async function requireFits(
  change: SetUpChange,
  row: ShiftPatternRow,
  changed: readonly ShiftPatternRow[],
): Promise<void> {
  const wrong = wrongFacts(row);
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
  const names = await overlapping(change, row, changed);
  if (names.length > 0)
    throw wrongField(
      'facts.startsLocal',
      `It would overlap ${names.join(' and ')}. Shifts of one shed follow one another: change the times or weekdays, or end that pattern first.`,
    );
  const narrow = await narrowClock(change, row.shedId, lengthOf(row));
  if (narrow !== null) throw wrongField('facts.endsLocal', narrow);
}

/** Names of the shed's patterns that one would overlap; `changed`: those that are to be otherwise than they are. */
export async function overlapping(
  change: Pick<SetUpChange, 'tx'>,
  row: ShiftPatternRow,
  changed: readonly ShiftPatternRow[],
): Promise<string[]> {
  const others = await change.tx.findBy(ShiftPatternRow, { shedId: row.shedId });
  const now = others.map((one) => changed.find(({ id }) => id === one.id) ?? one);
  return [...new Set(now.filter((one) => one.id !== row.id && overlap(row, one)).map((one) => one.name))];
}

async function narrowClock({ tx }: SetUpChange, shedId: string, minutes: number): Promise<string | null> {
  const versions = await tx.find(LoomVersionRow);
  for (const loom of await tx.find(LoomRow, { where: { shedId }, order: { number: 'ASC' } })) {
    if (loom.until !== null) continue;
    const last = inForceAt(
      versions.filter((one) => one.loomId === loom.id),
      Infinity,
    );
    const why = last ? whyTooNarrow(last, minutes) : null;
    if (why !== null) return `Loom ${loom.number}: ${why}`;
  }
  return null;
}

async function remake(
  change: SetUpChange,
  row: ShiftPatternRow,
  from: string,
  ids: string[],
): Promise<Changed> {
  return { ids, ...(await remakeShiftsOf(change, row.shedId, new Set([rootOf(row)]), from, null)) };
}

/** Makes shifts anew, tells the tablets of each, and names those that stay as they are. */
export async function remakeShiftsOf(
  change: SetUpChange,
  shedId: string,
  roots: ReadonlySet<string> | null,
  from: string,
  until: string | null,
): Promise<{ kept?: string[] }> {
  const remade = await remakeShifts(change.tx, { shedId, roots, from, until, now: change.now });
  for (const key of remade.changed) change.changes.add(shedId, 'shift', key);
  if (remade.since !== null) await change.remakeFrom(shedId, remade.since - NEIGHBOURS);
  return remade.kept.length > 0 ? { kept: [...remade.kept] } : {};
}

function requireDate(from: string): void {
  const wrong = wrongDate(from, 'from');
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
}

function factsOf({ name, startsLocal, endsLocal, weekdays, meal }: ShiftPatternRow): PatternFacts {
  return { name, startsLocal, endsLocal, weekdays, meal };
}
