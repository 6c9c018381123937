import { inForceAt, type PersonCard, type Reference } from '@shared/contract/reference';
import { clockTime } from '../../ui/clock-time';

/** Names in place of ids, and the mill's clock. */
export interface Say {
  readonly cause: (id: string, at: number) => string;
  readonly loom: (id: string) => string;
  readonly person: (id: string) => string;
  readonly cloth: (id: string) => string;
  readonly warp: (id: string | null) => string;
  readonly job: (id: string) => string;
  readonly time: (at: number) => string;
}

export function sayBy(reference: Reference, people: readonly PersonCard[]): Say {
  return {
    cause: (id, at) => {
      const versions = reference.causeVersions.filter((one) => one.causeId === id);
      return (inForceAt(versions, at) ?? versions[0])?.name ?? id;
    },
    loom: (id) => String(reference.looms.find((one) => one.id === id)?.number ?? id),
    person: (id) => people.find((one) => one.id === id)?.name ?? id,
    cloth: (id) => reference.cloths.find((one) => one.id === id)?.name ?? id,
    warp: (id) => (id === null ? 'none' : (reference.warps.find((one) => one.id === id)?.name ?? id)),
    job: (id) => reference.jobs?.find((one) => one.id === id)?.name ?? id,
    time: (at) => clockTime(at, reference.mill.timeZone),
  };
}

/** Within a sentence: "warp break". */
export function lower(name: string): string {
  return name.charAt(0).toLocaleLowerCase('en-GB') + name.slice(1);
}
