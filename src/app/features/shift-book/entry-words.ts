import type { Boundary, Entry, EntryOf } from '@shared/entries/entry';
import { formatCount, formatMinutes } from '@shared/figures/format';
import { lower, type Say } from './say';

/** An entry as far as corrections have changed it, its moments set right. */
export interface Told {
  readonly entry: Entry;
  readonly at: number;
  readonly until: number | null;
}

export const BOUNDARY_WORDS: Readonly<Record<Boundary, string>> = {
  start: 'Start reading',
  end: 'End reading',
  change: 'Reading at a change',
  reset: 'Clock reset',
};

const STEP_WORDS: Readonly<Record<EntryOf<'attend'>['step'], string>> = {
  take: 'The tackler takes the call',
  arrive: 'The tackler is there',
  done: 'The tackler is done',
  leave: 'The tackler leaves the call',
};

const HOW_WORDS: Readonly<Record<EntryOf<'warp-change'>['how'], string>> = {
  gaiting: 'Warp gaited',
  knotting: 'Warp knotted',
  'as-found': 'On the loom as found',
};

const RAN_WORDS: Readonly<Record<NonNullable<EntryOf<'repair'>['ran']>, string>> = {
  well: 'ran well afterwards',
  watch: 'runs, to be watched',
  stands: 'still stood afterwards',
};

/** What an entry says, as a sentence without its time and author. */
export function entryWords({ entry, at, until }: Told, say: Say): string {
  switch (entry.kind) {
    case 'reading': {
      const value =
        entry.newValue === undefined
          ? formatCount(entry.value)
          : `${formatCount(entry.value)} → ${formatCount(entry.newValue)}`;
      return `${BOUNDARY_WORDS[entry.boundary]} ${value}${entry.kept ? ', asked about and kept' : ''}`;
    }
    case 'stop':
    case 'standing':
    case 'shed-stop':
      return stopWords({ entry, at, until }, say);
    case 'resume':
      return 'Runs again';
    case 'assign': {
      const looms = entry.loomIds.map(say.loom).join(', ');
      const which = entry.loomIds.length === 1 ? `loom ${looms}` : `looms ${looms}`;
      return entry.weaverId === null
        ? `Nobody minds ${which} from now on`
        : `${say.person(entry.weaverId)} minds ${which}`;
    }
    case 'count':
      return `${lowerCount(entry.total, say.cause(entry.cause, at))}, counted for the whole shift`;
    case 'pay-word': {
      const picks = `${formatCount(entry.picks)} picks for pay`;
      const words = entry.words ? `: “${entry.words}”` : '';
      return entry.word === 'confirmed' ? `Confirms ${picks}${words}` : `Queries ${picks}${words}`;
    }
    case 'call':
      return `Calls the tackler${entry.words ? `: “${entry.words}”` : ''}`;
    case 'attend':
      return STEP_WORDS[entry.step];
    case 'repair': {
      const found = entry.found ? `; found: “${entry.found}”` : '';
      const done = entry.done ? `; done: “${entry.done}”` : '';
      const part = entry.part ? `; part: ${entry.part}` : '';
      const ran = entry.ran ? `; ${RAN_WORDS[entry.ran]}` : '';
      const nearMiss = entry.nearMiss ? `; near miss: “${entry.nearMiss}”` : '';
      const photos = entry.photoIds?.length ? `; photos: ${entry.photoIds.length}` : '';
      return `Repair, ${lower(say.cause(entry.cause, at))}${found}${done}${part}${ran}${nearMiss}${photos}`;
    }
    case 'care':
      return `Done: ${lower(say.job(entry.jobId))}${entry.note ? `; “${entry.note}”` : ''}`;
    case 'warp-change': {
      const warp = entry.warpId === null ? '' : `, warp ${say.warp(entry.warpId)}`;
      const length = entry.lengthM === undefined ? '' : `, ${formatCount(Math.round(entry.lengthM))} m`;
      const size = entry.sizeSet ? `, size set ${entry.sizeSet}` : '';
      const lot = entry.weftLot ? `, weft lot ${entry.weftLot}` : '';
      const thrum = entry.thrumM === undefined ? '' : `; thrum of the old one ${entry.thrumM} m`;
      return `${HOW_WORDS[entry.how]}: ${say.cloth(entry.clothId)}${warp}${length}${size}${lot}${thrum}`;
    }
    case 'sheet':
      return `Paper card${entry.picks === undefined ? '' : `, ${formatCount(entry.picks)} picks`}`;
    case 'note':
      return noteWords(entry);
    case 'decide':
      return 'readingId' in entry.about
        ? `Decided which ${entry.about.boundary} reading holds: “${entry.reason}”`
        : `Picks agreed, ${formatCount(entry.about.agreedPicks)}: “${entry.reason}”`;
    case 'void':
      return 'Takes an entry back';
    case 'amend':
      return 'Corrects an entry';
    case 'close':
      return 'The shift is closed';
    case 'reopen':
      return `The shift is opened again: “${entry.reason}”`;
    case 'accept':
      return `Accepted: “${entry.reason}”`;
    case 'refuse':
      return `Refused: “${entry.reason}”`;
  }
}

