import type { ErrorCode } from '../../../shared/contract/errors.js';
import { LIMITS } from '../../../shared/contract/limits.js';
import { inForceAt, type Loom, type Shift } from '../../../shared/contract/reference.js';
import { loomsNamedBy, type BookEntry, type Entry } from '../../../shared/entries/entry.js';
import type { MillFacts } from './mill-facts.js';

export interface CheckedEntry {
  readonly entry: Entry;
  readonly at: number;
  readonly until: number | null;
  readonly changedAt: number | null;
  /** The shift it names, as the book has or once had it; null: it never had; undefined: the entry names none. */
  readonly namedShift: Pick<Shift, 'shedId'> | null | undefined;
  /** What it corrects, ends or attends to; null: not in the book (yet). */
  readonly target: BookEntry | null;
}

export interface CheckFacts {
  readonly mill: MillFacts;
  readonly people: ReadonlySet<string>;
  readonly tabletShedId: string | null;
}

export interface Refusal {
  readonly code: ErrorCode;
  readonly detail?: string;
}

type Check = (one: CheckedEntry, facts: CheckFacts) => Refusal | null;

/** Whether an entry can be true of this mill: the first thing that is wrong with it, or null. */
export function refusalOf(one: CheckedEntry, facts: CheckFacts): Refusal | null {
  for (const check of CHECKS) {
    const refusal = check(one, facts);
    if (refusal) return refusal;
  }
  return null;
}

const CHECKS: readonly Check[] = [
  shedFits,
  loomsKnown,
  shiftKnown,
  causesKnown,
  peopleKnown,
  clothAndWarpKnown,
  endAfterStart,
  readingPossible,
  targetFits,
];

function shedFits({ entry }: CheckedEntry, { tabletShedId }: CheckFacts): Refusal | null {
  return tabletShedId !== null && entry.shedId !== tabletShedId ? { code: 'entry-other-shed' } : null;
}

function loomsKnown({ entry, at }: CheckedEntry, { mill }: CheckFacts): Refusal | null {
  const named = entry.kind === 'shed-stop' && entry.scope.of !== 'looms' ? [] : loomsNamedBy(entry, []);
  const amended = entry.kind === 'amend' ? entry.change.loomId : undefined;
  for (const loomId of amended === undefined ? named : [...named, amended]) {
    const loom: Loom | undefined = mill.looms.get(loomId);
    if (!loom) return { code: 'loom-unknown', detail: loomId };
    if (loom.shedId !== entry.shedId) return { code: 'entry-other-shed', detail: loomId };
    // A correction is made today of what may have been long ago: its own moment says nothing of the loom.
    if (entry.kind === 'amend') continue;
    if (at < loom.from || at >= (loom.until ?? Infinity)) return { code: 'loom-not-yet', detail: loomId };
  }
  return null;
}

function shiftKnown({ entry, namedShift }: CheckedEntry): Refusal | null {
  if (namedShift === undefined) return null;
  if (namedShift === null) return { code: 'shift-unknown' };
  return namedShift.shedId === entry.shedId ? null : { code: 'entry-other-shed' };
}

function causesKnown({ entry }: CheckedEntry, { mill }: CheckFacts): Refusal | null {
  const unknown = causesOf(entry).find((cause) => !mill.causes.has(cause));
  return unknown === undefined ? null : { code: 'cause-unknown', detail: unknown };
}

function causesOf(entry: Entry): string[] {
  if (entry.kind === 'amend') return entry.change.cause === undefined ? [] : [entry.change.cause];
  if (entry.kind === 'sheet') return [...Object.keys(entry.counts), ...Object.keys(entry.minutes)];
  return 'cause' in entry ? [entry.cause] : [];
}

function peopleKnown({ entry }: CheckedEntry, { people }: CheckFacts): Refusal | null {
  const weaverId = entry.kind === 'assign' || entry.kind === 'sheet' ? entry.weaverId : null;
  return weaverId === null || weaverId === undefined || people.has(weaverId)
    ? null
    : { code: 'person-unknown', detail: weaverId };
}

