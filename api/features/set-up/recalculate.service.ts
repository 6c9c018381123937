import type * as z from 'zod/mini';
import type { recalculatedSchema, recalculateSchema } from '../../../shared/contract/set-up.js';
import { ShedRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';
import { ChangeLog } from '../book/change-log.js';
import { restateShift } from '../book/restated-shift.js';
import { recordChange } from '../change-record/record-change.js';
import { wrongDate } from './pattern-checks.js';

/**
 * States a shed's closed shifts from a date on again with what is now in force. Each shift is a transaction of its
 * own, so that a year of them keeps no tap waiting; a command that was broken off can be given again.
 */
export async function recalculate(
  deps: Deps,
  principal: Principal,
  { shedId, from, reason }: z.infer<typeof recalculateSchema>,
): Promise<z.infer<typeof recalculatedSchema>> {
  const wrong = wrongDate(from, 'from');
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
  const by = principal.person?.id ?? '';
  const at = deps.now();
  const { changeSeq, keys } = await deps.writer.write(async (tx) => {
    const shed = await tx.findOneBy(ShedRow, { id: shedId });
    if (!shed) throw wrongField('shedId', 'There is no such shed. Choose one of the list.');
    if (!maySeeShed(principal, shedId)) throw new ApiError('other-shed');
    const rows = await tx.query<{ key: string }[]>(
      `SELECT "key" FROM "shift" WHERE "shedId" = ? AND "date" >= ? AND "state" = 'closed' ORDER BY "startsAt"`,
      [shedId, from],
    );
    const changeSeq = await recordChange(tx, {
      by,
      at,
      what: 'recalculation',
      name: shed.name,
      action: 'command',
      after: { from, shifts: rows.length },
      reason,
    });
    return { changeSeq, keys: rows.map((row) => row.key) };
  });
  const changed: string[] = [];
  for (const key of keys) {
    const { isOther, seq } = await deps.writer.write(async (tx) => {
      const isOther = await restateShift(tx, key, { by, at, changeSeq });
      const changes = new ChangeLog();
      if (isOther) changes.add(shedId, 'shift', key);
      return { isOther, seq: (await changes.write(tx)).seq };
    });
    if (seq !== null) deps.feed.announce(shedId, seq);
    if (isOther) changed.push(key);
    await new Promise(setImmediate);
  }
  return { shifts: keys.length, changed };
}