function noteWords({ about, text }: EntryOf<'note'>): string {
  switch (about) {
    case 'watch':
      return `To watch: “${text}”`;
    case 'near-miss':
      return `Near miss: “${text}”`;
    case 'humidity':
      return `Humidity ${text}%`;
    case 'read':
      return 'Has read the handover note';
    case 'handover':
      return `Handover: “${text}”`;
    case undefined:
      return `Note: “${text}”`;
  }
}

function stopWords({ entry, at, until }: Told, say: Say): string {
  if (entry.kind !== 'stop' && entry.kind !== 'standing' && entry.kind !== 'shed-stop') return '';
  const name = say.cause(entry.cause, at);
  const counted = entry.kind === 'stop' ? lowerCount(entry.count, name) : name;
  const shed = entry.kind === 'shed-stop' ? ', a shed stop' : '';
  const times = until === null ? '' : `, until ${say.time(until)} (${minutes(at, until)})`;
  const stands = entry.kind === 'standing' && until === null ? ', stands from then' : '';
  const from =
    'arisesFrom' in entry && entry.arisesFrom && entry.arisesFrom !== 'unknown'
      ? `; arises from ${entry.arisesFrom}`
      : '';
  const note = 'note' in entry && entry.note ? `; “${entry.note}”` : '';
  return `${counted}${shed}${times}${stands}${from}${note}`;
}

function lowerCount(count: number, name: string): string {
  return count === 1 ? name : `${formatCount(count)} × ${lower(name)}`;
}

function minutes(from: number, until: number): string {
  return formatMinutes(Math.max(0, Math.round((until - from) / 60_000)));
}

/** One thing about an entry that a correction may change, in words. */
export interface ToldField {
  readonly label: string;
  readonly text: string;
}

/** What may be set side by side of an entry: label and words. */
export function fieldsOf({ entry, at, until }: Told, say: Say): readonly ToldField[] {
  const fields: ToldField[] = [{ label: 'Time', text: say.time(at) }];
  const add = (label: string, text: string | undefined) => {
    if (text !== undefined) fields.push({ label, text });
  };
  if (entry.kind === 'stop' || entry.kind === 'standing' || entry.kind === 'shed-stop')
    add('Until', until === null ? 'no time of its own' : say.time(until));
  if ('loomId' in entry && entry.loomId) add('Loom', say.loom(entry.loomId));
  if ('cause' in entry) add('Cause', say.cause(entry.cause, at));
  if (entry.kind === 'stop') add('Count', formatCount(entry.count));
  if (entry.kind === 'count') add('Total', formatCount(entry.total));
  if (entry.kind === 'reading') {
    add('Reading', formatCount(entry.value));
    if (entry.boundary === 'reset')
      add('New value', entry.newValue === undefined ? 'none' : formatCount(entry.newValue));
  }
  if (entry.kind === 'stop' || entry.kind === 'standing') {
    add('Arises from', entry.arisesFrom ?? 'unknown');
    add('Note', entry.note ?? 'none');
  }
  if (entry.kind === 'note') add('Note', entry.text);
  if (entry.kind === 'warp-change') {
    add('Cloth', say.cloth(entry.clothId));
    add('Warp', say.warp(entry.warpId));
  }
  return fields;
}

export interface Change {
  readonly label: string;
  readonly before: string;
  readonly after: string;
}

/** What differs between an entry before and after a correction. */
export function changesBetween(before: Told, after: Told, say: Say): Change[] {
  const then = new Map(fieldsOf(before, say).map((field) => [field.label, field.text]));
  return fieldsOf(after, say)
    .filter(({ label, text }) => then.get(label) !== text)
    .map(({ label, text }) => ({ label, before: then.get(label) ?? 'none', after: text }));
}
