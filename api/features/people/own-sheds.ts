import { In, type EntityManager } from 'typeorm';
import { ShedRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';

/** Who manages some sheds has no say over people of others, nor over those (or himself) who may see all: []. */
export function requireOwnSheds({ person }: Principal, shedIds: readonly string[]): void {
  const own = person?.shedIds ?? [];
  if (own.length === 0) return;
  if (shedIds.length === 0 || !shedIds.every((id) => own.includes(id))) throw new ApiError('other-shed');
}

/** What is the whole mill's is for a manager of all sheds alone. Throws `other-shed`. */
export function requireAllSheds(principal: Principal): void {
  requireOwnSheds(principal, []);
}

export async function requireSheds(tx: EntityManager, shedIds: readonly string[]): Promise<void> {
  const known = await tx.getRepository(ShedRow).countBy({ id: In([...shedIds]) });
  if (known !== new Set(shedIds).size) throw wrongField('shedIds', 'There is no such shed.');
}
