import type { GroupFigures } from '../entries/loom-line.js';

/**
 * What stands beside a group's figure where lines are left out of it: "from 5 of 24 looms". Empty: all count, or none.
 *
 * @param of what a line is here: in one shift a loom
 */
export function coverageWords(
  { lines, linesLeftOut }: Pick<GroupFigures, 'lines' | 'linesLeftOut'>,
  of: 'looms' | 'loom lines',
): string {
  return linesLeftOut === 0 || linesLeftOut >= lines ? '' : `from ${lines - linesLeftOut} of ${lines} ${of}`;
}
