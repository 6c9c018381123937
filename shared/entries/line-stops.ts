import { inForceAt, type CauseVersion, type Shift } from '../contract/reference.js';
import { isKind, type ResolvedEntry, type ResolvedOf } from './corrections.js';
import type { LineStop } from './loom-line.js';
import { byText } from './order.js';
import { callsByStop, phasesOf, PERN_CHANGE, WAIT_TACKLER, type CallRecord } from './phases.js';
import type { TimedStop } from './stands.js';

/** What a cause is in this line: by the version in force at the start of the stretch that a moment lies in. */
export type CauseInLine = Pick<CauseVersion, 'group' | 'attendedBy' | 'allowanceS' | 'breakOf'> & {
  readonly versionId: string | null;
};

/**
 * Looks causes up for a line and remembers which versions it used.
 *
 * @param stretchStartOf the start of the stretch in which a moment lies
 */
export function causeLookup(
  versions: readonly CauseVersion[],
  stretchStartOf: (at: number) => number,
): { readonly causeAt: (causeId: string, at: number) => CauseInLine; readonly used: ReadonlySet<string> } {
  const byCause = new Map<string, CauseVersion[]>();
  for (const version of versions) {
    const list = byCause.get(version.causeId);
    if (list) list.push(version);
    else byCause.set(version.causeId, [version]);
  }
  const used = new Set<string>();
  const causeAt = (causeId: string, at: number): CauseInLine => {
    const own = byCause.get(causeId) ?? [];
    // A cause that the mill made during the stretch has no version at its start: then the first it got.
    const version = inForceAt(own, stretchStartOf(at)) ?? inForceAt(own, at) ?? earliest(own);
    if (!version) return causeId === WAIT_TACKLER ? WAITING : UNKNOWN;
    used.add(version.id);
    const { group, attendedBy, allowanceS, breakOf } = version;
    return { group, attendedBy, allowanceS, breakOf, versionId: version.id };
  };
  return { causeAt, used };
}

const UNKNOWN: CauseInLine = {
  group: 'loom',
  attendedBy: 'nobody',
  allowanceS: null,
  breakOf: null,
  versionId: null,
};
const WAITING: CauseInLine = { ...UNKNOWN, group: 'waiting' };

function earliest(versions: readonly CauseVersion[]): CauseVersion | undefined {
  return [...versions].sort((a, b) => a.effectiveAt - b.effectiveAt || byText(a.id, b.id))[0];
}

export interface StopsInput {
  readonly shift: Shift;
  /** Voided ones left out. */
  readonly resolved: readonly ResolvedEntry[];
  /** Of this loom. */
  readonly timed: readonly TimedStop[];
  readonly loomId: string;
  causeAt(causeId: string, at: number): CauseInLine;
  /** Whether the loom changed its perns itself at a moment. */
  batteryAt(at: number): boolean;
}

/** The stops that touch a line: counted ones that fall in the shift, timed ones that began in it or reach into it. */
export function lineStops(input: StopsInput): LineStop[] {
  const { shift } = input;
  const calls = callsByStop(input.resolved);
  const inShift = (at: number) => at >= shift.startsAt && at < shift.endsAt;
  const reaches = ({ from, until }: TimedStop) =>
    inShift(from) || (from < shift.startsAt && (until === null || until > shift.startsAt));
  const timed = input.timed
    .filter(reaches)
    .map((one) => timedStop(input, one, calls.get(one.stop.root.entry.id) ?? [], inShift(one.from)));
  const counted = input.resolved
    .filter((one) => isKind(one, 'stop'))
    .filter((one) => one.until === null && one.entry.loomId === input.loomId && inShift(one.at))
    .map((one) => countedStop(input, one));
  return [...timed, ...counted].sort((a, b) => a.from - b.from || byText(a.id, b.id));
}

function timedStop(
  input: StopsInput,
  { stop, from, until }: TimedStop,
  calls: readonly CallRecord[],
  beganHere: boolean,
): LineStop {
  const { entry } = stop;
  const cause = input.causeAt(entry.cause, from);
  const ownLoom = entry.kind !== 'shed-stop';
  // Planned and shed stops take precedence over all: nobody is waited for while the loom was not to run.
  const phased = ownLoom && cause.group !== 'planned' && cause.group !== 'shed';
  const phases = phasesOf(
    { cause: entry.cause, from, until, waits: cause.group === 'waiting' },
    phased ? calls : [],
  );
  return {
    id: stop.root.entry.id,
    cause: entry.cause,
    group: cause.group,
    attendedBy: cause.attendedBy,
    arisesFrom: (ownLoom ? entry.arisesFrom : undefined) ?? 'unknown',
    breakOf: cause.breakOf,
    from,
    until,
    timed: true,
    count: beganHere ? (entry.kind === 'stop' ? entry.count : 1) : 0,
    estimatedMs: 0,
    phases: phases.map((phase) => ({
      cause: phase.cause,
      group: input.causeAt(phase.cause, phase.from).group,
      from: phase.from,
      until: phase.until,
    })),
    shedWide: !ownLoom,
    note: (ownLoom ? entry.note : undefined) ?? null,
  };
}

function countedStop(input: StopsInput, { root, entry, at }: ResolvedOf<'stop'>): LineStop {
  const cause = input.causeAt(entry.cause, at);
  const inside = input.timed.some((one) => one.from <= at && (one.until === null || at < one.until));
  return {
    id: root.entry.id,
    cause: entry.cause,
    group: cause.group,
    attendedBy: cause.attendedBy,
    arisesFrom: entry.arisesFrom ?? 'unknown',
    breakOf: cause.breakOf,
    from: at,
    until: at,
    timed: false,
    count: entry.count,
    estimatedMs: inside ? 0 : entry.count * allowanceMs(entry.cause, cause, input.batteryAt(at)),
    phases: [],
    shedWide: false,
    note: entry.note ?? null,
  };
}

/** A stop without duration costs its cause's allowance; on a battery loom an ordinary pern change costs no time. */
export function allowanceMs(causeId: string, cause: CauseInLine, battery: boolean): number {
  return causeId === PERN_CHANGE && battery ? 0 : (cause.allowanceS ?? 0) * 1000;
}
