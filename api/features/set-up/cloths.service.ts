import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import { inForceAt } from '../../../shared/contract/reference.js';
import type {
  Changed,
  ClothFacts,
  clothFormSchema,
  newClothSchema,
  newClothVersionSchema,
  newTargetSchema,
  TargetFacts,
} from '../../../shared/contract/set-up.js';
import { ClothRow, ClothVersionRow, TargetRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { requireFreeName } from './free-names.js';
import { newVersionId } from './new-ids.js';
import { ALWAYS, type SetUpChange } from './set-up-change.js';

/** How far the shares of wefts may be off 1: thirds are typed with three digits. */
const SHARES_OFF = 0.001;

/** A new cloth; what is said of it holds from the beginning. */
export async function addCloth(change: SetUpChange, asked: z.infer<typeof newClothSchema>): Promise<Changed> {
  const { tx } = change;
  requireFreeName(await tx.find(ClothRow), asked.name, null, 'name', 'cloth');
  requireShares(asked.facts);
  const id = uuid();
  await tx.insert(ClothRow, { id, name: asked.name, retired: false });
  await tx.insert(ClothVersionRow, { id: uuid(), clothId: id, effectiveAt: ALWAYS, ...asked.facts });
  change.record({ what: 'cloth', name: asked.name, action: 'added', after: asked.facts });
  return { ids: [id] };
}

export async function changeCloth(
  change: SetUpChange,
  id: string,
  asked: z.infer<typeof clothFormSchema>,
): Promise<Changed> {
  const { tx } = change;
  const cloth = await clothOf(change, id);
  requireFreeName(await tx.find(ClothRow), asked.name, id, 'name', 'cloth');
  await tx.update(ClothRow, { id }, asked);
  change.recordDifference('cloth', cloth.name, { name: cloth.name, retired: cloth.retired }, asked);
  return { ids: [id] };
}

/** New facts of a cloth from a moment on. Versions of later moments stay. */
export async function addClothVersion(
  change: SetUpChange,
  clothId: string,
  { effectiveAt, facts }: z.infer<typeof newClothVersionSchema>,
): Promise<Changed> {
  const { tx } = change;
  const cloth = await clothOf(change, clothId);
  requireShares(facts);
  const versions = await tx.findBy(ClothVersionRow, { clothId });
  const before = factsOf(inForceAt(versions, effectiveAt));
  if (!change.recordDifference('cloth', cloth.name, before ?? {}, facts, { effectiveAt })) return { ids: [] };
  const id = newVersionId(versions, effectiveAt);
  await tx.insert(ClothVersionRow, { id, clothId, effectiveAt, ...facts });
  await change.remakeFrom(null, effectiveAt);
  return { ids: [id] };
}

/** What a cloth's looms should reach from a moment on: no figure changes by it. */
export async function addTarget(
  change: SetUpChange,
  { clothId, effectiveAt, facts }: z.infer<typeof newTargetSchema>,
): Promise<Changed> {
  const { tx } = change;
  const cloth = await tx.findOneBy(ClothRow, { id: clothId });
  if (!cloth) throw wrongField('clothId', 'There is no such cloth. Choose one of the list.');
  const targets = await tx.findBy(TargetRow, { clothId });
  const before = targetOf(inForceAt(targets, effectiveAt));
  if (!change.recordDifference('target', `Target of ${cloth.name}`, before, facts, { effectiveAt }))
    return { ids: [] };
  const id = newVersionId(targets, effectiveAt);
  await tx.insert(TargetRow, { id, clothId, effectiveAt, ...facts });
  return { ids: [id] };
}

async function clothOf({ tx }: SetUpChange, id: string): Promise<ClothRow> {
  const cloth = await tx.findOneBy(ClothRow, { id });
  if (!cloth) throw new ApiError('not-found');
  return cloth;
}

function requireShares({ wefts }: ClothFacts): void {
  const sum = wefts.reduce((all, weft) => all + weft.share, 0);
  if (Math.abs(sum - 1) > SHARES_OFF)
    throw wrongField(
      'facts.wefts',
      `The shares of the wefts add up to ${Number(sum.toFixed(4))}. Together they must be 1.`,
    );
}

function factsOf(version: ClothVersionRow | undefined): ClothFacts | null {
  if (!version) return null;
  const { ends, picksPerCmOnLoom, picksPerCmLoomState, reedWidthCm, crimp, abreast, wefts } = version;
  return { ends, picksPerCmOnLoom, picksPerCmLoomState, reedWidthCm, crimp, abreast, wefts };
}

const targetOf = (row: TargetRow | undefined): TargetFacts => ({
  efficiency: row?.efficiency ?? null,
  warpBreaks: row?.warpBreaks ?? null,
  weftBreaks: row?.weftBreaks ?? null,
});
