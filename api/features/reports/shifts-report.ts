import type { EntityManager } from 'typeorm';
import type { ShiftList } from '../../../shared/contract/reports.js';
import type { ShiftRow } from '../../database/entities/index.js';
import { countInterval } from '../book/group-of-lines.js';
import { shiftOf } from '../book/which-shift.js';
import { COUNTED_SUMS, figuresOfSums, type CountedSums } from './counted-sums.js';
import { heldOf } from './held.js';
import type { Reports } from './report-reader.js';

/** A shed's shifts by date, each with its figures. */
export async function shiftsReport(
  from: EntityManager,
  { shedId, from: first, to }: Reports['shifts']['input'],
): Promise<ShiftList> {
  const shifts = await from.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "shedId" = ? AND "date" BETWEEN ? AND ? ORDER BY "startsAt"`,
    [shedId, first, to],
  );
  const sums = await from.query<(CountedSums & { shiftKey: string; flaggedLines: number })[]>(
    `SELECT "shiftKey", SUM("flagCount" > 0) AS "flaggedLines", ${COUNTED_SUMS} FROM "loom_line"
      WHERE "shedId" = ? AND "date" BETWEEN ? AND ? GROUP BY "shiftKey"`,
    [shedId, first, to],
  );
  const byShift = new Map(sums.map((row) => [row.shiftKey, row]));
  const held = await heldOf(
    from,
    shifts.map((shift) => shift.key),
  );
  return {
    shifts: shifts.map((row) => {
      const found = byShift.get(row.key);
      if (!found) return { shift: shiftOf(row), group: null, flaggedLines: 0, held: held.get(row.key) ?? 0 };
      const { shiftKey, flaggedLines, ...group } = found;
      return {
        shift: shiftOf(row),
        group: figuresOfSums(group, countInterval(1)),
        flaggedLines,
        held: held.get(shiftKey) ?? 0,
      };
    }),
  };
}
