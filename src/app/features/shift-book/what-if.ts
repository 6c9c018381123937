import type { Reference, Shift } from '@shared/contract/reference';
import type { LineSums, LoomRecord } from '@shared/contract/shift-records';
import { resolveCorrections } from '@shared/entries/corrections';
import type { BookEntry } from '@shared/entries/entry';
import { projectLine } from '@shared/entries/projection';
import { lineTotals } from '@shared/figures/loom-line';
import { countedEntries } from './loom-story';

export interface WhatIf {
  readonly before: LineSums;
  readonly after: LineSums;
}

/**
 * A line's sums with an entry as it would stand (or without it), beside those it has. Null where this device cannot
 * work out the line as the book has it: then nothing is said rather than something else.
 *
 * @param becomes null: it is taken back; with a new id: it is added
 */
export function whatIf(
  record: LoomRecord,
  targetId: string | null,
  becomes: BookEntry | null,
  { reference, shifts }: { readonly reference: Reference; readonly shifts: readonly Shift[] },
): WhatIf | null {
  const counted = countedEntries(record);
  const standing = resolveCorrections(counted)
    .filter((one) => !one.voided)
    .map((one): BookEntry => ({
      entry: one.entry,
      at: one.at,
      until: one.until,
      shiftKey: one.shiftKey,
    }));
  const { shift, line, loomId } = record;
  const project = (entries: readonly BookEntry[]) =>
    projectLine({
      shift,
      previous: shifts.find((one) => one.endsAt === shift.startsAt && one.shedId === shift.shedId) ?? null,
      next: shifts.find((one) => one.startsAt === shift.endsAt && one.shedId === shift.shedId) ?? null,
      loomId,
      looms: reference.looms,
      entries,
      loomVersions: reference.loomVersions,
      clothVersions: reference.clothVersions,
      causeVersions: reference.causeVersions,
      fittings: line.stretches.flatMap((one, index) =>
        one.clothId === null
          ? []
          : [
              {
                id: `stretch-${index}`,
                loomId,
                effectiveAt: one.from,
                warpId: one.warpId,
                clothId: one.clothId,
                how: 'as-found' as const,
              },
            ],
      ),
    });
  const sums = (entries: readonly BookEntry[]) => sumsOf(lineTotals(project(entries), record.asOf));
  const before = sums(counted);
  if (JSON.stringify(before) !== JSON.stringify(sumsOf(lineTotals(line, record.asOf)))) return null;
  const rest = standing.filter((one) => one.entry.id !== targetId);
  return { before, after: sums(becomes ? [...rest, becomes] : rest) };
}

function sumsOf(totals: LineSums): LineSums {
  const { picks, possiblePicks, measuredMinutes, estimatedMinutes, warpBreaks, weftBreaks, stops, perns } =
    totals;
  return { picks, possiblePicks, measuredMinutes, estimatedMinutes, warpBreaks, weftBreaks, stops, perns };
}
