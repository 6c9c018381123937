import type { LoomLine } from '@shared/entries/loom-line';
import { stoppedMeal, windowOf } from '@shared/figures/loom-line';
import { without, type Span } from '@shared/figures/standing-time';

const MINUTE = 60_000;

/** When about a loom stood that nobody logged: nobody remembers the minute. */
export type PartOfShift = 'early' | 'middle' | 'late';

export const PARTS: readonly { readonly part: PartOfShift; readonly words: string }[] = [
  { part: 'early', words: 'Early in the shift' },
  { part: 'middle', words: 'In the middle' },
  { part: 'late', words: 'Late' },
];

/**
 * A span for minutes that are explained afterwards: in the part of the shift that somebody remembers, and where no
 * timed stop stands already, since a loom stands once. The nearest gap that is long enough; where none is, the longest,
 * cut to its length. Null: there is none at all.
 *
 * @param minutes above 0
 * @param now corrected: nothing is said of what is to come
 */
export function spanFor(line: LoomLine, minutes: number, part: PartOfShift, now: number): Span | null {
  const window = windowOf(line);
  const { from } = window;
  const until = Math.max(from, Math.min(window.until, now));
  const timed = line.stops
    .filter((stop) => stop.timed && stop.from < until)
    .map((stop) => ({ from: stop.from, until: stop.until ?? until }));
  const gaps = [...timed, stoppedMeal(line.shift)].reduce<readonly Span[]>(
    (left, span) => without(left, span),
    [{ from, until }],
  );
  const wanted = Math.round(minutes * MINUTE);
  const share = part === 'early' ? 0 : part === 'middle' ? 0.5 : 1;
  const ideal = from + (until - from - wanted) * share;
  const fitted = gaps
    .filter((gap) => gap.until - gap.from >= wanted)
    .map((gap) => Math.min(Math.max(ideal, gap.from), gap.until - wanted))
    .sort((a, b) => Math.abs(a - ideal) - Math.abs(b - ideal))[0];
  if (fitted !== undefined) return { from: Math.round(fitted), until: Math.round(fitted) + wanted };
  return gaps.reduce<Span | null>(
    (best, gap) => (!best || gap.until - gap.from > best.until - best.from ? gap : best),
    null,
  );
}
