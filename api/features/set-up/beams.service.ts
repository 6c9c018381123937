import { v7 as uuid } from 'uuid';
import type { BeamForm, Changed } from '../../../shared/contract/set-up.js';
import { ClothRow, WarpRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { requireFreeName } from './free-names.js';
import { beamsOnLooms, usedBeams } from './read-set-up.js';
import type { SetUpChange } from './set-up-change.js';

/** A beam with its warp, in store. Which loom it is on is said by a warp change, as found or gaited. */
export async function addBeam(change: SetUpChange, asked: BeamForm): Promise<Changed> {
  const { tx } = change;
  const cloth = await requireBeam(change, asked, null);
  if (cloth.retired)
    throw wrongField(
      'clothId',
      `${cloth.name} is no longer woven. Choose another cloth, or take it up again first.`,
    );
  const id = uuid();
  await tx.insert(WarpRow, { id, ...asked });
  change.record({
    what: 'beam',
    name: asked.name,
    action: 'added',
    after: { ...asked, clothId: cloth.name },
  });
  return { ids: [id] };
}

/** No figure that was signed changes by it: lines know the cloth by the warp change. */
export async function changeBeam(change: SetUpChange, id: string, asked: BeamForm): Promise<Changed> {
  const { tx } = change;
  const beam = await beamOf(change, id);
  const cloth = await requireBeam(change, asked, id);
  if (asked.clothId !== beam.clothId && (await usedBeams(tx)).has(id))
    throw wrongField(
      'clothId',
      'This beam has been on a loom with its cloth. Correct the warp change there, or set up another beam.',
    );
  await tx.update(WarpRow, { id }, asked);
  const named = async (one: BeamForm) => ({
    name: one.name,
    cloth: one.clothId === cloth.id ? cloth.name : (await tx.findOneBy(ClothRow, { id: one.clothId }))?.name,
    lengthM: one.lengthM,
    thrumM: one.thrumM,
  });
  change.recordDifference('beam', beam.name, await named(beam), await named(asked));
  return { ids: [id] };
}

/** Only a beam that no warp change names, counting or not. */
export async function removeBeam(change: SetUpChange, id: string): Promise<Changed> {
  const { tx } = change;
  const { name, lengthM, thrumM } = await beamOf(change, id);
  if ((await usedBeams(tx)).has(id))
    throw new ApiError('conflict', {
      detail: `${name} has been on a loom, so the book keeps it. Nothing was changed.`,
    });
  await tx.delete(WarpRow, { id });
  change.record({ what: 'beam', name, action: 'removed', before: { lengthM, thrumM } });
  return { ids: [id] };
}

async function beamOf({ tx }: SetUpChange, id: string): Promise<WarpRow> {
  const beam = await tx.findOneBy(WarpRow, { id });
  if (!beam) throw new ApiError('not-found');
  return beam;
}

/** Beams that are finished may have had the same name: what must be told apart is in store or on a loom. */
async function requireBeam({ tx, now }: SetUpChange, asked: BeamForm, own: string | null): Promise<ClothRow> {
  const [used, onLooms] = [await usedBeams(tx), await beamsOnLooms(tx, now)];
  const there = (await tx.find(WarpRow)).filter((one) => !used.has(one.id) || onLooms.has(one.id));
  requireFreeName(there, asked.name, own, 'name', 'beam in store or on a loom');
  const cloth = await tx.findOneBy(ClothRow, { id: asked.clothId });
  if (!cloth) throw wrongField('clothId', 'There is no such cloth. Choose one of the list.');
  if (asked.thrumM >= asked.lengthM)
    throw wrongField('thrumM', `The thrum is a part of the warp: less than its ${asked.lengthM} m.`);
  return cloth;
}
