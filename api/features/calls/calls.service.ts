import type { LoomHistory } from '../../../shared/contract/calls.js';
import { LoomRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';

/** A loom's history for whoever may see its shed; who repaired only for whoever may see people. */
export async function historyOf(
  { reads, reports, now }: Pick<Deps, 'reads' | 'reports' | 'now'>,
  principal: Principal,
  loomId: string,
): Promise<LoomHistory | null> {
  const loom = await reads.manager.findOneBy(LoomRow, { id: loomId });
  if (!loom) throw new ApiError('not-found');
  if (!maySeeShed(principal, loom.shedId)) throw new ApiError('other-shed');
  return reports.run('loomHistory', { loomId, asOf: now(), names: principal.permissions.has('people.read') });
}
