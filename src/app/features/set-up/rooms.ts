import type { SetUp } from '@shared/contract/set-up';

/** A page of set-up: what it is for, what is in it, what it lacks. */
export interface Room {
  readonly path: string;
  readonly label: string;
  /** How much is in it, e.g. "24 looms"; empty: it is not counted. */
  readonly count: (setUp: SetUp) => string;
  /** What is missing before a shift can be logged; empty: nothing. */
  readonly missing: (setUp: SetUp) => string;
}

export interface RoomGroup {
  readonly heading: string;
  readonly rooms: readonly Room[];
}

/** "1 loom", "12 looms". */
export function many(count: number, one: string, more = `${one}s`): string {
  return `${count.toLocaleString('en-GB')} ${count === 1 ? one : more}`;
}

const none = () => '';
const room = (
  path: string,
  label: string,
  count = none as Room['count'],
  missing = none as Room['missing'],
): Room => ({
  path,
  label,
  count,
  missing,
});

/** Looms that are in use, or will be. */
export const loomsInUse = (setUp: SetUp) => setUp.looms.filter((loom) => loom.until === null);
/** Cloths that are still offered. */
export const clothsOffered = (setUp: SetUp) => setUp.cloths.filter((cloth) => !cloth.retired);
/** Patterns that have no end yet. */
export const patternsInForce = (setUp: SetUp) => setUp.patterns.filter((pattern) => pattern.until === null);

export const ROOM_GROUPS: readonly RoomGroup[] = [
  {
    heading: 'The shed',
    rooms: [
      room('looms', 'Sheds and looms', (setUp) => many(loomsInUse(setUp).length, 'loom'), missingLooms),
      room('labels', 'Labels for looms'),
    ],
  },
  {
    heading: 'What is woven',
    rooms: [
      room(
        'cloths',
        'Cloths',
        (setUp) => many(clothsOffered(setUp).length, 'cloth'),
        (setUp) => (clothsOffered(setUp).length ? '' : 'no cloth yet'),
      ),
      room('beams', 'Beams', (setUp) =>
        many(setUp.beams.filter((beam) => !beam.used).length, 'in store', 'in store'),
      ),
      room('targets', 'Targets', (setUp) =>
        many(new Set(setUp.targets.map((one) => one.clothId)).size, 'cloth'),
      ),
    ],
  },
  {
    heading: 'Time',
    rooms: [
      room(
        'shifts',
        'Shift patterns',
        (setUp) => many(patternsInForce(setUp).length, 'pattern'),
        missingPatterns,
      ),
      room('calendar', 'Calendar', (setUp) => many(setUp.calendar.length, 'day')),
    ],
  },
  {
    heading: 'Stops and care',
    rooms: [
      room('causes', 'Causes', (setUp) =>
        many(new Set(setUp.causeVersions.map((one) => one.causeId)).size, 'cause'),
      ),
      room('parts-and-jobs', 'Parts and jobs', (setUp) =>
        many([...setUp.parts, ...setUp.jobs].filter((one) => !one.retired).length, 'entry', 'entries'),
      ),
    ],
  },
  {
    heading: 'Who and where',
    rooms: [room('people', 'People'), room('tablets', 'Tablets'), room('mail', 'Mail')],
  },
  {
    heading: 'The mill',
    rooms: [room('figures', 'Mill and figures'), room('changes', 'Change record')],
  },
];

function missingLooms(setUp: SetUp): string {
  if (setUp.sheds.length === 0) return 'no shed yet';
  return loomsInUse(setUp).length ? '' : 'no loom yet';
}

function missingPatterns(setUp: SetUp): string {
  const sheds = setUp.sheds.filter((shed) => !patternsInForce(setUp).some((one) => one.shedId === shed.id));
  if (setUp.sheds.length === 0) return '';
  if (sheds.length === setUp.sheds.length) return 'no shift yet';
  return sheds.length ? `none for ${sheds.map((shed) => shed.name).join(', ')}` : '';
}
