import { In } from 'typeorm';
import type * as z from 'zod/mini';
import type { alleyFormSchema, Changed } from '../../../shared/contract/set-up.js';
import { AlleyRow, LoomRow, PersonRow } from '../../database/entities/index.js';
import { wrongField } from '../../middleware/api-error.js';
import { readRights } from '../book/rights.js';
import type { SetUpChange } from './set-up-change.js';

/** Says who serves an alley, and may give it another name: its looms go with it. */
export async function changeAlley(
  change: SetUpChange,
  { shedId, name, newName = name, tacklerIds }: z.infer<typeof alleyFormSchema>,
): Promise<Changed> {
  const { tx } = change;
  await change.requireShed(shedId);
  await requireTacklers(change, tacklerIds);
  const alleys = tx.getRepository(AlleyRow);
  const looms = tx.getRepository(LoomRow);
  const before = await alleys.findOneBy({ shedId, name });
  const known = before !== null || (await looms.existsBy({ shedId, alley: name }));
  if (newName !== name) {
    if (!known) throw wrongField('name', 'There is no such alley. Choose one of the list.');
    const taken =
      (await alleys.existsBy({ shedId, name: newName })) ||
      (await looms.existsBy({ shedId, alley: newName }));
    if (taken) throw wrongField('newName', 'Another alley of the shed has this name. Choose a free one.');
    await tx.update(LoomRow, { shedId, alley: name }, { alley: newName });
  }
  await tx.delete(AlleyRow, { shedId, name });
  await tx.insert(AlleyRow, { shedId, name: newName, tacklerIds });
  const after = { name: newName, tacklerIds };
  if (known)
    change.recordDifference('alley', `Alley ${name}`, { name, tacklerIds: before?.tacklerIds ?? [] }, after);
  else change.record({ what: 'alley', name: `Alley ${name}`, action: 'added', after });
  return { ids: [] };
}

async function requireTacklers({ tx }: SetUpChange, tacklerIds: readonly string[]): Promise<void> {
  const people = new Map(
    (await tx.findBy(PersonRow, { id: In([...tacklerIds]) })).map((one) => [one.id, one.name]),
  );
  const rights = await readRights(tx, tacklerIds);
  tacklerIds.forEach((id, i) => {
    const name = people.get(id);
    if (name === undefined)
      throw wrongField(`tacklerIds.${i}`, 'There is no such person. Choose one of the list.');
    const now = rights.get(id)?.at(-1);
    if (!now?.roles.includes('tackler') || now.disabled)
      throw wrongField(
        `tacklerIds.${i}`,
        `${name} is no tackler. Choose a tackler, or give ${name} that role first.`,
      );
    if (tacklerIds.indexOf(id) !== i) throw wrongField(`tacklerIds.${i}`, `${name} stands here twice.`);
  });
}
