import type { Fitting } from '../contract/reference.js';
import { isKind, resolveCorrections, type ResolvedEntry } from './corrections.js';
import type { BookEntry } from './entry.js';
import { byText } from './order.js';

/**
 * What is on the looms, from the warp changes: a fitting holds from its moment until the loom's next one.
 * Sorted by loom, moment, id.
 */
export function resolveFittings(entries: readonly BookEntry[]): Fitting[] {
  return fittingsOf(resolveCorrections(entries));
}

/** The same from entries whose corrections are applied already. */
export function fittingsOf(resolved: readonly ResolvedEntry[]): Fitting[] {
  return resolved
    .filter((one) => isKind(one, 'warp-change'))
    .filter((one) => !one.voided)
    .map(({ root, entry, at }) => ({
      id: root.entry.id,
      loomId: entry.loomId,
      effectiveAt: at,
      warpId: entry.warpId,
      clothId: entry.clothId,
      how: entry.how,
    }))
    .sort((a, b) => byText(a.loomId, b.loomId) || a.effectiveAt - b.effectiveAt || byText(a.id, b.id));
}
