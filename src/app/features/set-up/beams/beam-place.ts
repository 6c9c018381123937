import type { Loom } from '@shared/contract/reference';
import type { SetUp } from '@shared/contract/set-up';

/** Where a beam is: "on loom 14", "in store", "was on a loom". */
export function beamPlace(
  { onLoomId, used }: Pick<SetUp['beams'][number], 'onLoomId' | 'used'>,
  looms: readonly Loom[],
): string {
  if (onLoomId !== null) {
    const loom = looms.find(({ id }) => id === onLoomId);
    return loom ? `on loom ${loom.number}` : 'on a loom';
  }
  return used ? 'was on a loom' : 'in store';
}
