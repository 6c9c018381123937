import type { CauseVersion, Loom } from '@shared/contract/reference';
import type { BookEntry } from '@shared/entries/entry';
import { projectLine } from '@shared/entries/projection';
import { aLineInput, at, LOOM_ID, SHED_ID, someCauses } from '@shared/testing/builders';
import type { OpenCallView } from '../../../offline/offline-book';
import { stripLineOf } from '../../../ui/strip-line';
import { floorLoom, type FloorLoom } from '../floor-loom';

export const LOOM_14: Loom = {
  id: LOOM_ID,
  shedId: SHED_ID,
  number: 14,
  row: 1,
  position: 2,
  alley: 'A',
  from: at(-100_000),
  until: null,
};

const causes: readonly CauseVersion[] = someCauses();
export const causeAt = (cause: string): CauseVersion | undefined =>
  causes.find((version) => version.causeId === cause);

/** Loom 14 in the builders' shift, `minutes` after it began, as its entries make it. */
export function aFloorLoom(
  entries: BookEntry[],
  minutes: number,
  over: { call?: OpenCallView; weaver?: string; notSent?: number; target?: number } = {},
): FloorLoom {
  const line = projectLine(aLineInput({ entries }));
  return floorLoom({
    loom: LOOM_14,
    line,
    strip: stripLineOf(line, at(minutes)),
    clothName: (id) => (id === 'cloth-1' ? 'Glebe 42' : 'cloth not known'),
    causeAt,
    ...(over.target !== undefined && { targetOf: () => over.target ?? null }),
    weaver: over.weaver ?? '',
    call: over.call ?? null,
    notSent: over.notSent ?? 0,
    at: at(minutes),
  });
}
