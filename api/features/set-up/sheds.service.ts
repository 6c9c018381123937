import type * as z from 'zod/mini';
import type { Changed, shedFormSchema } from '../../../shared/contract/set-up.js';
import { ShedRow } from '../../database/entities/index.js';
import { ApiError } from '../../middleware/api-error.js';
import { requireFreeName } from './free-names.js';
import { shortId } from './new-ids.js';
import type { SetUpChange } from './set-up-change.js';

type ShedForm = z.infer<typeof shedFormSchema>;

/** A manager of some sheds alone cannot make another: it would not be theirs to see. */
export async function addShed(change: SetUpChange, { name }: ShedForm): Promise<Changed> {
  if ((change.principal.person?.shedIds ?? []).length > 0) throw new ApiError('other-shed');
  const { tx } = change;
  requireFreeName(await tx.find(ShedRow), name, null, 'name', 'shed');
  const id = shortId();
  await tx.insert(ShedRow, { id, name });
  change.record({ what: 'shed', name, action: 'added', after: { name } });
  return { ids: [id] };
}

export async function changeShed(change: SetUpChange, id: string, { name }: ShedForm): Promise<Changed> {
  const { tx } = change;
  const shed = await tx.findOneBy(ShedRow, { id });
  if (!shed) throw new ApiError('not-found');
  change.requireOwn(id);
  requireFreeName(await tx.find(ShedRow), name, id, 'name', 'shed');
  await tx.update(ShedRow, { id }, { name });
  change.recordDifference('shed', shed.name, { name: shed.name }, { name });
  return { ids: [id] };
}
