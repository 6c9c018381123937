import type { SyncState } from '../offline/sync-state';
import { dateOf, formatDate, formatMoment, formatTime } from '../core/dates';

export interface SyncWords {
  /** What matters most: "7 waiting". */
  readonly first: string;
  /** The rest: "book last reached 09:41". */
  readonly rest: string;
  /** The rest where there is little room: "14:02", "11 May". Empty: it has to go without. */
  readonly short: string;
  readonly tone: 'calm' | 'look' | 'now';
}

/**
 * The header's words: saved here → waiting → sent → in the book, or needs a look. Never "sent" when it is only saved,
 * never "in the book" when something waits.
 *
 * @param now device's clock, ms since 1970, as `lastReachedAt`
 */
export function syncWords(state: SyncState, now: number): SyncWords {
  const reached =
    state.lastReachedAt === null
      ? 'book not reached yet'
      : `book last reached ${formatMoment(state.lastReachedAt, now)}`;
  switch (state.kind) {
    case 'in-book':
      return {
        first: 'In the book',
        rest: state.lastReachedAt === null ? '' : formatMoment(state.lastReachedAt, now),
        short: '',
        tone: 'calm',
      };
    case 'sending':
      return { first: `Sending ${state.waiting}`, rest: '', short: '', tone: 'calm' };
    case 'waiting':
      return state.waiting === 0
        ? { first: 'Book not reached yet', rest: '', short: '', tone: 'calm' }
        : {
            first: `${state.waiting} waiting`,
            rest: reached,
            short: shortly(state.lastReachedAt, now),
            tone: 'look',
          };
    case 'offline':
      return state.waiting === 0
        ? { first: 'Book out of reach', rest: sinceWords(state.lastReachedAt, now), short: '', tone: 'look' }
        : {
            first: `${state.waiting} waiting`,
            rest: reached,
            short: shortly(state.lastReachedAt, now),
            tone: 'look',
          };
    case 'needs-look':
      return {
        first: state.needsLook === 1 ? '1 needs a look' : `${state.needsLook} need a look`,
        rest: state.waiting > 0 ? `${state.waiting} waiting` : state.online ? '' : reached,
        short: state.waiting > 0 || state.online ? '' : shortly(state.lastReachedAt, now),
        tone: 'now',
      };
  }
}

function shortly(at: number | null, now: number): string {
  if (at === null) return '';
  return dateOf(at) === dateOf(now) ? formatTime(at) : formatDate(dateOf(at));
}

function sinceWords(at: number | null, now: number): string {
  return at === null ? 'not reached yet' : `since ${formatMoment(at, now)}`;
}
