import type { Boundary } from '@shared/entries/entry';
import { isKind, type ResolvedEntry } from '@shared/entries/corrections';

export interface LastReading {
  readonly id: string;
  readonly at: number;
  readonly boundary: Boundary;
  readonly shiftKey: string;
  /** What the clock showed; after a reset: the new value. */
  readonly value: number;
}

/** The latest reading that holds. */
export function lastReadingOf(resolved: readonly ResolvedEntry[]): LastReading | null {
  const readings = resolved
    .filter((one) => isKind(one, 'reading'))
    .filter((one) => !one.voided)
    .sort((a, b) => a.at - b.at);
  const last = readings.at(-1);
  if (!last) return null;
  const { boundary, shiftKey, value, newValue } = last.entry;
  return { id: last.root.entry.id, at: last.at, boundary, shiftKey, value: newValue ?? value };
}
