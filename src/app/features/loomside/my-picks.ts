import type { LoomLine } from '@shared/entries/loom-line';
import type { OwnEntry } from '../../offline/book-view';

/** The picks of one loom that its weaver is paid for, and what they said of them. */
export interface MyPicks {
  /** Null: not known (yet). */
  readonly picks: number | null;
  /** By a share of running time, or agreed: not read. */
  readonly estimated: boolean;
  readonly agreed: boolean;
  /** Whether there was time in which they could weave any: not where the end was read before they came. */
  readonly minded: boolean;
}

/** One weaver's picks of a line: those of the stretches in which they minded the loom. */
export function picksOf(line: LoomLine, weaverId: string): MyPicks {
  const mine = line.stretches.filter((stretch) => stretch.weaverId === weaverId);
  const readTill = line.readings.find(({ id }) => id === line.endReadingId)?.at ?? Infinity;
  const known = line.picks !== null && mine.every((stretch) => stretch.picks !== null);
  return {
    picks: known ? Math.round(mine.reduce((sum, stretch) => sum + (stretch.picks ?? 0), 0)) : null,
    estimated: mine.some((stretch) => stretch.picksBy === 'shared'),
    agreed: mine.some((stretch) => stretch.picksBy === 'agreed'),
    minded: mine.some((stretch) => Math.min(stretch.until, readTill) > stretch.from),
  };
}

/** The weaver's last word on a loom's picks in a shift. */
export interface PayWord {
  readonly word: 'confirmed' | 'queried';
  readonly picks: number;
  readonly words: string;
  readonly sent: boolean;
}

/** @param own one's own entries of the loom, newest first */
export function payWordOf(own: readonly OwnEntry[], shiftKey: string): PayWord | null {
  for (const { entry, voided, state } of own)
    if (entry.kind === 'pay-word' && entry.shiftKey === shiftKey && !voided && state !== 'refused')
      return {
        word: entry.word,
        picks: entry.picks,
        words: entry.words ?? '',
        sent: state === 'stored',
      };
  return null;
}