function clothAndWarpKnown({ entry }: CheckedEntry, { mill }: CheckFacts): Refusal | null {
  const said = entry.kind === 'warp-change' ? entry : entry.kind === 'amend' ? entry.change : null;
  if (said?.clothId !== undefined && !mill.cloths.has(said.clothId))
    return { code: 'entry-malformed', detail: `clothId: the book has no cloth ${said.clothId}` };
  if (said?.warpId !== undefined && said.warpId !== null && !mill.warps.has(said.warpId))
    return { code: 'entry-malformed', detail: `warpId: the book has no warp ${said.warpId}` };
  return null;
}

function endAfterStart({ entry, at, until, changedAt, target }: CheckedEntry): Refusal | null {
  const wrong: Refusal = { code: 'end-before-start' };
  if (entry.kind === 'amend')
    return until !== null && until < (changedAt ?? target?.at ?? until) ? wrong : null;
  if (entry.kind === 'resume')
    return target && at < target.at && !clocksDisagree(entry, target) ? wrong : null;
  return until !== null && until < at ? wrong : null;
}

/**
 * Whether it is the clocks, not the person, that put a resume before its stop: it was tapped as it happened, or its
 * tablet's clock was set back between the two. Such a resume waits for the foreman; it is not refused.
 */
function clocksDisagree(resume: Entry, { entry: stop }: BookEntry): boolean {
  const asItHappened = resume.at >= resume.recordedAt - LIMITS.clockOffsetShown;
  const setBack =
    resume.deviceId === stop.deviceId &&
    resume.deviceSeq > stop.deviceSeq &&
    resume.recordedAt < stop.recordedAt;
  return asItHappened || setBack;
}

/** Whether a resume that was not refused lies before its stop. */
export function endsBeforeItsStop(
  { entry, at }: Pick<CheckedEntry, 'entry' | 'at'>,
  target: BookEntry | null,
) {
  return entry.kind === 'resume' && target !== null && at < target.at;
}

function readingPossible({ entry, at, target }: CheckedEntry, { mill }: CheckFacts): Refusal | null {
  const values =
    entry.kind === 'reading'
      ? [entry.value, entry.newValue]
      : entry.kind === 'sheet'
        ? [entry.start, entry.end]
        : entry.kind === 'amend'
          ? [entry.change.value, entry.change.newValue]
          : [];
  const shown = values.filter((value) => value !== undefined);
  if (shown.length === 0) return null;
  const about = entry.kind === 'amend' ? target?.entry : entry;
  const loomId =
    entry.kind === 'amend' && entry.change.loomId !== undefined
      ? entry.change.loomId
      : about && 'loomId' in about
        ? about.loomId
        : undefined;
  const versions = mill.loomVersions.filter((version) => version.loomId === loomId);
  const first = versions.reduce<(typeof versions)[number] | undefined>(
    (a, b) => (a && a.effectiveAt <= b.effectiveAt ? a : b),
    undefined,
  );
  const clock = (inForceAt(versions, target?.at ?? at) ?? first)?.clock;
  if (!clock) return null;
  const tooLarge = shown.find((value) => value >= 10 ** clock.digits);
  return tooLarge === undefined
    ? null
    : { code: 'reading-impossible', detail: `${tooLarge} on a clock of ${clock.digits} digits` };
}

/** What a correction, a resume or a decision names must be something that it can be about. */
function targetFits({ entry, target }: CheckedEntry): Refusal | null {
  if (entry.kind === 'void' && entry.targetId === undefined && entry.targetBatchId === undefined)
    return { code: 'entry-malformed', detail: 'targetId: a void names an entry or a batch' };
  if (!target) return null;
  if (target.entry.shedId !== entry.shedId) return { code: 'entry-other-shed' };
  const { kind } = target.entry;
  const wrong: Refusal = {
    code: 'entry-malformed',
    detail: `targetId: a ${entry.kind} cannot be of a ${kind}`,
  };
  switch (entry.kind) {
    case 'resume':
      return ['stop', 'standing', 'shed-stop'].includes(kind) ? null : wrong;
    case 'attend':
      return kind === 'call' ? null : wrong;
    case 'void':
    case 'amend':
      // What a foreman decided is undone by its opposite, not by a correction.
      return ['close', 'reopen', 'accept', 'refuse'].includes(kind) ? wrong : null;
    default:
      return null;
  }
}
