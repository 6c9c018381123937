import type { LoomVersion, Shift } from '../contract/reference.js';
import type { BookEntry } from '../entries/entry.js';
import type { LineFlagCode } from '../entries/loom-line.js';
import type { LineInput } from '../entries/projection-input.js';
import { projectLine } from '../entries/projection.js';
import { aLineInput, aLoomVersion, aShift, at, entryBuilder } from './builders.js';

/** The night shift before the builders' morning, and the late one after it: both adjoin. */
export const PREVIOUS = aShift({ patternId: 'night', date: '2026-05-31', startsAt: at(-480), endsAt: at(0) });
export const NEXT = aShift({ patternId: 'late', startsAt: at(480), endsAt: at(960) });
/** The builders' loom with another clock. */
export const clock = (changes: Partial<LoomVersion['clock']>) => [
  aLoomVersion({ clock: { kind: 'continuous', unit: 1, digits: 6, ...changes } }),
];

/** A line, and those of its flags that a spec asks about. */
export function lineOf(entries: readonly BookEntry[], changes: Partial<LineInput> = {}) {
  const line = projectLine(aLineInput({ entries, ...changes }));
  const flags = (...codes: LineFlagCode[]) => line.flags.filter((flag) => codes.includes(flag.code));
  return { line, flags };
}

/** Readings of one shift, minutes after the morning's start. */
export function readings(shift: Shift = aShift(), first = 1) {
  const { book } = entryBuilder(first, shift);
  const read = (
    minute: number,
    boundary: 'start' | 'end' | 'change' | 'reset',
    value: number,
    newValue?: number,
  ) => book('reading', minute, { boundary, value, ...(newValue === undefined ? {} : { newValue }) });
  return { book, read };
}
