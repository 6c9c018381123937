import type { Shift } from '../contract/reference.js';
import { isKind, type ResolvedEntry, type ResolvedOf } from './corrections.js';
import { allowanceMs, type CauseInLine } from './line-stops.js';
import type { LoomLine } from './loom-line.js';
import { byMoment, sortedRecord } from './order.js';

type Totalled = Pick<LoomLine, 'handOverCounts' | 'sheetMinutes' | 'totalledCauses'>;

/**
 * What is stated for the shift as a whole: counts at hand-over, and a paper sheet's counts and minutes by cause. A
 * hand-over count overrules a sheet's; of two for one cause the later said holds.
 *
 * @param resolved entries of this loom, voided ones left out
 */
export function lineCounts(
  resolved: readonly ResolvedEntry[],
  sheet: ResolvedOf<'sheet'> | null,
  shift: Shift,
  causeOf: (causeId: string) => CauseInLine,
  battery: boolean,
): Totalled {
  const counted = resolved
    .filter((one) => isKind(one, 'count'))
    .filter((one) => one.entry.shiftKey === shift.key)
    .sort((a, b) => a.at - b.at || byMoment(a.root, b.root));
  const counts = new Map(Object.entries(sheet?.entry.counts ?? {}));
  for (const { entry } of counted) counts.set(entry.cause, entry.total);
  const minutes = Object.entries(sheet?.entry.minutes ?? {});
  const causes = new Set([...counts.keys(), ...minutes.map(([cause]) => cause)]);
  return {
    handOverCounts: sortedRecord(counts),
    sheetMinutes: sortedRecord(minutes),
    totalledCauses: sortedRecord(
      [...causes].map((id) => {
        const cause = causeOf(id);
        const { group, breakOf, versionId } = cause;
        return [id, { group, breakOf, allowanceMs: allowanceMs(id, cause, battery), versionId }] as const;
      }),
    ),
  };
}
