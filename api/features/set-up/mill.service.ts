import type { Changed, MillForm } from '../../../shared/contract/set-up.js';
import { MillRow } from '../../database/entities/index.js';
import { ApiError } from '../../middleware/api-error.js';
import type { SetUpChange } from './set-up-change.js';

/** The mill's name, units, who may see figures by person, when tablets lock. Its time zone is fixed: shifts stand on it. */
export async function changeMill(change: SetUpChange, asked: MillForm): Promise<Changed> {
  const { tx } = change;
  const mill = await tx.findOneBy(MillRow, { id: 1 });
  if (!mill) throw new ApiError('not-found');
  await tx.update(MillRow, { id: 1 }, asked);
  const { name, units, figuresByPerson, lockAfterMinutes } = mill;
  change.recordDifference('mill', name, { name, units, figuresByPerson, lockAfterMinutes }, asked);
  return { ids: [] };
}
