import { isKind, type ResolvedEntry, type ResolvedOf } from '@shared/entries/corrections';

/** A call that is not done with, as the tackler sees it. */
export interface TacklerCall {
  readonly id: string;
  readonly at: number;
  readonly words: string;
  /** The stop it is for; null: the loom was not logged as standing. */
  readonly stopId: string | null;
  /** How far a tackler has come with it; null: nobody has it. */
  readonly step: 'take' | 'arrive' | null;
  readonly stepAt: number | null;
  readonly stepId: string | null;
  /** Who has it; null: nobody. "-": somebody whose name this device is not told. */
  readonly takenBy: string | null;
}

/** A call that somebody is done with (or whose loom runs again) and has written nothing about. */
export interface UnwrittenCall {
  readonly id: string;
  readonly at: number;
  /** Their last word on it. */
  readonly attendedAt: number;
  readonly stopId: string | null;
}

/**
 * The loom's calls that nobody is done with, oldest first: neither taken back nor done, and the stop that they are for
 * still open. One that was left undone waits again.
 *
 * @param resolved the loom's effective entries, oldest first
 * @param standing ids of the stops that are still open
 */
export function openCallsOf(
  resolved: readonly ResolvedEntry[],
  standing: ReadonlySet<string>,
): readonly TacklerCall[] {
  return callsOf(resolved).flatMap(({ call, steps }): TacklerCall[] => {
    const stopId = call.entry.targetId ?? null;
    if (stopId !== null && !standing.has(stopId)) return [];
    const last = steps.at(-1);
    if (last?.entry.step === 'done') return [];
    const step = last === undefined || last.entry.step === 'leave' ? null : last.entry.step;
    return [
      {
        id: call.root.entry.id,
        at: call.at,
        words: call.entry.words ?? '',
        stopId,
        step,
        stepAt: step === null ? null : (last?.at ?? null),
        stepId: step === null ? null : (last?.root.entry.id ?? null),
        takenBy: step === null ? null : (last?.root.entry.by ?? null),
      },
    ];
  });
}

/** Calls since a moment that a person was the last to attend to, is done with, and has logged no repair for. */
export function unwrittenCallsOf(
  resolved: readonly ResolvedEntry[],
  standing: ReadonlySet<string>,
  person: string,
  since: number,
): readonly UnwrittenCall[] {
  const written = new Set(
    resolved
      .filter((one) => isKind(one, 'repair'))
      .filter((one) => !one.voided)
      .map(({ entry }) => entry.targetId),
  );
  const open = new Set(openCallsOf(resolved, standing).map(({ id }) => id));
  return callsOf(resolved).flatMap(({ call, steps }): UnwrittenCall[] => {
    const { id } = call.root.entry;
    const last = steps.at(-1);
    if (!last || last.root.entry.by !== person || last.entry.step === 'leave' || last.at < since) return [];
    // Whoever took it and was never there has nothing to write.
    if (last.entry.step === 'take' || open.has(id) || written.has(id)) return [];
    return [{ id, at: call.at, attendedAt: last.at, stopId: call.entry.targetId ?? null }];
  });
}

interface CallWithSteps {
  readonly call: ResolvedOf<'call'>;
  readonly steps: readonly ResolvedOf<'attend'>[];
}

function callsOf(resolved: readonly ResolvedEntry[]): CallWithSteps[] {
  const counting = resolved.filter((one) => !one.voided);
  const attends = counting.filter((one) => isKind(one, 'attend'));
  return counting
    .filter((one) => isKind(one, 'call'))
    .map((call) => ({
      call,
      steps: attends.filter(({ entry }) => entry.targetId === call.root.entry.id),
    }));
}
