import fc from 'fast-check';

/** What the wire does to one request of one tablet. */
export const WIRE_FAULTS = [
  'request lost',
  'answer lost',
  'duplicated',
  'late',
  'slow',
  'request cut',
  'answer cut',
  'portal',
  'worker 504',
  '413',
  '429',
  '500',
  '500 after',
  '503',
  '401',
  'disk full',
  'locked',
  'tab killed',
] as const;
export type WireFault = (typeof WIRE_FAULTS)[number];

/** What happens to a tablet while somebody taps on it. */
export const TABLET_FAULTS = [
  'quota',
  'connection closed',
  'killed in mid-save',
  'killed in mid-pull',
  'clock jumps',
  'asleep',
  'two tabs',
] as const;
export type TabletFault = (typeof TABLET_FAULTS)[number];

/** What happens at the server meanwhile. */
export const SERVER_EVENTS = [
  'restart',
  'restart in mid-push',
  'backup',
  'restored backup',
  'copied file',
  'author disabled',
  'author enabled',
  'tablet revoked',
] as const;
export type ServerEvent = (typeof SERVER_EVENTS)[number];

export const ACTS = [
  'stop',
  'standing',
  'resume',
  'reading',
  'void own',
  'amend own',
  'void of another tablet',
  'close shift',
  'poison',
] as const;
export type Act = (typeof ACTS)[number];

export interface Tap {
  readonly act: Act;
  readonly loom: number;
  /** Which of the earlier ones it is about. */
  readonly of: number;
}

export interface Turn {
  /** Whoever is signed in: the taps are theirs, what waits from before is whoever's it was. */
  readonly author: number;
  readonly taps: readonly Tap[];
  readonly fault: TabletFault | null;
  /** Where in the turn the fault strikes, and how far a clock jumps. */
  readonly place: number;
  readonly jump: number;
  readonly offline: boolean;
}

export interface Round {
  readonly turns: readonly Turn[];
  readonly event: ServerEvent | null;
  readonly passes: number;
}

export interface RunPlan {
  readonly clockErrors: readonly number[];
  /** By tablet and the number of its request; behind the end the wire is sound. */
  readonly wire: readonly (readonly (WireFault | null)[])[];
  readonly rounds: readonly Round[];
}

export const TABLETS = 3;
export const ROUNDS = 10;
export const TAPS = 10;
/** Requests of a tablet that the wire may harm. */
const HARMED = 45;

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;
const JUMPS = [-DAY, -HOUR, -4 * MINUTE, 4 * MINUTE, HOUR, DAY];

const rarely = <T>(often: number, values: readonly T[]) =>
  fc.oneof(
    { weight: often, arbitrary: fc.constant(null) },
    { weight: 1, arbitrary: fc.constantFrom(...values) },
  );

const usual = fc.oneof(
  { weight: 60, arbitrary: fc.constant<Act>('stop') },
  { weight: 8, arbitrary: fc.constant<Act>('standing') },
  { weight: 8, arbitrary: fc.constant<Act>('resume') },
  { weight: 8, arbitrary: fc.constant<Act>('reading') },
  { weight: 6, arbitrary: fc.constant<Act>('void own') },
  { weight: 6, arbitrary: fc.constant<Act>('amend own') },
  { weight: 4, arbitrary: fc.constant<Act>('void of another tablet') },
  { weight: 1, arbitrary: fc.constant<Act>('close shift') },
);
const tap = fc.record({ act: usual, loom: fc.nat(3), of: fc.nat(1_000) });

const turn = fc.record({
  author: fc.nat(1),
  taps: fc.array(tap, { minLength: TAPS, maxLength: TAPS, size: 'max' }),
  fault: rarely(1, TABLET_FAULTS),
  place: fc.nat(TAPS - 1),
  jump: fc.constantFrom(...JUMPS),
  offline: fc.nat(3).map((n) => n === 0),
});

const round = fc.record({
  turns: fc.tuple(turn, turn, turn),
  event: rarely(1, SERVER_EVENTS),
  passes: fc.oneof(
    { weight: 6, arbitrary: fc.constantFrom(MINUTE, 5 * MINUTE, 20 * MINUTE) },
    { weight: 1, arbitrary: fc.constantFrom(2 * HOUR, 12 * HOUR) },
  ),
});

const times = { minLength: HARMED, maxLength: HARMED, size: 'max' } as const;
const plan = fc
  .record({
    clockErrors: fc.tuple(...Array.from({ length: TABLETS }, () => fc.constantFrom(0, 0, ...JUMPS))),
    wire: fc.tuple(...Array.from({ length: TABLETS }, () => fc.array(rarely(2, WIRE_FAULTS), times))),
    rounds: fc.array(round, { minLength: ROUNDS, maxLength: ROUNDS, size: 'max' }),
    poisoned: fc.tuple(...Array.from({ length: TABLETS }, () => fc.nat(ROUNDS * TAPS - 1))),
  })
  .map(({ poisoned, ...rest }) => withPoison(rest, poisoned));

/** The same seed gives the same schedule. */
export function planOf(seed: number): RunPlan {
  const [drawn] = fc.sample(plan, { seed, numRuns: 1 });
  if (!drawn) throw new Error('fast-check drew nothing.');
  return drawn;
}

/** One entry in a hundred that the book can never take. */
function withPoison(drawn: RunPlan, poisoned: readonly number[]): RunPlan {
  const rounds = drawn.rounds.map((each, r) => ({
    ...each,
    turns: each.turns.map((one, t) => {
      const place = (poisoned[t] ?? 0) - r * TAPS;
      const taps = one.taps.map((each, n) => (n === place ? { ...each, act: 'poison' as const } : each));
      return { ...one, taps };
    }),
  }));
  return { ...drawn, rounds };
}
