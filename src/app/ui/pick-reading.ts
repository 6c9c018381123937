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
  /** What was typed, where it is no reading; empty: the digits are all of it. It stays to be seen and mended. */
  readonly refused: string;
}

/** Thousands are set off by groups of three: a comma or a space. A point may be a decimal one, so it never is. */
const GROUPED = /^\d{1,3}([,\s'’])\d{3}(?:\1\d{3})*$/;

/** What was typed or pasted, as digits of this clock; with a sentence for what cannot be. Nothing in it is dropped. */
export function typedReading(text: string, clock: Pick<PickClock, 'digits'>, before: string): TypedReading {
  const said = text.trim();
  if (said === '') return { digits: '', complaint: '', refused: '' };
  const refuse = (complaint: string): TypedReading => ({ digits: '', complaint, refused: said });
  if (/^[-−]/.test(said)) return refuse('A pick clock shows no reading below nought. Type what it shows.');
  if (!/^\d+$/.test(said) && !GROUPED.test(said))
    return refuse(
      /^[\d.,\s'’]+$/.test(said)
        ? `“${said.slice(0, 20)}” is not a reading: a pick clock shows whole numbers. Type the digits alone.`
        : `“${said.slice(0, 20)}” is not a reading: a pick clock shows digits alone.`,
    );
  const trimmed = said.replace(/\D/g, '').replace(/^0+(?=\d)/, '');
  if (trimmed.length > clock.digits)
    return {
      digits: before,
      complaint: `This clock has ${clock.digits} digits. Read it again.`,
      refused: '',
    };
  return { digits: trimmed, complaint: '', refused: '' };
}

/**
 * The field's text after an edit of what it showed. Digits put between or taken from shown groups leave groups of
 * another size behind; those commas are the field's own and mean nothing.
 */
export function editedText(shown: string, text: string): string {
  let start = 0;
  while (start < Math.min(shown.length, text.length) && shown[start] === text[start]) start++;
  let end = 0;
  while (end < Math.min(shown.length, text.length) - start && shown.at(-1 - end) === text.at(-1 - end)) end++;
  const put = text.slice(start, text.length - end);
  return /^\d*$/.test(put) ? text.replaceAll(',', '') : text;
}
