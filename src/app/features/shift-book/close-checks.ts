import type { ShiftSheet } from '@shared/contract/reports';
import type { HeldEntries } from '@shared/contract/shift-records';
import type { LineFlagCode } from '@shared/entries/loom-line';
import { flagNeedsLook } from '@shared/entries/needs-look';
import { flagWords } from '../../ui/flag-words';

/** One thing to look at before a shift is closed. */
export interface CloseCheck {
  readonly what: 'held' | 'readings' | 'open-stops' | 'look' | 'runs';
  readonly heading: string;
  readonly words: string;
  /** The server would refuse to close with it. */
  readonly blocks: boolean;
  /** The loom lines it is about; none: the held entries. */
  readonly looms: readonly { readonly loomId: string; readonly loomNumber: number; readonly why: string }[];
}

const READINGS: ReadonlySet<LineFlagCode> = new Set([
  'no-start-reading',
  'no-end-reading',
  'readings-disagree',
]);
const OPEN: ReadonlySet<LineFlagCode> = new Set(['stop-still-open']);

/** What is left to look at, the gravest first. Empty: the shift is whole. */
export function closeChecks(
  sheet: Pick<ShiftSheet, 'shift' | 'asOf' | 'lines'>,
  held: Pick<HeldEntries, 'entries'>,
): readonly CloseCheck[] {
  const checks: CloseCheck[] = [];
  const undecided = held.entries.length;
  if (undecided > 0)
    checks.push({
      what: 'held',
      heading: undecided === 1 ? '1 entry is held' : `${undecided} entries are held`,
      words: 'Accept or refuse each, with a reason: until then the shift cannot be closed.',
      blocks: true,
      looms: [],
    });
  if (sheet.asOf < sheet.shift.endsAt)
    checks.push({
      what: 'runs',
      heading: 'The shift has not ended',
      words: 'What is logged after the closing is held until you decide.',
      blocks: false,
      looms: [],
    });
  checks.push(
    ...group(sheet, 'readings', (code) => READINGS.has(code), {
      one: '1 loom line lacks a reading that holds',
      many: (n) => `${n} loom lines lack a reading that holds`,
      words: 'Without it nobody knows the picks: the line is left out of the totals and is not paid.',
    }),
    ...group(sheet, 'open-stops', (code) => OPEN.has(code), {
      one: '1 loom has a stop that was never ended',
      many: (n) => `${n} looms have a stop that was never ended`,
      words: 'It counts to the end of the shift.',
    }),
    ...group(sheet, 'look', (code) => flagNeedsLook(code) && !READINGS.has(code) && !OPEN.has(code), {
      one: '1 loom line is odd',
      many: (n) => `${n} loom lines are odd`,
      words: 'They can be closed as they are; the flag stays with the line.',
    }),
  );
  return checks;
}

function group(
  { lines }: Pick<ShiftSheet, 'lines'>,
  what: CloseCheck['what'],
  is: (code: LineFlagCode) => boolean,
  say: { readonly one: string; readonly many: (n: number) => string; readonly words: string },
): CloseCheck[] {
  const looms = lines
    .map(({ line, loomNumber }) => ({
      loomId: line.loomId,
      loomNumber,
      why: [...new Set(line.flags.filter(({ code }) => is(code)).map(flagWords))].join(', '),
    }))
    .filter((one) => one.why !== '')
    .sort((a, b) => a.loomNumber - b.loomNumber);
  if (looms.length === 0) return [];
  const heading = looms.length === 1 ? say.one : say.many(looms.length);
  return [{ what, heading, words: say.words, blocks: false, looms }];
}
