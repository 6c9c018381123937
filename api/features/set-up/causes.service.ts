import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import { inForceAt } from '../../../shared/contract/reference.js';
import type {
  CauseFacts,
  Changed,
  newCauseSchema,
  newCauseVersionSchema,
} from '../../../shared/contract/set-up.js';
import { PERN_CHANGE, WAIT_TACKLER } from '../../../shared/entries/phases.js';
import { CauseVersionRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { requireFreeName } from './free-names.js';
import { newVersionId } from './new-ids.js';
import { ALWAYS, type SetUpChange } from './set-up-change.js';

/** The lines' arithmetic knows these by what they are: they keep their group. */
const KNOWN: ReadonlySet<string> = new Set([WAIT_TACKLER, PERN_CHANGE]);

export async function addCause(
  change: SetUpChange,
  { facts }: z.infer<typeof newCauseSchema>,
): Promise<Changed> {
  const { tx } = change;
  await requireCause(change, facts, null, ALWAYS);
  const causeId = uuid();
  await tx.insert(CauseVersionRow, { id: uuid(), causeId, effectiveAt: ALWAYS, ...facts });
  change.record({ what: 'cause', name: facts.name, action: 'added', after: facts });
  return { ids: [causeId] };
}

/** A cause's name, group, allowance and who attends from a moment on. Versions of later moments stay. */
export async function addCauseVersion(
  change: SetUpChange,
  causeId: string,
  { effectiveAt, facts }: z.infer<typeof newCauseVersionSchema>,
): Promise<Changed> {
  const { tx } = change;
  const versions = await tx.findBy(CauseVersionRow, { causeId });
  const before = inForceAt(versions, effectiveAt) ?? versions[0];
  if (!before) throw new ApiError('not-found');
  await requireCause(change, facts, causeId, effectiveAt);
  if (KNOWN.has(causeId) && facts.group !== before.group)
    throw wrongField('facts.group', `${before.name} stays in its group: other figures are made from it.`);
  if (!change.recordDifference('cause', before.name, factsOf(before), facts, { effectiveAt }))
    return { ids: [] };
  const id = newVersionId(versions, effectiveAt);
  await tx.insert(CauseVersionRow, { id, causeId, effectiveAt, ...facts });
  await change.remakeFrom(null, effectiveAt);
  return { ids: [id] };
}

async function requireCause(
  { tx, now }: SetUpChange,
  { name, group, breakOf }: CauseFacts,
  own: string | null,
  effectiveAt: number,
): Promise<void> {
  const byCause = new Map<string, CauseVersionRow[]>();
  for (const one of await tx.find(CauseVersionRow))
    byCause.set(one.causeId, [...(byCause.get(one.causeId) ?? []), one]);
  const others = [...byCause.values()].flatMap((versions) => {
    const then = inForceAt(versions, Math.max(now, effectiveAt));
    return then ? [{ id: then.causeId, name: then.name }] : [];
  });
  requireFreeName(others, name, own, 'facts.name', 'cause');
  if (breakOf !== null && breakOf !== group)
    throw wrongField(
      'facts.breakOf',
      `A break of ${breakOf} belongs to the group ${breakOf}. Choose that group, or count it as no break.`,
    );
}

const factsOf = ({ name, group, attendedBy, allowanceS, breakOf }: CauseFacts): CauseFacts => ({
  name,
  group,
  attendedBy,
  allowanceS,
  breakOf,
});
