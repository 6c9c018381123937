import { inForceAt } from '@shared/contract/reference';

/** The version that a form opens with: what is in force now, or what will be first. */
export function versionToEdit<V extends { effectiveAt: number; id: string }>(
  versions: readonly V[],
  now: number,
): V | undefined {
  return inForceAt(versions, now) ?? [...versions].sort((a, b) => a.effectiveAt - b.effectiveAt)[0];
}
