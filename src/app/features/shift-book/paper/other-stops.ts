import { LIMITS } from '@shared/contract/limits';
import type { CauseVersion } from '@shared/contract/reference';
import { lower } from '../say';

/** A cause with the number it has on a blank log card: its place in the mill's list, from 1. */
export interface NumberedCause {
  readonly number: number;
  readonly cause: CauseVersion;
}

export interface OtherStops {
  /** Minutes by cause. */
  readonly minutes: Readonly<Record<string, number>>;
  /** Stops by cause, where a number of them was typed instead of minutes. */
  readonly counts: Readonly<Record<string, number>>;
  /** What was understood, in words: "gaiting 90 min, cut off 3 stops". */
  readonly words: string;
  /** Why something was not understood; empty: all of it was. */
  readonly problem: string;
}

const NOTHING: OtherStops = { minutes: {}, counts: {}, words: '', problem: '' };

/** One stop: a cause by number or by the beginning of its name, then minutes, or a number of stops with an x. */
const ONE =
  /^\s*(\d{1,3}|\p{L}[\p{L} ,’'()-]*?)\s*[\s*=:]\s*(\d{1,4}(?:[.,]\d)?)\s*(x|×|min)?\s*(?:[;/]\s*|\s+|$)/iu;

/**
 * Reads the card's other stops as they are typed: "21*90" or "gait 90" is 90 minutes of a cause, "cut 3x" is three
 * stops of one. Several follow each other, with a space, a semicolon or a stroke between: all of it is on the number pad.
 *
 * @param taken causes whose number has a column of its own
 */
export function otherStops(
  text: string,
  causes: readonly NumberedCause[],
  taken: ReadonlySet<string>,
): OtherStops {
  let rest = text.trim();
  if (rest === '') return NOTHING;
  const minutes: Record<string, number> = {};
  const counts: Record<string, number> = {};
  const words: string[] = [];
  while (rest !== '') {
    const found = ONE.exec(rest);
    if (!found) return { ...NOTHING, problem: `“${short(rest)}”: type the cause, then its minutes: 21*90` };
    const [all, name = '', amount = '', unit = ''] = found;
    const cause = causeNamed(name, causes);
    if (typeof cause === 'string') return { ...NOTHING, problem: cause };
    const number = Number(amount.replace(',', '.'));
    if (unit === 'x' || unit === '×' || unit === 'X') {
      if (!Number.isInteger(number) || number > LIMITS.count)
        return { ...NOTHING, problem: `${cause.name}: a number of stops is a whole one.` };
      if (taken.has(cause.causeId))
        return { ...NOTHING, problem: `${cause.name}: its number has a column of its own on this page.` };
      counts[cause.causeId] = (counts[cause.causeId] ?? 0) + number;
      words.push(`${lower(cause.name)} ${number} ${number === 1 ? 'stop' : 'stops'}`);
    } else {
      minutes[cause.causeId] = (minutes[cause.causeId] ?? 0) + number;
      words.push(`${lower(cause.name)} ${number} min`);
    }
    rest = rest.slice(all.length);
  }
  return { minutes, counts, words: words.join(', '), problem: '' };
}

/** What a card that is in the book says, as it would be typed. */
export function otherStopsText(
  minutes: Readonly<Record<string, number>>,
  counts: Readonly<Record<string, number>>,
  causes: readonly NumberedCause[],
  taken: ReadonlySet<string>,
): string {
  const number = (id: string) => causes.find(({ cause }) => cause.causeId === id)?.number;
  const said = (of: readonly (readonly [string, number])[], unit: string) =>
    of.flatMap(([id, amount]) => {
      const known = number(id);
      return known === undefined ? [] : [`${known}*${amount}${unit}`];
    });
  const others = Object.entries(counts).filter(([id]) => !taken.has(id));
  return [...said(Object.entries(minutes), ''), ...said(others, 'x')].join(' / ');
}

/** The cause, or a sentence that says why there is none. */
function causeNamed(said: string, causes: readonly NumberedCause[]): CauseVersion | string {
  if (/^\d+$/.test(said)) {
    const found = causes.find(({ number }) => number === Number(said));
    return found ? found.cause : `No cause has the number ${said}: they are listed below.`;
  }
  const start = said.trim().toLocaleLowerCase('en-GB');
  const named = causes.filter(({ cause }) => cause.name.toLocaleLowerCase('en-GB').startsWith(start));
  const exact = named.find(({ cause }) => cause.name.toLocaleLowerCase('en-GB') === start);
  const [first, second] = named;
  if (exact) return exact.cause;
  if (!first) return `No cause begins with “${short(said)}”: they are listed below.`;
  if (second) return `“${short(said)}” is ${first.cause.name} or ${second.cause.name}: type more of it.`;
  return first.cause;
}

const short = (text: string) => (text.length > 20 ? `${text.slice(0, 20)}…` : text);
