import type { Loom, Shift } from '@shared/contract/reference';
import type { ResolvedOf } from '@shared/entries/corrections';
import type { LoomLine } from '@shared/entries/loom-line';
import { lower, type Say } from '../say';
import type { ShiftEvents } from '../../../offline/shed-book';

/** Something said about a loom at hand-over. */
export interface LoomWord {
  readonly key: string;
  readonly loomId: string;
  readonly loomNumber: number;
  readonly words: string;
}

/** The foreman's words, and who of the next shift has read them. */
export interface HandoverNote {
  readonly id: string;
  readonly words: string;
  readonly by: string;
  readonly at: number;
  readonly readBy: readonly { readonly by: string; readonly at: number }[];
}

export interface Handover {
  readonly watch: readonly LoomWord[];
  readonly nearMisses: readonly { readonly key: string; readonly words: string }[];
  /** The last humidity that was noted, %; null: none. */
  readonly humidity: { readonly text: string; readonly at: number } | null;
  /** The last one counts; null: none was written. */
  readonly note: HandoverNote | null;
}

/** What the next foreman is told of a shift, from what was logged in it and what its foreman added. */
export function handoverOf(
  { notes, repairs }: ShiftEvents,
  lines: readonly LoomLine[],
  looms: readonly Loom[],
  say: Say,
): Handover {
  const number = (loomId: string) => looms.find(({ id }) => id === loomId)?.number ?? 0;
  const word = (key: string, loomId: string, words: string): LoomWord => ({
    key,
    loomId,
    loomNumber: number(loomId),
    words,
  });
  const about = (what: ResolvedOf<'note'>['entry']['about']) =>
    notes.filter(({ entry }) => entry.about === what);
  const standing = lines.flatMap((line) => {
    const open = line.stops
      .filter((stop) => stop.timed && stop.until === null && stop.group !== 'planned')
      .at(-1);
    return open
      ? [
          word(
            `s${open.id}`,
            line.loomId,
            `stands since ${say.time(open.from)}, ${lower(say.cause(open.cause, open.from))}`,
          ),
        ]
      : [];
  });
  const watched = repairs
    .filter(({ entry }) => entry.ran === 'watch' || entry.ran === 'stands')
    .map(({ root, entry, at }) =>
      word(
        root.entry.id,
        entry.loomId,
        `repaired ${say.time(at)}, ${lower(say.cause(entry.cause, at))}: ${entry.ran === 'watch' ? 'runs, to be watched' : 'still stood afterwards'}`,
      ),
    );
  const said = about('watch').map(({ root, entry }) => word(root.entry.id, entry.loomId ?? '', entry.text));
  const flew = repairs.flatMap(({ root, entry }) =>
    entry.nearMiss ? [{ key: root.entry.id, words: `Loom ${number(entry.loomId)}: ${entry.nearMiss}` }] : [],
  );
  const missed = about('near-miss').map(({ root, entry }) => ({ key: root.entry.id, words: entry.text }));
  const humidity = about('humidity').at(-1);
  const note = about('handover').at(-1);
  return {
    watch: [...standing, ...watched, ...said].sort((a, b) => a.loomNumber - b.loomNumber),
    nearMisses: [...flew, ...missed],
    humidity: humidity ? { text: humidity.entry.text, at: humidity.at } : null,
    note: note
      ? {
          id: note.root.entry.id,
          words: note.entry.text,
          by: note.entry.by,
          at: note.at,
          readBy: about('read')
            .filter(({ entry }) => entry.noteId === note.root.entry.id)
            .map(({ entry, at }) => ({ by: entry.by, at })),
        }
      : null,
  };
}

/** The shift whose handover a shift's foreman reads: the one that ended last before it. */
export function shiftBefore(shifts: readonly Shift[], shift: Shift): Shift | null {
  return (
    shifts
      .filter((one) => one.shedId === shift.shedId && one.endsAt <= shift.startsAt)
      .sort((a, b) => a.endsAt - b.endsAt)
      .at(-1) ?? null
  );
}
