import * as fc from 'fast-check';
import type { Act } from './acts.js';

/** Generators for property specs. Minutes lie around the builders' shift of 480, before and after it too. */
const minute = fc.integer({ min: -60, max: 540 });
const ownCause = fc.constantFrom(
  'warp-break',
  'weft-break',
  'pern-change',
  'smash',
  'weft-fork',
  'wait-weft',
  'no-order',
);
const shedCause = fc.constantFrom('power', 'shed-other', 'holiday');
const after = fc.integer({ min: 0, max: 200 });

const tap: fc.Arbitrary<Act> = fc.record({
  is: fc.constant('tap' as const),
  minute,
  cause: ownCause,
  count: fc.integer({ min: 1, max: 5 }),
});
const timed: fc.Arbitrary<Act> = fc.record({
  is: fc.constant('timed' as const),
  minute,
  cause: ownCause,
  lasts: after,
});
const standing: fc.Arbitrary<Act> = fc.record({
  is: fc.constant('standing' as const),
  minute,
  cause: ownCause,
  resumes: fc.array(after, { maxLength: 2 }),
  call: fc.option(after, { nil: null }),
  arrive: fc.option(after, { nil: null }),
});
const shedStop: fc.Arbitrary<Act> = fc.record({
  is: fc.constant('shed-stop' as const),
  minute,
  cause: shedCause,
  lasts: fc.option(after, { nil: null }),
  resume: fc.option(after, { nil: null }),
});
/** Everything that stops a loom. */
export const stopActs = fc.array(fc.oneof(tap, timed, standing, shedStop), { maxLength: 12 });

const said: fc.Arbitrary<Act> = fc.oneof(
  fc.record({
    is: fc.constant('reading' as const),
    minute,
    boundary: fc.constantFrom('start' as const, 'end' as const, 'change' as const, 'reset' as const),
    value: fc.integer({ min: 0, max: 999_999 }),
  }),
  fc.record({
    is: fc.constant('assign' as const),
    minute,
    weaver: fc.constantFrom('weaver-1', 'weaver-2', null),
  }),
  fc.record({
    is: fc.constant('count' as const),
    minute,
    cause: ownCause,
    total: fc.integer({ min: 0, max: 40 }),
  }),
  fc.record({
    is: fc.constant('warp-change' as const),
    minute,
    cloth: fc.constantFrom('cloth-1', 'cloth-2'),
  }),
  fc.record({ is: fc.constant('sheet' as const), minute, end: fc.nat(999_999), minutes: fc.nat(60) }),
  fc.record({ is: fc.constant('decide' as const), minute, picks: fc.nat(90_000) }),
);
const corrected: fc.Arbitrary<Act> = fc.oneof(
  fc.record({ is: fc.constant('void' as const), minute, of: fc.nat(10), basedOn: fc.nat(2) }),
  fc.record({
    is: fc.constant('amend' as const),
    minute,
    of: fc.nat(10),
    basedOn: fc.nat(2),
    cause: ownCause,
    moves: fc.integer({ min: -30, max: 30 }),
  }),
);
/** Everything that a shift's entries may say, corrections among it. */
export const anyActs = fc.array(fc.oneof(tap, timed, standing, shedStop, said, corrected), { maxLength: 16 });
/** One act that is no correction. */
export const anyRootAct = fc.oneof(tap, timed, standing, shedStop, said);
