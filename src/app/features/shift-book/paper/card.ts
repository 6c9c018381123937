import { LIMITS } from '@shared/contract/limits';
import type { PersonCard } from '@shared/contract/reference';
import type { EntryOf } from '@shared/entries/entry';
import { efficiency } from '@shared/figures/efficiency';
import { formatCount } from '@shared/figures/format';
import { isNoFigure } from '@shared/figures/no-figure';
import { isPlausible, type PickClock } from '@shared/figures/pick-clock';
import { checkReading, typedReading } from '../../../ui/pick-reading';
import { otherStops, otherStopsText, type NumberedCause } from './other-stops';

/** What a card gives, column by column, in the order in which it is typed. */
export const CARD_FIELDS = ['start', 'end', 'picks', 'warp', 'weft', 'perns', 'others', 'weaver'] as const;
export type CardField = (typeof CARD_FIELDS)[number];

/** A card as typed. `kept`: the person was asked about something unlikely and keeps it. */
export type CardText = Readonly<Record<CardField, string>> & { readonly kept: boolean };

export const EMPTY_CARD: CardText = {
  start: '',
  end: '',
  picks: '',
  warp: '',
  weft: '',
  perns: '',
  others: '',
  weaver: '',
  kept: false,
};

/** The causes with columns of their own. */
export const OWN_COLUMN = { warp: 'warp-break', weft: 'weft-break', perns: 'pern-change' } as const;
const COUNTED = ['warp', 'weft', 'perns'] as const;
export const TAKEN: ReadonlySet<string> = new Set(Object.values(OWN_COLUMN));

/** What a card is held against. */
export interface CardPlace {
  readonly loomId: string;
  readonly loomNumber: number;
  /** Null: this device knows no clock of the loom. */
  readonly clock: PickClock | null;
  readonly ppm: number | null;
  /** Minutes of the shift that the loom could weave. */
  readonly minutes: number;
  /** Readings of these boundaries that are in the book otherwise: the shift before's end, a tablet's. */
  readonly startInBook: number | null;
  readonly endInBook: number | null;
}

export interface CardAround {
  readonly causes: readonly NumberedCause[];
  readonly people: readonly PersonCard[];
}

/** What a card says, without its place. */
export type SheetSaid = Pick<EntryOf<'sheet'>, 'start' | 'end' | 'picks' | 'counts' | 'minutes' | 'weaverId'>;

export interface CardCheck {
  readonly blank: boolean;
  /** What cannot be, by column. */
  readonly problems: Readonly<Partial<Record<CardField, string>>>;
  /** What is asked before it is kept; empty: nothing. Put in only if `kept`. */
  readonly question: string;
  readonly picks: number | null;
  /** A share. */
  readonly efficiency: number | null;
  /** The other stops and the weaver, as understood. */
  readonly othersWords: string;
  readonly weaverName: string;
  /** What would be put in the book; null: it cannot be yet. */
  readonly said: SheetSaid | null;
}

/** A card as far as it is typed: what it would mean, what cannot be, what is asked about. */
export function checkCard(card: CardText, place: CardPlace, around: CardAround): CardCheck {
  const problems: Partial<Record<CardField, string>> = {};
  const start = reading(card.start, place, problems, 'start');
  const end = reading(card.end, place, problems, 'end');
  const picks = wholeNumber(card.picks, 999_999_999, problems, 'picks');
  const counts: Record<string, number> = {};
  for (const field of COUNTED) {
    const count = wholeNumber(card[field], LIMITS.count, problems, field);
    if (count !== null) counts[OWN_COLUMN[field]] = count;
  }
  const others = otherStops(card.others, around.causes, TAKEN);
  if (others.problem) problems.others = others.problem;
  const tooLong = Object.values(others.minutes).find((minutes) => minutes > place.minutes);
  if (tooLong !== undefined)
    problems.others = `${tooLong} min is longer than the shift’s ${Math.round(place.minutes)}.`;
  const weaver = personNamed(card.weaver, around.people);
  if (typeof weaver === 'string') problems.weaver = weaver;
  const woven = wovenBy(place, { start, end, picks });
  const blank = CARD_FIELDS.every((field) => card[field].trim() === '');
  const question = blank ? '' : woven.question;
  const clear = !blank && Object.keys(problems).length === 0 && (question === '' || card.kept);
  const weaverId = typeof weaver === 'string' ? null : (weaver?.id ?? null);
  return {
    blank,
    problems,
    question,
    picks: woven.picks,
    efficiency: woven.efficiency,
    othersWords: others.words,
    weaverName: typeof weaver === 'string' ? '' : (weaver?.name ?? ''),
    said: clear
      ? {
          ...(start !== null && { start }),
          ...(end !== null && { end }),
          ...(picks !== null && { picks }),
          counts: { ...others.counts, ...counts },
          minutes: { ...others.minutes },
          ...(weaverId !== null && { weaverId }),
        }
      : null,
  };
}

