import { groupFiguresOfLines } from './group-of-lines.js';
import type { ProjectedLine } from './line-store.js';

/** What of a shift was signed: the shed's figures and each loom's totals. */
export function signedTotals(lines: readonly ProjectedLine[]): string {
  return JSON.stringify({
    group: groupFiguresOfLines(lines),
    lines: lines.map(({ line, totals }) => ({ loomId: line.loomId, totals })),
  });
}
