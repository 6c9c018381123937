/**
 * Why a screen has no shed to show, for who reads it: a manager is not sent to the manager.
 *
 * @param sets whether the reader is one of those who set the mill up
 */
export function noShedWords(sets: boolean): string {
  return sets
    ? 'The mill is set up, but it has no shed. This version has no screen to add sheds, looms, cloths and people yet; only the demo has them.'
    : 'The book has no shed that you may see. Ask the manager which shed is yours.';
}
