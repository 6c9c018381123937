import type { Shift } from '../../../shared/contract/reference.js';
import type { EntryWeb } from './entry-store.js';
import type { LineStore } from './line-store.js';
import { signedTotals } from './signed-totals.js';
import type { Touch } from './touched-lines.js';

/**
 * Entries that reach into a closed shift (a resume after its end, a neighbour's reading) and would change what was
 * signed there. Those that leave the totals as they are need no decision.
 */
export async function closedLinesChangedBy(
  lines: LineStore,
  shift: Shift,
  touches: readonly Touch[],
  web: EntryWeb,
): Promise<Set<string>> {
  const changing = new Set<string>();
  if (touches.length === 0) return changing;
  const looms = [...new Set(touches.map((one) => one.loomId))];
  const source = await lines.gather(shift, looms, {
    mayLeaveOut: [...new Set(touches.map((one) => one.entryId))],
  });
  const seqOf = (entryId: string) => web.byId.get(entryId)?.seq ?? 0;
  for (const loomId of looms) {
    const ids = touches.filter((one) => one.loomId === loomId).map((one) => one.entryId);
    const leftOut = new Set(ids);
    const signed = signedTotals([source.project(loomId, leftOut)]);
    for (const id of ids.sort((a, b) => seqOf(a) - seqOf(b))) {
      leftOut.delete(id);
      if (signedTotals([source.project(loomId, leftOut)]) === signed) continue;
      changing.add(id);
      leftOut.add(id);
    }
  }
  return changing;
}
