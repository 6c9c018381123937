import { In } from 'typeorm';
import type * as z from 'zod/mini';
import { inForceAt, type LoomVersion } from '../../../shared/contract/reference.js';
import type { Changed, LoomFacts, newLoomVersionsSchema } from '../../../shared/contract/set-up.js';
import { LoomVersionRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { insertRows } from '../book/bulk.js';
import { longestShift, whyTooNarrow } from './clock-width.js';
import type { WrongField } from './loom-places.js';
import { loomsById } from './looms-by-id.js';
import { newVersionId } from './new-ids.js';
import type { SetUpChange } from './set-up-change.js';

/** New facts of looms from a moment; what is left out stays as it was then. Versions of later moments stay. */
export async function addLoomVersions(
  change: SetUpChange,
  { loomIds, effectiveAt, facts }: z.infer<typeof newLoomVersionsSchema>,
): Promise<Changed> {
  if (Object.keys(facts).length === 0)
    throw wrongField('facts', 'Say what is to change: speed, reed space, clock, shuttles or battery.');
  const { tx } = change;
  const looms = await loomsById(change, loomIds, (i) => `loomIds.${i}`);
  const versions = await tx.findBy(LoomVersionRow, { loomId: In([...loomIds]) });
  const wrong: WrongField[] = [];
  const ids: string[] = [];
  const made: LoomVersion[] = [];
  const minutes = new Map<string, number>();
  for (const { shedId } of loomIds.map(looms))
    if (!minutes.has(shedId)) minutes.set(shedId, await longestShift(tx, shedId));
  for (const [i, loomId] of loomIds.entries()) {
    const loom = looms(loomId);
    const own = versions.filter((one) => one.loomId === loomId);
    const before = factsOf(
      inForceAt(own, effectiveAt) ?? own.sort((a, b) => a.effectiveAt - b.effectiveAt)[0],
    );
    const after = { ...before, ...facts } as LoomFacts;
    const name = `Loom ${loom.number}`;
    if (loom.until !== null && effectiveAt >= loom.until)
      wrong.push({ path: `loomIds.${i}`, message: `${name} is out of use by then. Choose an earlier time.` });
    const narrow = whyTooNarrow(after, minutes.get(loom.shedId) ?? 0);
    if (narrow !== null)
      wrong.push({ path: facts.clock ? 'facts.clock' : 'facts.ppm', message: `${name}: ${narrow}` });
    if (!change.recordDifference('loom', name, before ?? {}, after, { effectiveAt })) continue;
    const id = newVersionId(own, effectiveAt);
    made.push({ id, loomId, effectiveAt, ...after });
    ids.push(id);
  }
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
  await insertLoomVersions(change, made);
  for (const shedId of new Set(made.map((one) => looms(one.loomId).shedId)))
    await change.remakeFrom(shedId, effectiveAt);
  return { ids };
}

/** 500 looms at once are no rarity: a statement for many rows. */
export async function insertLoomVersions({ tx }: SetUpChange, made: readonly LoomVersion[]): Promise<void> {
  await insertRows(
    tx,
    'loom_version',
    ['id', 'loomId', 'effectiveAt', 'ppm', 'reedSpaceCm', 'clock', 'shuttles', 'battery'],
    made.map(({ id, loomId, effectiveAt, ppm, reedSpaceCm, clock, shuttles, battery }) => [
      id,
      loomId,
      effectiveAt,
      ppm,
      reedSpaceCm,
      JSON.stringify(clock),
      shuttles,
      Number(battery),
    ]),
  );
}

function factsOf(version: LoomVersionRow | undefined): LoomFacts | null {
  if (!version) return null;
  const { ppm, reedSpaceCm, clock, shuttles, battery } = version;
  return { ppm, reedSpaceCm, clock, shuttles, battery };
}
