import type { LoomLine } from '@shared/entries/loom-line';
import { flagNeedsLook } from '@shared/entries/needs-look';
import { flagWords, flagsToShow } from '../../ui/flag-words';

type Flag = LoomLine['flags'][number];

/** What the foreman may do about a flag, on the line's page. */
export type RemedyAct =
  | { readonly do: 'add'; readonly what: 'start' | 'end' | 'stop' | 'picks' | 'weaver' | 'cloth' }
  | { readonly do: 'decide'; readonly boundary: 'start' | 'end' }
  | { readonly do: 'correct'; readonly entryId: string };

export interface Remedy {
  readonly flag: string;
  readonly look: boolean;
  readonly words: string;
  readonly acts: readonly { readonly label: string; readonly act: RemedyAct }[];
}

/** A line's flags, each with what can be done about it. */
export function remediesOf(line: LoomLine, runs: boolean): readonly Remedy[] {
  return flagsToShow(line.flags, runs).map((flag) => ({
    flag: flagWords(flag),
    look: flagNeedsLook(flag.code),
    ...remedyFor(flag, line),
  }));
}

const AGREE = { label: 'Agree the picks', act: { do: 'add', what: 'picks' } } as const;

function remedyFor(flag: Flag, line: LoomLine): Pick<Remedy, 'words' | 'acts'> {
  const correct = (label: string, entryId = flag.entryId) =>
    entryId === undefined ? [] : [{ label, act: { do: 'correct', entryId } as const }];
  switch (flag.code) {
    case 'no-start-reading':
      return {
        words: 'Type it from the card. If the clock was out of order, agree the picks.',
        acts: [{ label: 'Add the start reading', act: { do: 'add', what: 'start' } }, AGREE],
      };
    case 'no-end-reading':
      return {
        words: 'Type it from the card. If the clock was out of order, agree the picks.',
        acts: [{ label: 'Add the end reading', act: { do: 'add', what: 'end' } }, AGREE],
      };
    case 'readings-disagree':
      return {
        words: 'Two people read the same clock and do not agree. Decide which reading holds.',
        acts: [
          ...disputed(line).map((boundary) => ({
            label: `Decide the ${boundary} reading`,
            act: { do: 'decide', boundary } as const,
          })),
          AGREE,
        ],
      };
    case 'reading-off-boundary':
      return {
        words:
          'If it was read on time and typed late, correct its time. Else the picks are held against the time between the readings.',
        acts: [
          ...correct('Correct the start reading', line.startReadingId ?? undefined),
          ...correct('Correct the end reading', line.endReadingId ?? undefined),
        ],
      };
    case 'clock-changed':
      return {
        words: 'The readings are of two clocks. Correct the one that was mistyped, or agree the picks.',
        acts: [
          ...correct('Correct the start reading', line.startReadingId ?? undefined),
          ...correct('Correct the end reading', line.endReadingId ?? undefined),
          AGREE,
        ],
      };
    case 'more-than-possible':
      return {
        words: 'Look at both readings. If the clock was out of order, agree the picks.',
        acts: [
          ...correct('Correct the start reading', line.startReadingId ?? undefined),
          ...correct('Correct the end reading', line.endReadingId ?? undefined),
          AGREE,
        ],
      };
    case 'stop-still-open':
      return { words: 'Say when the loom ran again.', acts: correct('End this stop') };
    case 'stop-inside-stop':
      return {
        words: 'Both stand on record; the loom stood once. Correct one of them if it was logged twice.',
        acts: correct('Look at this stop'),
      };
    case 'time-uncertain':
      return {
        words: 'The tablet’s clock jumped. Ask, and set the time right.',
        acts: correct('Correct it'),
      };
    case 'corrected-twice':
      return {
        words:
          'Two people corrected it without seeing each other’s word. The later one holds; correct it once more to settle it.',
        acts: correct('Settle it'),
      };
    case 'clock-offset':
      return { words: 'The book set the times right. Have the tablet’s clock put right.', acts: [] };
    case 'over-logged':
      return {
        words: 'More standing time is logged than picks were lost. Look for a stop logged twice or too long.',
        acts: [],
      };
    case 'much-unaccounted':
      return {
        words: 'Picks were lost that no stop explains. Ask the weaver; add what was not logged.',
        acts: [{ label: 'Add a stop', act: { do: 'add', what: 'stop' } }],
      };
    case 'no-weaver':
      return {
        words: 'Say who minded the loom.',
        acts: [{ label: 'Say who minded it', act: { do: 'add', what: 'weaver' } }],
      };
    case 'no-cloth':
      return {
        words: 'Say what was on the loom.',
        acts: [{ label: 'Say which cloth', act: { do: 'add', what: 'cloth' } }],
      };
    case 'no-speed':
      return { words: 'Without a speed there is no efficiency. The manager sets it.', acts: [] };
    case 'agreed-picks':
      return { words: 'Paid, and left out of the statistics.', acts: [] };
    case 'woven-between-shifts':
      return { words: 'Nobody’s shift; they are shown, not hidden.', acts: [] };
    case 'estimated-split':
      return { words: 'No reading was taken at the change; the picks are shared by running time.', acts: [] };
  }
}

/** The boundaries at which readings disagree. */
function disputed(line: LoomLine): ('start' | 'end')[] {
  return (['start', 'end'] as const).filter((boundary) => {
    const values = line.readings.filter((one) => one.boundary === boundary).map((one) => one.value);
    const chosen = boundary === 'start' ? line.startReadingId : line.endReadingId;
    return new Set(values).size > 1 && chosen === null;
  });
}
