import { isKind, type ResolvedEntry } from '@shared/entries/corrections';

/** A call for the tackler that is not done with. */
export interface OpenCall {
  readonly id: string;
  readonly at: number;
  /** The tackler's last word on it; null: nobody has it. */
  readonly step: 'take' | 'arrive' | null;
  readonly stepAt: number | null;
}

/**
 * The loom's latest call, unless it was taken back, the tackler is done with it, or the stop it is for has ended. One
 * that he left undone waits again, as its stop does.
 *
 * @param resolved the loom's effective entries, oldest first
 * @param standing ids of the stops that are still open
 */
export function openCallOf(
  resolved: readonly ResolvedEntry[],
  standing: ReadonlySet<string>,
): OpenCall | null {
  const call = resolved
    .filter((one) => isKind(one, 'call'))
    .filter((one) => !one.voided)
    .at(-1);
  if (!call) return null;
  const target = call.entry.targetId;
  if (target !== undefined && !standing.has(target)) return null;
  const id = call.root.entry.id;
  const last = resolved
    .filter((one) => isKind(one, 'attend'))
    .filter((one) => !one.voided && one.entry.targetId === id)
    .at(-1);
  const step = last?.entry.step ?? null;
  if (step === 'done') return null;
  return step === 'leave'
    ? { id, at: call.at, step: null, stepAt: null }
    : { id, at: call.at, step, stepAt: last?.at ?? null };
}
