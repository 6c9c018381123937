import type { ChangedLine, LineSums } from '../../../shared/contract/shift-records.js';
import type { LineTotals } from '../../../shared/entries/loom-line.js';
import type { MillFacts } from '../book/mill-facts.js';

/** A line whose sums differ, with both; nothing where they are the same. */
export function changedLine(
  facts: MillFacts,
  loomId: string,
  before: LineTotals,
  after: LineTotals,
): ChangedLine[] {
  const sums = { before: sumsOf(before), after: sumsOf(after) };
  if (JSON.stringify(sums.before) === JSON.stringify(sums.after)) return [];
  return [{ loomId, loomNumber: facts.looms.get(loomId)?.number ?? 0, ...sums }];
}

function sumsOf(totals: LineTotals): LineSums {
  const { picks, possiblePicks, measuredMinutes, estimatedMinutes, warpBreaks, weftBreaks, stops, perns } =
    totals;
  return { picks, possiblePicks, measuredMinutes, estimatedMinutes, warpBreaks, weftBreaks, stops, perns };
}
