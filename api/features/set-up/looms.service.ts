import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import type { Loom } from '../../../shared/contract/reference.js';
import type { Changed, moveLoomsSchema, newLoomsSchema } from '../../../shared/contract/set-up.js';
import { LoomRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { insertRows } from '../book/bulk.js';
import { longestShift, whyTooNarrow } from './clock-width.js';
import { wrongPlaces } from './loom-places.js';
import { whyNotUntil } from './loom-until.js';
import { insertLoomVersions } from './loom-versions.service.js';
import { loomsById } from './looms-by-id.js';
import { ALWAYS, type SetUpChange } from './set-up-change.js';

const COLUMNS = ['id', 'shedId', 'number', 'row', 'position', 'alley', 'from', 'until'] as const;

/** New looms, alike but for their places; what is said of them holds from the beginning. */
export async function addLooms(
  change: SetUpChange,
  { shedId, from, places, facts }: z.infer<typeof newLoomsSchema>,
): Promise<Changed> {
  const { tx } = change;
  await change.requireShed(shedId);
  const narrow = whyTooNarrow(facts, await longestShift(tx, shedId));
  if (narrow !== null) throw wrongField('facts.clock', narrow);
  const looms: Loom[] = places.map((place) => ({ id: uuid(), shedId, ...place, from, until: null }));
  await requirePlaces(change, shedId, looms, new Map(looms.map((loom, i) => [loom.id, `places.${i}`])));
  await insertRows(
    tx,
    'loom',
    COLUMNS,
    looms.map((loom) => COLUMNS.map((column) => loom[column])),
  );
  await insertLoomVersions(
    change,
    looms.map(({ id }) => ({ id: uuid(), loomId: id, effectiveAt: ALWAYS, ...facts })),
  );
  for (const { number, row, position, alley } of looms)
    change.record({
      what: 'loom',
      name: `Loom ${number}`,
      action: 'added',
      effectiveAt: from,
      after: { number, row, position, alley, ...facts },
    });
  await change.remakeFrom(shedId, from);
  return { ids: looms.map(({ id }) => id) };
}

/** Moves and renumbers looms, all or none: what counts is how they stand in the end, so two may change places. */
export async function moveLooms(
  change: SetUpChange,
  { looms: asked }: z.infer<typeof moveLoomsSchema>,
): Promise<Changed> {
  const { tx } = change;
  const before = await loomsById(
    change,
    asked.map((one) => one.id),
    (i) => `looms.${i}.id`,
  );
  const after = asked.map((one): Loom => ({ ...before(one.id), ...one }));
  if (new Set(after.map((one) => one.id)).size < after.length)
    throw wrongField('looms', 'A loom stands here twice. Say once where it is to stand.');
  const paths = new Map(asked.map((one, i) => [one.id, `looms.${i}`]));
  for (const shedId of new Set(after.map((one) => one.shedId)))
    await requirePlaces(
      change,
      shedId,
      after.filter((one) => one.shedId === shedId),
      paths,
    );
  for (const loom of after) {
    const was = before(loom.id);
    const { id, number, row, position, alley } = loom;
    if (!change.recordDifference('loom', `Loom ${was.number}`, placeOf(was), placeOf(loom))) continue;
    await tx.update(LoomRow, { id }, { number, row, position, alley });
    // A line's row of looms is the loom's own, for finding; its figures are not touched.
    if (row !== was.row) await tx.query(`UPDATE "loom_line" SET "row" = ? WHERE "loomId" = ?`, [row, id]);
  }
  return { ids: after.map(({ id }) => id) };
}

const placeOf = ({ number, row, position, alley }: Loom) => ({ number, row, position, alley });

/** Takes a loom out of use from a moment on, or leaves it in use after all. */
export async function setLoomUntil(change: SetUpChange, id: string, until: number | null): Promise<Changed> {
  const { tx } = change;
  const loom = await tx.findOneBy(LoomRow, { id });
  if (!loom) throw new ApiError('not-found');
  change.requireOwn(loom.shedId);
  const why = until === null ? null : await whyNotUntil(tx, loom, until);
  if (why !== null) throw wrongField('until', why);
  const others = await tx.findBy(LoomRow, { shedId: loom.shedId });
  const after = others.map((one) => (one.id === id ? { ...one, until } : { ...one }));
  const [rival] = wrongPlaces(after, new Map([[id, 'until']]));
  if (rival) throw wrongField('until', rival.message);
  await tx.update(LoomRow, { id }, { until });
  change.record({
    what: 'loom',
    name: `Loom ${loom.number}`,
    action: until === null ? 'changed' : 'ended',
    effectiveAt: until,
    before: { until: loom.until },
    after: { until },
  });
  await change.remakeFrom(loom.shedId, Math.min(until ?? Infinity, loom.until ?? Infinity));
  return { ids: [id] };
}

async function requirePlaces(
  { tx }: SetUpChange,
  shedId: string,
  asked: readonly Loom[],
  paths: ReadonlyMap<string, string>,
): Promise<void> {
  const own = new Set(asked.map((one) => one.id));
  const others = (await tx.findBy(LoomRow, { shedId })).filter((one) => !own.has(one.id));
  const wrong = wrongPlaces([...others, ...asked], paths);
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
}
