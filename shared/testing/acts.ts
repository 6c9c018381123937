import type { BookEntry, Entry } from '../entries/entry.js';
import { at, bookOf, entryBuilder, LOOM_ID, MINUTE } from './builders.js';

/** One thing that happened at a loom, minutes after the shift's start; several entries may say it. */
export type Act =
  | { is: 'tap'; minute: number; cause: string; count: number }
  | { is: 'timed'; minute: number; cause: string; lasts: number }
  | {
      is: 'standing';
      minute: number;
      cause: string;
      resumes: number[];
      call: number | null;
      arrive: number | null;
    }
  | { is: 'shed-stop'; minute: number; cause: string; lasts: number | null; resume: number | null }
  | { is: 'reading'; minute: number; boundary: 'start' | 'end' | 'change' | 'reset'; value: number }
  | { is: 'assign'; minute: number; weaver: string | null }
  | { is: 'count'; minute: number; cause: string; total: number }
  | { is: 'warp-change'; minute: number; cloth: string }
  | { is: 'sheet'; minute: number; end: number; minutes: number }
  | { is: 'decide'; minute: number; picks: number }
  | { is: 'amend'; minute: number; of: number; basedOn: number; cause: string; moves: number }
  | { is: 'void'; minute: number; of: number; basedOn: number };

/**
 * The entries that a list of acts makes, in the order of the acts. An amendment or void names the `of`-th entry
 * before it (counted round), and is based on the `basedOn`-th correction of it, if there is one.
 */
export function entriesOfActs(acts: readonly Act[], first = 1): BookEntry[] {
  const { entry } = entryBuilder(first);
  const entries: Entry[] = [];
  const log = (one: Entry) => {
    entries.push(one);
    return one.id;
  };
  for (const act of acts) {
    const m = act.minute;
    if (act.is === 'tap') log(entry('stop', m, { cause: act.cause, count: act.count }));
    if (act.is === 'timed')
      log(entry('stop', m, { cause: act.cause, count: 1, until: at(m) + act.lasts * MINUTE }));
    if (act.is === 'standing') {
      const stop = log(entry('standing', m, { cause: act.cause }));
      for (const after of act.resumes) log(entry('resume', m + after, { targetId: stop }));
      if (act.call === null) continue;
      const call = log(entry('call', m + act.call, { targetId: stop }));
      if (act.arrive === null) continue;
      log(entry('attend', m + act.arrive, { targetId: call, step: 'arrive' }));
      log(entry('repair', m + act.arrive + 1, { targetId: call, cause: 'picking' }));
    }
    if (act.is === 'shed-stop') {
      const until = act.lasts === null ? {} : { until: at(m + act.lasts) };
      const stop = log(entry('shed-stop', m, { cause: act.cause, scope: { of: 'shed' }, ...until }));
      if (act.resume !== null) log(entry('resume', m + act.resume, { targetId: stop }));
    }
    if (act.is === 'reading')
      log(entry('reading', m, { boundary: act.boundary, value: act.value, newValue: act.value % 1000 }));
    if (act.is === 'assign') log(entry('assign', m, { weaverId: act.weaver, loomIds: [LOOM_ID] }));
    if (act.is === 'count') log(entry('count', m, { cause: act.cause, total: act.total }));
    if (act.is === 'warp-change')
      log(entry('warp-change', m, { how: 'gaiting', warpId: `warp-${act.cloth}`, clothId: act.cloth }));
    if (act.is === 'sheet')
      log(entry('sheet', m, { end: act.end, counts: { smash: 1 }, minutes: { picking: act.minutes } }));
    if (act.is === 'decide') log(entry('decide', m, { about: { agreedPicks: act.picks } }));
    if (act.is === 'amend' || act.is === 'void') {
      const target = entries[entries.length - 1 - (act.of % Math.max(1, entries.length))];
      if (!target) continue;
      const known = entries.filter((one) => 'targetId' in one && one.targetId === target.id);
      const seen = known[act.basedOn];
      const basedOn = seen && (seen.kind === 'void' || seen.kind === 'amend') ? { basedOn: seen.id } : {};
      if (act.is === 'void') log(entry('void', m, { targetId: target.id, ...basedOn }));
      else
        log(
          entry('amend', m, {
            targetId: target.id,
            ...basedOn,
            change: { cause: act.cause, ...(act.moves === 0 ? {} : { at: target.at + act.moves * MINUTE }) },
          }),
        );
    }
  }
  return entries.map((one) => bookOf(one));
}
