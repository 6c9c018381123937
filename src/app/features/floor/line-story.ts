import type { Boundary } from '@shared/entries/entry';
import type { LineReading, LineStop, LoomLine } from '@shared/entries/loom-line';
import { PERN_CHANGE, WAIT_TACKLER } from '@shared/entries/phases';
import { formatCount, formatMinutes } from '@shared/figures/format';
import { flagsInWords, type SaidFlag } from '../../ui/flag-words';
import { markOf, type MarkKind } from '../../ui/mark-kind';

/** What happened on a loom, as a sentence with its time. */
export interface StoryItem {
  readonly id: string;
  readonly at: number;
  /** "09:54–10:12"; the mill's clock. */
  readonly time: string;
  readonly words: string;
  /** What it is made of: how long, by what. */
  readonly more: string;
  readonly mark: MarkKind;
  readonly open: boolean;
}

export interface StoryWords {
  readonly causeName: (cause: string, at: number) => string;
  readonly time: (at: number) => string;
}

/**
 * The stops of a line as sentences, the latest first. Pern changes tapped one by one are one sentence: at one every
 * few minutes they would hide the rest.
 *
 * @param at as of when: what began later is not told
 */
export function storyOf(line: LoomLine, at: number, say: StoryWords): StoryItem[] {
  const begun = line.stops.filter((stop) => stop.from <= at);
  const perns = begun.filter((stop) => stop.cause === PERN_CHANGE && !stop.timed);
  const rest = begun.filter((stop) => !perns.includes(stop)).map((stop) => itemOf(stop, at, say));
  const last = perns.at(-1);
  if (last) rest.push(pernsItem(perns, last, say));
  return rest.sort((a, b) => b.at - a.at || (a.id < b.id ? 1 : -1));
}

function itemOf(stop: LineStop, at: number, say: StoryWords): StoryItem {
  const name = say.causeName(stop.cause, stop.from);
  const open = stop.timed && (stop.until === null || stop.until > at);
  const until = open ? at : (stop.until ?? at);
  const length = formatMinutes(Math.round((until - stop.from) / 60_000));
  const times = stop.count > 1 ? `${formatCount(stop.count)} × ${lower(name)}` : name;
  return {
    id: stop.id,
    at: stop.from,
    time: !stop.timed
      ? say.time(stop.from)
      : open
        ? `since ${say.time(stop.from)}`
        : `${say.time(stop.from)}–${say.time(until)}`,
    words: stop.shedWide ? `${times}, a shed stop` : times,
    more: sentence([
      ...(stop.timed ? [open ? `stands for ${length}` : length] : [tapWords(stop)]),
      ...phaseWords(stop, at, say),
      ...(stop.note ? [`“${stop.note}”`] : []),
    ]),
    mark: markOf(stop.cause, stop.group),
    open,
  };
}

function tapWords(stop: LineStop): string {
  return stop.estimatedMs > 0
    ? `tapped, counted as ${formatMinutes(stop.estimatedMs / 60_000)} (estimated)`
    : 'tapped, no time of its own';
}

/** A stop that the tackler was called for: how long for him, how long by him. */
function phaseWords(stop: LineStop, at: number, say: StoryWords): string[] {
  if (stop.phases.length < 2) return [];
  return stop.phases
    .filter((phase) => phase.from <= at)
    .map((phase) => {
      const minutes = formatMinutes(Math.round((Math.min(phase.until ?? at, at) - phase.from) / 60_000));
      if (phase.cause === WAIT_TACKLER) return `${minutes} waiting for the tackler`;
      return `${minutes} ${lower(say.causeName(phase.cause, phase.from))}`;
    });
}

function pernsItem(perns: readonly LineStop[], last: LineStop, say: StoryWords): StoryItem {
  const count = perns.reduce((sum, stop) => sum + stop.count, 0);
  const minutes = perns.reduce((sum, stop) => sum + stop.estimatedMs, 0) / 60_000;
  return {
    id: last.id,
    at: last.from,
    time: say.time(last.from),
    words: count === 1 ? 'Pern change' : `${formatCount(count)} pern changes`,
    more: sentence([
      ...(count === 1 ? [] : ['the last of them then']),
      minutes > 0 ? `counted as ${formatMinutes(Math.round(minutes))} (estimated)` : 'no time of their own',
    ]),
    mark: 'pern',
    open: false,
  };
}

export interface ReadingItem {
  readonly id: string;
  readonly words: string;
  readonly time: string;
  readonly value: string;
}

const BOUNDARY_WORDS: Readonly<Record<Boundary, string>> = {
  start: 'At the start',
  end: 'At the end',
  change: 'At a change',
  reset: 'Clock reset',
};

export function readingsOf(line: LoomLine, say: Pick<StoryWords, 'time'>): ReadingItem[] {
  return line.readings.map((reading) => ({
    id: `${reading.id} ${reading.boundary}`,
    words: readingWords(reading),
    time: say.time(reading.at),
    value:
      reading.newValue === null
        ? formatCount(reading.value)
        : `${formatCount(reading.value)} → ${formatCount(reading.newValue)}`,
  }));
}

function readingWords(reading: LineReading): string {
  const words = BOUNDARY_WORDS[reading.boundary];
  const of = reading.from === 'neighbour' ? ', the next shift’s or the last one’s' : '';
  return `${words}${of}${reading.kept ? ', asked about and kept' : ''}`;
}

export function flagsOf(line: LoomLine, at: number): readonly SaidFlag[] {
  return flagsInWords(line.flags, at < line.shift.endsAt);
}

function lower(name: string): string {
  return name.charAt(0).toLocaleLowerCase('en-GB') + name.slice(1);
}

function sentence(parts: readonly string[]): string {
  const said = parts.filter((part) => part !== '').join('; ');
  return said === '' ? '' : said.charAt(0).toLocaleUpperCase('en-GB') + said.slice(1);
}
