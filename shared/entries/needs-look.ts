import type { LineFlagCode, LoomLine } from './loom-line.js';

/** Flags that only say how a line came about; every other one asks somebody to look before the shift is closed. */
const FOR_THE_RECORD: ReadonlySet<LineFlagCode> = new Set([
  'agreed-picks',
  'estimated-split',
  'stop-inside-stop',
  'woven-between-shifts',
]);

export function flagNeedsLook(code: LineFlagCode): boolean {
  return !FOR_THE_RECORD.has(code);
}

export function lineNeedsLook(line: Pick<LoomLine, 'flags'>): boolean {
  return line.flags.some((flag) => flagNeedsLook(flag.code));
}
