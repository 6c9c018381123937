import { isKind, type ResolvedEntry, type ResolvedOf } from './corrections.js';
import { byMoment, byText } from './order.js';

/** Causes that the phases of a stop, and the sums, know by name. */
export const WAIT_TACKLER = 'wait-tackler';
export const LOOM_OTHER = 'loom-other';
export const PERN_CHANGE = 'pern-change';

export interface PhaseInterval {
  readonly cause: string;
  readonly from: number;
  readonly until: number | null;
}

/** Calls for the loom's stops, with what came of each. */
export interface CallRecord {
  readonly call: ResolvedOf<'call'>;
  readonly steps: readonly ResolvedOf<'attend'>[];
  /** The cause that the tackler's repair names; null: none logged yet. */
  readonly repairCause: string | null;
}

/** The calls by the stop they are for. */
export function callsByStop(resolved: readonly ResolvedEntry[]): ReadonlyMap<string, readonly CallRecord[]> {
  const standing = resolved.filter((one) => !one.voided);
  const attends = standing.filter((one) => isKind(one, 'attend'));
  const repairs = standing.filter((one) => isKind(one, 'repair')).sort((a, b) => byMoment(a.root, b.root));
  const records = new Map<string, CallRecord[]>();
  for (const call of standing.filter((one) => isKind(one, 'call'))) {
    if (call.entry.targetId === undefined) continue;
    const { id } = call.root.entry;
    const repair = repairs.filter((one) => one.entry.targetId === id).at(-1);
    const record = {
      call,
      steps: attends.filter((one) => one.entry.targetId === id),
      repairCause: repair?.entry.cause ?? null,
    };
    records.set(call.entry.targetId, [...(records.get(call.entry.targetId) ?? []), record]);
  }
  return records;
}

/**
 * The phases of a timed stop: its own cause from its beginning until the tackler is called for, *waiting for
 * tackler* until he arrives (again, if he leaves), the tackler's cause until *Running*. The tackler's cause is his
 * repair's; as long as he has logged none, the stop's own, or "other loom fault" where that was a wait. Nothing
 * else moves a phase: a call taken or done is no change of the loom's.
 */
export function phasesOf(
  stop: {
    readonly cause: string;
    readonly from: number;
    readonly until: number | null;
    readonly waits: boolean;
  },
  calls: readonly CallRecord[],
): PhaseInterval[] {
  const marks = calls.flatMap(marksOf).sort((a, b) => a.at - b.at || a.rank - b.rank || byText(a.id, b.id));
  const starts = [{ cause: stop.cause, from: stop.from }];
  let present = false;
  for (const mark of marks) {
    if (mark.at >= (stop.until ?? Infinity)) break;
    if (mark.to === 'called' && present) continue;
    present = mark.to === 'arrived';
    const tacklers = mark.repairCause ?? (stop.waits ? LOOM_OTHER : stop.cause);
    starts.push({ cause: present ? tacklers : WAIT_TACKLER, from: Math.max(mark.at, stop.from) });
  }
  const lasting = starts.filter((one, i) => one.from !== starts[i + 1]?.from);
  const changes = lasting.filter((one, i) => one.cause !== lasting[i - 1]?.cause);
  return changes.map((one, i) => ({ ...one, until: changes[i + 1]?.from ?? stop.until }));
}

interface Mark {
  readonly at: number;
  readonly rank: number;
  readonly id: string;
  readonly to: 'called' | 'arrived' | 'left';
  readonly repairCause: string | null;
}

function marksOf({ call, steps, repairCause }: CallRecord): Mark[] {
  const marks: Mark[] = [{ at: call.at, rank: 0, id: call.root.entry.id, to: 'called', repairCause }];
  for (const step of steps) {
    if (step.entry.step !== 'arrive' && step.entry.step !== 'leave') continue;
    const to = step.entry.step === 'arrive' ? 'arrived' : 'left';
    // Nobody arrives before the call: clocks of two tablets may say so.
    marks.push({ at: Math.max(step.at, call.at), rank: 1, id: step.root.entry.id, to, repairCause });
  }
  return marks;
}