/** A card that is in the book, as it would be typed. */
export function cardText(said: SheetSaid, around: CardAround): CardText {
  const shown = (value: number | undefined) => (value === undefined ? '' : String(value));
  const person = around.people.find(({ id }) => id === said.weaverId);
  return {
    start: shown(said.start),
    end: shown(said.end),
    picks: shown(said.picks),
    warp: shown(said.counts[OWN_COLUMN.warp]),
    weft: shown(said.counts[OWN_COLUMN.weft]),
    perns: shown(said.counts[OWN_COLUMN.perns]),
    others: otherStopsText(said.minutes, said.counts, around.causes, TAKEN),
    weaver: person ? (person.worksNumber ?? person.shortName) : '',
    // What is in the book was asked about then.
    kept: true,
  };
}

/** What was typed and is not put in, by loom. */
export type TypedCards = Readonly<Record<string, CardText>>;

/**
 * With a change of one card over what was typed of it last. A quick hand is ahead of the page: what a row showed when
 * it was drawn may lack the cell before, so it holds only for a card that nothing was typed of.
 */
export function withTyped(
  typed: TypedCards,
  loomId: string,
  shown: CardText,
  change: Partial<CardText>,
): TypedCards {
  return { ...typed, [loomId]: { ...(typed[loomId] ?? shown), ...change } };
}

export function sameCard(a: CardText, b: CardText): boolean {
  return CARD_FIELDS.every((field) => a[field].trim() === b[field].trim());
}

type Problems = Partial<Record<CardField, string>>;

function reading(
  text: string,
  { clock }: CardPlace,
  problems: Problems,
  field: 'start' | 'end',
): number | null {
  if (text.trim() === '') return null;
  if (!clock) {
    problems[field] = 'This device does not know the loom’s pick clock yet: type picks instead.';
    return null;
  }
  const typed = typedReading(text, clock, '');
  if (typed.complaint) problems[field] = typed.complaint;
  return typed.digits === '' ? null : Number(typed.digits);
}

function wholeNumber(text: string, most: number, problems: Problems, field: CardField): number | null {
  const bare = text.trim().replace(/^(\d{1,3})((?:[, ]\d{3})+)$/, (all) => all.replace(/\D/g, ''));
  if (bare === '') return null;
  const number = Number(bare);
  if (/^\d+$/.test(bare) && number <= most) return number;
  problems[field] = `“${text.trim().slice(0, 20)}” is no whole number${number > most ? ' that can be' : ''}.`;
  return null;
}

/** Picks and efficiency, and what is odd about them. */
function wovenBy(
  place: CardPlace,
  { start, end, picks }: Readonly<Record<'start' | 'end' | 'picks', number | null>>,
): Pick<CardCheck, 'picks' | 'efficiency' | 'question'> {
  const nothing = { picks: null, efficiency: null, question: '' };
  const otherwise =
    inBookOtherwise('start', start, place.startInBook) || inBookOtherwise('end', end, place.endInBook);
  const from = start ?? place.startInBook ?? (place.clock?.kind === 'zeroed-each-shift' ? 0 : null);
  if (end !== null && from !== null && place.clock) {
    const { clock, ppm, minutes } = place;
    const check = checkReading({ id: place.loomId, clock, ppm, previous: from, minutes }, end);
    const apart = picks !== null && check.picks !== null && Math.abs(picks - check.picks) > clock.unit;
    return {
      picks: check.picks,
      efficiency: check.efficiency,
      question:
        check.question ||
        otherwise ||
        (apart
          ? `The readings say ${formatCount(check.picks ?? 0)} picks, the card ${formatCount(picks)}. The readings hold.`
          : ''),
    };
  }
  if (picks === null) return { ...nothing, question: otherwise };
  if (place.ppm === null) return { ...nothing, picks, question: otherwise };
  const possible = place.ppm * place.minutes;
  const unit = place.clock?.unit ?? 1;
  const plausible = isPlausible({ picks, ppm: place.ppm, minutes: place.minutes, unit });
  const share = efficiency(picks, possible);
  return {
    picks,
    efficiency: plausible && !isNoFigure(share) ? share : null,
    question: plausible
      ? otherwise
      : `More than this loom can weave: ${formatCount(Math.floor(possible))} picks are possible, the card says ${formatCount(picks)}.`,
  };
}

function inBookOtherwise(which: 'start' | 'end', typed: number | null, inBook: number | null): string {
  if (typed === null || inBook === null || typed === inBook) return '';
  return `The book has ${formatCount(inBook)} at the ${which}. If both are kept, you decide on the loom’s line which holds.`;
}

/** A weaver by works number or by the beginning of the name; null: none named; a sentence: nobody, or several. */
function personNamed(text: string, people: readonly PersonCard[]): PersonCard | string | null {
  const said = text.trim().toLocaleLowerCase('en-GB');
  if (said === '') return null;
  const byNumber = people.find(({ worksNumber }) => worksNumber === said);
  if (byNumber) return byNumber;
  const begins = (name: string) => name.toLocaleLowerCase('en-GB').startsWith(said);
  const named = people.filter(({ name, shortName }) => begins(name) || begins(shortName));
  const weavers = named.filter(({ roles }) => roles.includes('weaver'));
  const [first, second] = weavers.length > 0 ? weavers : named;
  if (!first) return `Nobody has the works number or name “${text.trim().slice(0, 20)}”.`;
  return second ? `${first.name} or ${second.name}? Type more of the name, or the works number.` : first;
}
