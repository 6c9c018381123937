import { poissonInterval } from '@shared/chance/poisson-interval';
import type { Reference } from '@shared/contract/reference';
import type { LoomRecord, RecordedEntry } from '@shared/contract/shift-records';
import { shippedCauses } from '@shared/entries/causes';
import type { BookEntry } from '@shared/entries/entry';
import { projectLine } from '@shared/entries/projection';
import { lineFigures } from '@shared/figures/loom-line';
import { aLineInput, aLoomVersion, aShift, at, LOOM_ID, SHED_ID, WEAVER_ID } from '@shared/testing/builders';
import { sayBy, type Say } from '../say';

type Holds = RecordedEntry['holds'];

/** An entry as the server reports it: by the weaver at Alley A's tablet unless it is a foreman's kind. */
export function recorded(book: BookEntry, holds: Holds = []): RecordedEntry {
  const foremans = ['amend', 'void', 'decide', 'accept', 'refuse'].includes(book.entry.kind);
  return {
    entry: { ...book.entry },
    at: book.at,
    until: book.until,
    changedAt: book.changedAt ?? null,
    shiftKey: book.shiftKey,
    by: foremans ? 'Freda Boon' : 'Nuala Doran',
    device: foremans ? 'Office' : 'Alley A',
    receivedAt: book.at,
    holds,
  };
}

/** Held for the shift since it was closed before. */
export const HELD: Holds = [
  { shiftKey: aShift().key, reason: 'shift-closed', state: 'held', decidedBy: null },
];

/** A line's record as the server makes it, by the same arithmetic: an hour after the shift's end. */
export function aRecord(entries: readonly RecordedEntry[], books: readonly BookEntry[]): LoomRecord {
  const line = projectLine(aLineInput({ entries: books }));
  return {
    asOf: at(540),
    shift: line.shift,
    shedName: 'Long shed',
    loomId: LOOM_ID,
    loomNumber: 7,
    before: null,
    after: null,
    clothNames: ['Glebe 42'],
    weaverNames: ['Nuala Doran'],
    line,
    figures: lineFigures(line, at(540), (count) => poissonInterval(count)),
    entries: [...entries],
  };
}

export function aReference(): Reference {
  const input = aLineInput();
  return {
    mill: { name: 'A mill', timeZone: 'Europe/London', units: 'metric' },
    sheds: [{ id: SHED_ID, name: 'Long shed' }],
    looms: [
      {
        id: LOOM_ID,
        shedId: SHED_ID,
        number: 7,
        row: 1,
        position: 1,
        alley: 'A',
        from: at(-100_000),
        until: null,
      },
    ],
    loomVersions: [aLoomVersion()],
    cloths: [{ id: 'cloth-1', name: 'Glebe 42' }],
    clothVersions: [...input.clothVersions],
    warps: [],
    causeVersions: shippedCauses(at(-100_000)),
  };
}

export function aSay(): Say {
  return sayBy(aReference(), [
    {
      id: WEAVER_ID,
      worksNumber: '101',
      name: 'Nuala Doran',
      shortName: 'Nuala',
      roles: ['weaver'],
      usualSet: [],
    },
  ]);
}
