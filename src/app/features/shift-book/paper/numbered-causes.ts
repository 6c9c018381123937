import { inForceAt, type CauseVersion, type Reference } from '@shared/contract/reference';
import type { NumberedCause } from './other-stops';

/**
 * The mill's causes with their numbers as they stand on blank log cards: places in its list.
 *
 * @param at what was in force then
 */
export function numberedCauses(reference: Reference, at: number): readonly NumberedCause[] {
  const byCause = new Map<string, CauseVersion[]>();
  for (const version of reference.causeVersions)
    byCause.set(version.causeId, [...(byCause.get(version.causeId) ?? []), version]);
  return [...byCause.values()]
    .map((versions) => inForceAt(versions, at) ?? versions[0])
    .filter((cause) => cause !== undefined)
    .map((cause, place) => ({ number: place + 1, cause }));
}
