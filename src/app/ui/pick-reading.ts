import { efficiency } from '@shared/figures/efficiency';
import { isNoFigure } from '@shared/figures/no-figure';
import { formatCount } from '@shared/figures/format';
import { isPlausible, picksBetween, type PickClock } from '@shared/figures/pick-clock';

/** What the pad knows of the loom whose clock is read. */
export interface ClockQuestion {
  /** Which reading of which loom: while it stays, so does what was typed, though time goes on. */
  readonly id: string;
  readonly clock: PickClock;
  /** Picks a minute; null: not known. */
  readonly ppm: number | null;
  /** The reading it is held against; null: none, any reading will do. */
  readonly previous: number | null;
  /** Minutes the loom could weave since then; null: nothing to hold the picks against. */
  readonly minutes: number | null;
}

export interface ReadingCheck {
  /** Picks and efficiency as far as they are plausible; null: there is nothing to say of them. */
  readonly picks: number | null;
  readonly efficiency: number | null;
  /** The question to ask; empty: nothing odd. */
  readonly question: string;
}

/** What a reading would mean, and whether this loom can have woven it. */
export function checkReading(about: ClockQuestion, value: number): ReadingCheck {
  const nothing: ReadingCheck = { picks: null, efficiency: null, question: '' };
  if (about.previous === null) return nothing;
  const picks = picksBetween(about.clock, about.previous, value);
  if (isNoFigure(picks)) return nothing;
  if (about.ppm === null || about.minutes === null) return { ...nothing, picks };
  const possible = about.ppm * about.minutes;
  const share = efficiency(picks, possible);
  const plausible = isPlausible({
    picks,
    ppm: about.ppm,
    minutes: about.minutes,
    unit: about.clock.unit,
  });
  if (plausible) return { picks, efficiency: isNoFigure(share) ? null : share, question: '' };
  // Read as a clock that rolled over, a lower reading says millions of picks: nobody could answer that.
  return value < about.previous
    ? {
        ...nothing,
        question: `Lower than the last reading (${formatCount(about.previous)}). Did the clock roll over, or was it set back? Read it again, or keep it.`,
      }
    : {
        ...nothing,
        question: `More than this loom can weave: ${formatCount(Math.floor(possible))} picks are possible, this reading says ${formatCount(picks)}.`,
      };
}

export interface TypedReading {
  readonly digits: string;
  /** Why something was not taken; empty: all of it was. */
  readonly complaint: string;
}

/** What was typed or pasted, as digits of this clock; with a sentence for what cannot be. */
export function typedReading(text: string, clock: Pick<PickClock, 'digits'>, before: string): TypedReading {
  const bare = text.replace(/[\s,.’']/g, '');
  if (bare === '') return { digits: '', complaint: '' };
  if (/^[-−]/.test(bare))
    return { digits: before, complaint: 'A pick clock shows no reading below nought. Type what it shows.' };
  if (!/^\d+$/.test(bare))
    return {
      digits: before,
      complaint: `“${text.trim().slice(0, 20)}” is not a reading: a pick clock shows digits alone.`,
    };
  const trimmed = bare.replace(/^0+(?=\d)/, '');
  if (trimmed.length > clock.digits)
    return { digits: before, complaint: `This clock has ${clock.digits} digits. Read it again.` };
  return { digits: trimmed, complaint: '' };
}
