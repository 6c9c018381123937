import { LIMITS } from '@shared/contract/limits';
import type { Loom } from '@shared/contract/reference';
import { longMoment } from '../common/moments';

const MINUTE = 60_000;
const DAY = 86_400_000;
/** Looms that a sentence names one by one. */
const NAMED = 3;

type Placed = Pick<Loom, 'number' | 'from' | 'until'>;

/** The moment for one loom: whoever types the minute in which it came into the shed means its coming. */
export function momentOnLoom(at: number, { from }: Pick<Loom, 'from'>): number {
  return at < from && from - at < MINUTE ? from : at;
}

/**
 * Why the book would not take, or not by itself, that something was on these looms at a moment (ms since 1970); empty:
 * nothing is wrong. What it says is what would be right.
 */
export function onLoomTrouble(at: number, looms: readonly Placed[], now: number, timeZone: string): string {
  const when = (moment: number) => longMoment(moment, timeZone);
  if (at > now + LIMITS.futureTolerance)
    return 'That is still to come. Say since when it has been on the loom: now, or before.';
  if (at < now - LIMITS.oldestMoment)
    return `The book goes back ${LIMITS.oldestMoment / DAY} days: say ${when(now - LIMITS.oldestMoment + MINUTE)} or later.`;
  const later = looms.filter((loom) => momentOnLoom(at, loom) < loom.from);
  if (later.length > 0)
    return `${spans(later, (loom) => `from ${when(loom.from)}`)}. Say that moment or a later one.`;
  const gone = looms.filter(({ until }) => until !== null && at >= until);
  return gone.length > 0
    ? `${spans(gone, (loom) => `until ${when(loom.until ?? at)}`)}. Say a moment before.`
    : '';
}

/** "Loom 3 is in the shed from 1 Dec 2026, 06:00; loom 4 from …; and 9 more". */
function spans(looms: readonly Placed[], span: (loom: Placed) => string): string {
  const said = looms
    .slice(0, NAMED)
    .map((loom, index) =>
      index === 0 ? `Loom ${loom.number} is in the shed ${span(loom)}` : `loom ${loom.number} ${span(loom)}`,
    );
  const more = looms.length - NAMED;
  return [...said, ...(more > 0 ? [`${more} more are like that`] : [])].join('; ');
}
