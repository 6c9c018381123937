import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import type { Changed, jobFormSchema, partFormSchema } from '../../../shared/contract/set-up.js';
import { JobRow, PartRow } from '../../database/entities/index.js';
import { ApiError } from '../../middleware/api-error.js';
import { requireFreeName } from './free-names.js';
import type { SetUpChange } from './set-up-change.js';

type PartForm = z.infer<typeof partFormSchema>;
type JobForm = z.infer<typeof jobFormSchema>;

export async function addPart(change: SetUpChange, asked: PartForm): Promise<Changed> {
  const { tx } = change;
  requireFreeName(await tx.find(PartRow), asked.name, null, 'name', 'part');
  const id = uuid();
  await tx.insert(PartRow, { id, ...asked });
  change.record({ what: 'part', name: asked.name, action: 'added', after: asked });
  return { ids: [id] };
}

/** A part that is retired is no longer offered; repairs that name it keep its name. */
export async function changePart(change: SetUpChange, id: string, asked: PartForm): Promise<Changed> {
  const { tx } = change;
  const part = await tx.findOneBy(PartRow, { id });
  if (!part) throw new ApiError('not-found');
  requireFreeName(await tx.find(PartRow), asked.name, id, 'name', 'part');
  await tx.update(PartRow, { id }, asked);
  const { name, retired } = part;
  change.recordDifference('part', name, { name, retired }, asked);
  return { ids: [id] };
}

export async function addJob(change: SetUpChange, asked: JobForm): Promise<Changed> {
  const { tx } = change;
  requireFreeName(await tx.find(JobRow), asked.name, null, 'name', 'job');
  const id = uuid();
  await tx.insert(JobRow, { id, ...asked });
  change.record({ what: 'job', name: asked.name, action: 'added', after: asked });
  return { ids: [id] };
}

export async function changeJob(change: SetUpChange, id: string, asked: JobForm): Promise<Changed> {
  const { tx } = change;
  const job = await tx.findOneBy(JobRow, { id });
  if (!job) throw new ApiError('not-found');
  requireFreeName(await tx.find(JobRow), asked.name, id, 'name', 'job');
  await tx.update(JobRow, { id }, asked);
  const { name, everyPicks, retired } = job;
  change.recordDifference('job', name, { name, everyPicks, retired }, asked);
  return { ids: [id] };
}
