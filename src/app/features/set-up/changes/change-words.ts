import type { RecordedChange } from '@shared/contract/set-up';
import { PERCENT, QUANTITIES, plain, type Quantity, type Units } from '../common/quantity';
import { withUnit } from '../common/with-unit';

/** What a change's values mean: names for ids, moments for milliseconds, measures in the mill's units. */
export interface Namer {
  readonly units: Units;
  readonly nameOf: (id: string) => string | null;
  readonly moment: (at: number) => string;
}

export interface Difference {
  readonly field: string;
  /** Empty: it was not there. */
  readonly before: string;
  /** Empty: it is not there any more. */
  readonly after: string;
}

const ACTIONS: Readonly<Record<RecordedChange['action'], string>> = {
  added: 'added',
  changed: 'changed',
  ended: 'ended',
  removed: 'removed',
  command: 'carried out',
};

/** What was carried out, by what it was done to. */
const COMMANDS: Readonly<Record<string, string>> = {
  recalculation: 'closed shifts recalculated',
  person: 'letter written',
};

/** What kind of thing it is, where its name alone does not say so: people and the mill are known by theirs. */
const KINDS: Readonly<Record<string, string>> = {
  shed: 'Shed',
  alley: 'Alley',
  loom: 'Loom',
  cloth: 'Cloth',
  beam: 'Beam',
  pattern: 'Shift pattern',
  cause: 'Cause',
  target: 'Target',
  part: 'Part',
  job: 'Job',
  tablet: 'Tablet',
};

/** "Loom 14: changed", "Tablet Alley A: added". */
export function headlineOf({ what, name, action }: RecordedChange): string {
  const kind = KINDS[what] ?? '';
  const says = kind === '' || name.toLowerCase().startsWith(`${kind.toLowerCase()} `);
  return `${says ? name : `${kind} ${name}`}: ${(action === 'command' ? COMMANDS[what] : undefined) ?? ACTIONS[action]}`;
}

const FIELDS: Readonly<Record<string, string>> = {
  ppm: 'Speed, picks/min',
  reedSpaceCm: 'Reed space',
  clock: 'Pick clock',
  shuttles: 'Shuttles',
  battery: 'Battery',
  number: 'Number',
  row: 'Row',
  position: 'Place in the row',
  alley: 'Alley',
  from: 'From',
  until: 'Until',
  name: 'Name',
  shortName: 'Short name',
  worksNumber: 'Works number',
  email: 'E-mail',
  roles: 'Roles',
  shedIds: 'Sheds',
  pin: 'PIN',
  usualSet: 'Usual set',
  tacklerIds: 'Tacklers',
  units: 'Units',
  figuresByPerson: 'Figures by person',
  lockAfterMinutes: 'Tablet locks after, min',
  retired: 'Retired',
  ends: 'Ends',
  picksPerCmOnLoom: 'Picks on the loom',
  picksPerCmLoomState: 'Picks in loom state',
  reedWidthCm: 'Reed width',
  crimp: 'Crimp',
  abreast: 'Abreast',
  wefts: 'Wefts',
  lengthM: 'Length',
  thrumM: 'Thrum',
  tex: 'Count',
  pernMassG: 'Weft on a full pern',
  clothId: 'Cloth',
  shedId: 'Shed',
  patternId: 'Pattern',
  allowanceS: 'Allowance, s',
  attendedBy: 'Attended by',
  group: 'Group',
  breakOf: 'Break of',
  efficiency: 'Efficiency',
  warpBreaks: 'Warp breaks per 10⁵ picks',
  weftBreaks: 'Weft breaks per 10⁵ picks',
  everyPicks: 'Due every, picks',
  startsLocal: 'Starts',
  endsLocal: 'Ends at',
  weekdays: 'Days',
  meal: 'Meal',
  kind: 'Kind',
  date: 'Date',
  reason: 'Reason',
};
/** Measures, shown as the forms show them; crimp, shares and the like as percentages. */
const MEASURES: Readonly<Record<string, keyof typeof QUANTITIES | Quantity>> = {
  reedSpaceCm: 'width',
  reedWidthCm: 'width',
  picksPerCmOnLoom: 'sett',
  picksPerCmLoomState: 'sett',
  lengthM: 'length',
  thrumM: 'length',
  pernMassG: 'mass',
  crimp: PERCENT,
  share: PERCENT,
  waste: PERCENT,
  efficiency: PERCENT,
  tex: plain('tex'),
};
const MOMENTS = new Set(['from', 'until', 'effectiveAt', 'at', 'startsAt', 'endsAt']);

/** Field by field what was and what is; what stayed the same is left out. */
export function differences({ before, after }: RecordedChange, namer: Namer): readonly Difference[] {
  const keys = [...new Set([...Object.keys(before ?? {}), ...Object.keys(after ?? {})])];
  return keys
    .filter((key) => JSON.stringify(before?.[key]) !== JSON.stringify(after?.[key]))
    .map((key) => ({
      field: FIELDS[key] ?? plainName(key),
      before: before && key in before ? valueWords(key, before[key], namer) : '',
      after: after && key in after ? valueWords(key, after[key], namer) : '',
    }));
}

/** All that a thing began or ended with, in one line; empty: it was changed, and its differences say how. */
export function wholeWords(change: RecordedChange, namer: Namer): string {
  if (change.before && change.after) return '';
  return differences(change, namer)
    .map(({ field, before, after }) => `${field} ${after || before}`)
    .join(' · ');
}

/** "lockAfterMinutes" → "Lock after minutes". */
function plainName(key: string): string {
  const words = key.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase();
  return words.charAt(0).toUpperCase() + words.slice(1);
}

const DAYS = ['', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];

function valueWords(key: string, value: unknown, namer: Namer): string {
  // Who is bound to no shed has the rights in all of them.
  if (key === 'shedIds' && Array.isArray(value) && value.length === 0) return 'all';
  if (value === null || value === undefined || value === '') return 'none';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'number') {
    if (MOMENTS.has(key) && value > 1e11) return namer.moment(value);
    if (key === 'weekdays') return DAYS[value] ?? String(value);
    const measure = MEASURES[key];
    if (measure !== undefined)
      return withUnit(value, typeof measure === 'string' ? QUANTITIES[measure][namer.units] : measure);
    return value.toLocaleString('en-GB', { maximumFractionDigits: 6 });
  }
  if (typeof value === 'string') return namer.nameOf(value) ?? value;
  if (Array.isArray(value)) {
    const words = value.map((one) => valueWords(key, one, namer));
    return words.length ? words.join(', ') : 'none';
  }
  return Object.entries(value)
    .map(
      ([inner, one]) =>
        `${(FIELDS[inner] ?? plainName(inner)).toLowerCase()} ${valueWords(inner, one, namer)}`,
    )
    .join(', ');
}
