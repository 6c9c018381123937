import type { Shift } from '@shared/contract/reference';
import { ARISES_FROM } from '@shared/contract/reference';
import { LIMITS } from '@shared/contract/limits';
import { applyAmendment } from '@shared/entries/amendments';
import type { Amendment, BookEntry, Entry, EntryKind } from '@shared/entries/entry';
import type { ResolvedEntry } from '@shared/entries/corrections';
import { changesBetween, type Change } from './entry-words';
import type { Say } from './say';
import { momentAfter, momentNear } from './times';

/** What a correction's form holds, as typed. */
export interface CorrectionValues {
  readonly at: string;
  readonly until: string;
  readonly loomId: string;
  readonly cause: string;
  readonly count: string;
  readonly value: string;
  readonly newValue: string;
  readonly arisesFrom: string;
  readonly clothId: string;
  readonly note: string;
}
export type CorrectionField = keyof CorrectionValues;

/** What of an entry can be corrected, by kind; for any other it can be taken back. */
const FIELDS: Readonly<Partial<Record<EntryKind, readonly CorrectionField[]>>> = {
  reading: ['value', 'at', 'loomId'],
  stop: ['cause', 'count', 'at', 'until', 'arisesFrom', 'loomId', 'note'],
  standing: ['cause', 'at', 'until', 'arisesFrom', 'loomId', 'note'],
  'shed-stop': ['cause', 'at', 'until'],
  resume: ['at'],
  count: ['count'],
  'warp-change': ['clothId', 'at', 'loomId'],
  note: ['note'],
};

export function correctionFields(entry: Entry): readonly CorrectionField[] {
  const fields = FIELDS[entry.kind] ?? [];
  return entry.kind === 'reading' && entry.boundary === 'reset' ? [...fields, 'newValue'] : fields;
}

/** The form as it opens: what the entry says now. */
export function valuesOf({ entry, at, until }: ResolvedEntry, say: Say): CorrectionValues {
  return {
    at: say.time(at),
    until: until === null ? '' : say.time(until),
    loomId: 'loomId' in entry ? (entry.loomId ?? '') : '',
    cause: 'cause' in entry ? entry.cause : '',
    count: entry.kind === 'stop' ? String(entry.count) : entry.kind === 'count' ? String(entry.total) : '',
    value: entry.kind === 'reading' ? String(entry.value) : '',
    newValue: entry.kind === 'reading' ? String(entry.newValue ?? '') : '',
    arisesFrom: 'arisesFrom' in entry ? (entry.arisesFrom ?? 'unknown') : 'unknown',
    clothId: entry.kind === 'warp-change' ? entry.clothId : '',
    note: entry.kind === 'note' ? entry.text : 'note' in entry ? (entry.note ?? '') : '',
  };
}

export interface Correction {
  /** Moments by the mill's clock; where the entry is made they become the device's. */
  readonly change: Amendment;
  readonly changes: readonly Change[];
  /** The entry as it would stand. */
  readonly amended: BookEntry;
  /** Why it cannot be saved so; empty: it can. */
  readonly problem: string;
}

/** What a form would change of an entry, before anything is saved. */
export function correctionOf(
  resolved: ResolvedEntry,
  values: CorrectionValues,
  { timeZone, say, shift }: { readonly timeZone: string; readonly say: Say; readonly shift: Shift },
): Correction {
  const before = valuesOf(resolved, say);
  const problems: string[] = [];
  const change: { -readonly [K in keyof Amendment]: Amendment[K] } = {};
  const changed = (field: CorrectionField) =>
    correctionFields(resolved.entry).includes(field) && values[field].trim() !== before[field].trim();
  const whole = (text: string, most: number, least = 0) => {
    const bare = text.replace(/[\s,]/g, '');
    const number = /^\d+$/.test(bare) ? Number(bare) : Number.NaN;
    return number >= least && number <= most ? number : null;
  };

  if (changed('cause')) change.cause = values.cause;
  if (changed('loomId')) change.loomId = values.loomId;
  if (changed('clothId')) change.clothId = values.clothId;
  if (changed('note')) change.note = values.note.trim();
  const from = ARISES_FROM.find((one) => one === values.arisesFrom);
  if (changed('arisesFrom') && from) change.arisesFrom = from;
  if (changed('count')) {
    const count = whole(values.count, LIMITS.count, resolved.entry.kind === 'stop' ? 1 : 0);
    if (count === null) problems.push('The count is a whole number.');
    else if (resolved.entry.kind === 'count') change.total = count;
    else change.count = count;
  }
  for (const field of ['value', 'newValue'] as const)
    if (changed(field)) {
      const value = whole(values[field], 10 ** LIMITS.clockDigits - 1);
      if (value === null) problems.push('A pick clock shows digits alone.');
      else change[field] = value;
    }
  let at = resolved.at;
  if (changed('at')) {
    const moment = momentNear(values.at, resolved.at, timeZone);
    if (moment === null) problems.push('Type the time as hours and minutes: 09:40.');
    else change.at = at = moment;
  }
  if (changed('until')) {
    const moment = values.until.trim() === '' ? null : momentAfter(values.until, at, timeZone);
    if (values.until.trim() !== '' && moment === null)
      problems.push('Type the time it ran again as hours and minutes: 09:52.');
    else if (moment !== null && moment - at > shift.endsAt - shift.startsAt)
      problems.push('It would stand for longer than the shift. The end lies before the beginning.');
    else change.until = moment;
  } else if (change.at !== undefined && resolved.until !== null && resolved.until < at)
    problems.push('The end lies before the beginning.');
  const amended = applied(resolved, change);
  return { change, changes: changesBetween(resolved, amended, say), amended, problem: problems[0] ?? '' };
}

/** The entry as it would stand, as the projection takes it. */
function applied(resolved: ResolvedEntry, change: Amendment): BookEntry {
  const { entry, at, until, shiftKey, root } = resolved;
  const { id, shedId, by, grantId, deviceId, deviceSeq, recordedAt, source, schema } = root.entry;
  const stamp = { id, shedId, by, grantId, deviceId, deviceSeq, recordedAt, source, schema };
  const amend = { ...stamp, at, kind: 'amend' as const, targetId: id, reason: '-', change };
  return applyAmendment(
    { entry, at, until, shiftKey },
    { entry: amend, at, until: change.until ?? null, changedAt: change.at ?? null, shiftKey },
  );
}
