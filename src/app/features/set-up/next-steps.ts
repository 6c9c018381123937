import type { SetUp } from '@shared/contract/set-up';
import { clothsOffered, loomsInUse, many, patternsInForce } from './rooms';

/** What set-up's document does not say itself. */
export interface Beside {
  readonly weavers: number;
  readonly tablets: number;
  /** Looms of which the book knows what is on them. */
  readonly fitted: number;
  /** When the next shift begins, in words; empty: none is made yet. */
  readonly nextShift: string;
  /** A shift has begun since the mill was set up. */
  readonly hasBegun: boolean;
}

export interface Step {
  readonly id: string;
  readonly label: string;
  /** Why, or how far it is. */
  readonly words: string;
  readonly path: string;
  /** What the button says. */
  readonly go: string;
  readonly done: boolean;
}

/** The way of an empty mill to its first shift, in the order in which it is sensible. */
export function stepsOf(setUp: SetUp, beside: Beside): readonly Step[] {
  const looms = loomsInUse(setUp).length;
  const bare = Math.max(0, looms - beside.fitted);
  const cloths = clothsOffered(setUp).length;
  return [
    {
      id: 'shed',
      label: 'A shed',
      words: setUp.sheds.length
        ? setUp.sheds.map((shed) => shed.name).join(', ')
        : 'Everything else belongs to one.',
      path: '/set-up/looms',
      go: 'Add a shed',
      done: setUp.sheds.length > 0,
    },
    {
      id: 'looms',
      label: 'Looms on their plan',
      words: looms ? many(looms, 'loom') : 'A whole floor at once: rows, alleys, speed, pick clock.',
      path: '/set-up/looms',
      go: 'Add looms',
      done: looms > 0,
    },
    {
      id: 'shifts',
      label: 'Shift patterns',
      words: patternsInForce(setUp).length
        ? patternsInForce(setUp)
            .map((pattern) => pattern.name)
            .join(', ')
        : 'When the shed works; shifts are made from them five weeks ahead.',
      path: '/set-up/shifts',
      go: 'Add a shift pattern',
      done: patternsInForce(setUp).length > 0,
    },
    {
      id: 'cloths',
      label: 'Cloths',
      words: cloths ? many(cloths, 'cloth') : 'What is woven: ends, picks, reed width, wefts.',
      path: '/set-up/cloths',
      go: 'Add a cloth',
      done: cloths > 0,
    },
    {
      id: 'on-looms',
      label: 'What is on the looms now',
      words:
        looms > 0 && bare === 0
          ? `Known of all ${looms}.`
          : `Choose looms on the plan, then “On the loom now”.${bare < looms ? ` ${many(bare, 'loom')} to go.` : ''}`,
      path: '/set-up/looms',
      go: 'Say what is on the looms',
      done: looms > 0 && bare === 0,
    },
    {
      id: 'people',
      label: 'People',
      words: beside.weavers
        ? many(beside.weavers, 'weaver')
        : 'Weavers, tacklers and foremen with their sets.',
      path: '/set-up/people',
      go: 'Add people',
      done: beside.weavers > 0,
    },
    {
      id: 'tablet',
      label: 'A tablet for the shed',
      words: beside.tablets ? many(beside.tablets, 'tablet') : 'It logs with or without network.',
      path: '/set-up/tablets',
      go: 'Register a tablet',
      done: beside.tablets > 0,
    },
    {
      id: 'first-shift',
      label: 'The first shift',
      words: beside.hasBegun
        ? 'It has begun: the Floor shows the shed as it stands.'
        : beside.nextShift
          ? `It begins ${beside.nextShift}. The Floor then shows the shed as it stands.`
          : 'It begins with the first shift that the patterns make.',
      path: '/floor',
      go: 'To the Floor',
      done: beside.hasBegun,
    },
  ];
}
