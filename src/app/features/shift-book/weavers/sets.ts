import type { Loom, PersonCard, Shift } from '@shared/contract/reference';
import type { EntryDraft } from '../../../offline/entry-draft';

/** Who minds which loom; null: nobody. */
export type Minded = ReadonlyMap<string, string | null>;

/** More looms than the usual set and these are too many to mind. */
const MORE_THAN_USUAL = 2;
/** Of somebody without a usual set. */
const MOST_LOOMS = 8;

/** The sets of an earlier shift, to begin with. */
export interface LastSets {
  readonly shift: Shift;
  readonly minded: Minded;
}

/**
 * The last shift before this one that had weavers: of its own pattern, since the same people come back to it; where
 * that never had any, of whatever pattern.
 */
export function lastSets(
  shifts: readonly Shift[],
  shift: Shift,
  mindedIn: (earlier: Shift) => Minded,
): LastSets | null {
  const earlier = shifts
    .filter((one) => one.shedId === shift.shedId && one.startsAt < shift.startsAt)
    .reverse();
  const own = earlier.filter((one) => one.patternId === shift.patternId);
  for (const one of [...own, ...earlier]) {
    const minded = mindedIn(one);
    if ([...minded.values()].some((weaverId) => weaverId !== null)) return { shift: one, minded };
  }
  return null;
}

/** A weaver as the page lists one. */
export interface WeaverSet {
  readonly person: PersonCard;
  readonly looms: readonly Loom[];
  /** "more than the usual 6", "had 6 looms last time"; empty: nothing to say. */
  readonly word: string;
  readonly tooMany: boolean;
}

/** Everybody who weaves, with the looms they would mind; who has looms, or had some last time, first. */
export function weaverSets(
  people: readonly PersonCard[],
  looms: readonly Loom[],
  minded: Minded,
  last: Minded,
): readonly WeaverSet[] {
  const known = people.filter(
    ({ id, roles }) => roles.includes('weaver') || [...minded.values()].includes(id),
  );
  return known
    .map((person): WeaverSet => {
      const own = looms.filter(({ id }) => minded.get(id) === person.id);
      const before = looms.filter(({ id }) => last.get(id) === person.id).length;
      const usual = person.usualSet.length;
      const most = usual > 0 ? usual + MORE_THAN_USUAL : MOST_LOOMS;
      const tooMany = own.length > most;
      const word = tooMany
        ? usual > 0
          ? `many: usually ${usual}`
          : `many: more than ${MOST_LOOMS}`
        : own.length === 0 && before > 0
          ? `absent? Had ${before === 1 ? '1 loom' : `${before} looms`} last time`
          : '';
      return { person, looms: own, word, tooMany };
    })
    .sort(
      (a, b) =>
        Number(b.looms.length > 0 || b.word !== '') - Number(a.looms.length > 0 || a.word !== '') ||
        a.person.name.localeCompare(b.person.name, 'en-GB'),
    );
}

export interface AssignMoments {
  readonly shift: Shift;
  /** Now, by the mill's clock. */
  readonly now: number;
  /** What a loom without a weaver gets: from the shift's start, or from now. */
  readonly fromStart: boolean;
}

/**
 * The entries that make one plan of another: one a weaver and moment. A loom that somebody minds already changes
 * hands now, which makes a stretch of its own; a shift that has not begun is as it is said.
 *
 * @param was what the book has; a loom that is not in it was never given to anybody in this shift
 */
export function assignments(
  was: Minded,
  becomes: Minded,
  { shift, now, fromStart }: AssignMoments,
): EntryDraft[] {
  const moment = (loomId: string) => {
    if (now <= shift.startsAt) return now;
    return !was.has(loomId) && fromStart ? shift.startsAt : Math.min(now, shift.endsAt);
  };
  const groups = new Map<string, { weaverId: string | null; at: number; loomIds: string[] }>();
  for (const [loomId, weaverId] of becomes) {
    if ((was.get(loomId) ?? null) === weaverId) continue;
    const at = moment(loomId);
    const key = `${weaverId} ${at}`;
    const group = groups.get(key) ?? { weaverId, at, loomIds: [] };
    group.loomIds.push(loomId);
    groups.set(key, group);
  }
  const { shedId, key: shiftKey } = shift;
  return [...groups.values()].map((group) => ({ kind: 'assign', shedId, shiftKey, ...group }));
}
