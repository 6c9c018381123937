import type { PersonRow as PersonOnWire } from '../../../shared/contract/session.js';
import type { PersonRightsRow, PersonRow } from '../../database/entities/index.js';

/** `history`: the person's rights, oldest first; `linkUntil`: how long a letter's link works. Hashes stay here. */
export function toPerson(
  row: PersonRow,
  history: readonly PersonRightsRow[],
  linkUntil: number | null,
): PersonOnWire {
  const latest = history.at(-1);
  return {
    id: row.id,
    name: row.name,
    shortName: row.shortName,
    worksNumber: row.worksNumber,
    email: row.email,
    roles: latest?.roles ?? [],
    shedIds: latest?.shedIds ?? [],
    disabledAt: disabledSince(history),
    usualSet: row.usualSet,
    hasPassword: row.passwordHash !== null,
    hasPin: row.pinHash !== null,
    linkUntil,
  };
}

/** When the spell of being disabled began in which the person is now; null: not disabled. */
function disabledSince(history: readonly PersonRightsRow[]): number | null {
  let since: number | null = null;
  for (const rights of history) since = rights.disabled ? (since ?? rights.effectiveAt) : null;
  return since;
}
