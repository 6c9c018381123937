import type { BookEntry } from './entry.js';

/** Orders that do not depend on arrival: everything the projection sorts goes through one of these. */
export const byText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

/** By corrected moment, then device and its sequence, then id: who spoke last, for forks and repeated statements. */
export function byMoment(a: BookEntry, b: BookEntry): number {
  return (
    a.at - b.at ||
    byText(a.entry.deviceId, b.entry.deviceId) ||
    a.entry.deviceSeq - b.entry.deviceSeq ||
    byText(a.entry.id, b.entry.id)
  );
}

/** A record with its keys in order, so that equal records are equal bytes. */
export function sortedRecord<V>(pairs: Iterable<readonly [string, V]>): Record<string, V> {
  return Object.fromEntries([...pairs].sort(([a], [b]) => byText(a, b)));
}
