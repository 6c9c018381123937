/**
 * Why a screen has no shed to show, for who reads it: a manager is not sent to the manager.
 *
 * @param sets whether the reader is one of those who set the mill up
 */
export function noShedWords(sets: boolean): string {
  return sets
    ? 'Set-up leads you from an empty mill to its first shift: a shed, its looms, shifts, cloths, people.'
    : 'The book has no shed that you may see. Ask the manager which shed is yours.';
}
