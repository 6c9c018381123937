import type * as z from 'zod/mini';
import type { Changed, shedFormSchema } from '../../../shared/contract/set-up.js';
import { ShedRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { shortId } from './new-ids.js';
import type { SetUpChange } from './set-up-change.js';

type ShedForm = z.infer<typeof shedFormSchema>;

/** A manager of some sheds alone cannot make another: it would not be theirs to see. */
export async function addShed(change: SetUpChange, { name }: ShedForm): Promise<Changed> {
  if ((change.principal.person?.shedIds ?? []).length > 0) throw new ApiError('other-shed');
  const { tx } = change;
  await requireFreeName(change, name, null);
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
  await requireFreeName(change, name, id);
  await tx.update(ShedRow, { id }, { name });
  change.recordDifference('shed', shed.name, { name: shed.name }, { name });
  return { ids: [id] };
}

async function requireFreeName({ tx }: SetUpChange, name: string, own: string | null): Promise<void> {
  const same = (await tx.find(ShedRow)).find((one) => one.name === name && one.id !== own);
  if (same) throw wrongField('name', 'Another shed has this name. Choose one that tells them apart.');
}
