import { demoPartId } from './parts-and-jobs.js';
import type { Random } from './random.js';
import type { Shed } from './shed.js';
import { MINUTE, SECOND, type LoomState } from './weaving.js';
import { sure } from './sure.js';

/** A loom that stands for the tackler. */
export interface TacklerCall {
  readonly loom: LoomState;
  readonly weaver: string;
  readonly stopId: string;
  readonly callId: string;
  readonly fault: Fault;
}

interface Fault {
  readonly cause: string;
  readonly found: string;
  readonly done: string;
  readonly part?: string;
  /** Median minutes of the mending. */
  readonly minutes: number;
  readonly weight: number;
}

const FAULTS: readonly Fault[] = [
  {
    cause: 'picking',
    found: 'Picking weak',
    done: 'Picking band taken up',
    part: 'Picking band',
    minutes: 20,
    weight: 5,
  },
  { cause: 'checking', found: 'Shuttle rebounds', done: 'Swell eased', minutes: 16, weight: 3 },
  { cause: 'warp-protector', found: 'Bangs off', done: 'Frog and dagger set', minutes: 14, weight: 4 },
  {
    cause: 'weft-fork',
    found: 'Fork does not feel the weft',
    done: 'Fork set to the grid',
    minutes: 10,
    weight: 4,
  },
  { cause: 'take-up', found: 'Thin places', done: 'Pawl cleaned', minutes: 15, weight: 2 },
  { cause: 'let-off', found: 'Warp too slack', done: 'Chain and weights set', minutes: 14, weight: 2 },
  {
    cause: 'temple',
    found: 'Temple marks',
    done: 'Temple roller changed',
    part: 'Temple roller',
    minutes: 12,
    weight: 2,
  },
  {
    cause: 'shuttle-trapped',
    found: 'Shuttle trapped',
    done: 'Ends pieced, shed timing set',
    minutes: 24,
    weight: 2,
  },
  {
    cause: 'shuttle-worn',
    found: 'Shuttle rough',
    done: 'Shuttle changed',
    part: 'Shuttle',
    minutes: 9,
    weight: 2,
  },
  {
    cause: 'reed-or-heald',
    found: 'Heald eye cut',
    done: 'Heald replaced',
    part: 'Heald',
    minutes: 22,
    weight: 1,
  },
  {
    cause: 'electrical',
    found: 'Motor trips',
    done: 'Brush changed',
    part: 'Motor brush',
    minutes: 30,
    weight: 1,
  },
  { cause: 'loom-other', found: 'Bolt loose at the crank arm', done: 'Tightened', minutes: 12, weight: 2 },
];
const ALL_WEIGHTS = FAULTS.reduce((sum, fault) => sum + fault.weight, 0);

function drawFault(random: Random): Fault {
  let left = random.next() * ALL_WEIGHTS;
  for (const fault of FAULTS) {
    left -= fault.weight;
    if (left < 0) return fault;
  }
  return sure(FAULTS[0]);
}

/** The weaver looks, logs it as standing, calls, and goes on; answers when the weaver is free. */
export function mendByTackler(shed: Shed, loom: LoomState, weaver: string, at: number): number {
  const { random } = shed;
  const fault = drawFault(random);
  const stopId = shed.say(weaver, loom, at, {
    kind: 'standing',
    loomId: loom.id,
    at: Math.round(at),
    cause: fault.cause,
  });
  const called = at + random.duration(40 * SECOND, 0.3);
  shed.agenda.schedule(called, (then) => {
    const callId = shed.say(weaver, loom, then, {
      kind: 'call',
      loomId: loom.id,
      at: Math.round(then),
      targetId: stopId,
      words: fault.found,
    });
    shed.calls.push({ loom, weaver, stopId, callId, fault });
    answerCalls(shed, then);
  });
  return called;
}

function partOf({ part }: Fault): { part?: string; partId?: string } {
  if (part === undefined) return {};
  const partId = demoPartId(part);
  return partId === undefined ? { part } : { part, partId };
}

/** The tackler takes the call that has waited longest: walks, mends, says what was done, sees it run. */
function answerCalls(shed: Shed, at: number): void {
  if (shed.tacklerBusy) return;
  const call = shed.calls.shift();
  if (!call) return;
  shed.tacklerBusy = true;
  const { random, agenda } = shed;
  const { loom, callId, stopId, fault } = call;
  const step = (name: 'take' | 'arrive' | 'done', moment: number): void => {
    shed.say(shed.crew.tackler, loom, moment, {
      kind: 'attend',
      loomId: loom.id,
      at: Math.round(moment),
      targetId: callId,
      step: name,
    });
  };
  agenda.schedule(at + random.duration(30 * SECOND, 0.6), (taken) => {
    step('take', taken);
    agenda.schedule(taken + random.duration(2.5 * MINUTE, 0.4), (arrived) => {
      step('arrive', arrived);
      agenda.schedule(arrived + random.duration(fault.minutes * MINUTE, 0.45), (mended) => {
        const { tackler } = shed.crew;
        shed.say(tackler, loom, mended, {
          kind: 'repair',
          loomId: loom.id,
          at: Math.round(mended),
          targetId: callId,
          cause: fault.cause,
          found: fault.found,
          done: fault.done,
          ...partOf(fault),
          ran: fault.minutes > 20 ? 'watch' : 'well',
        });
        shed.resume(loom, tackler, stopId, mended);
        agenda.schedule(mended + MINUTE, (free) => {
          step('done', free);
          shed.tacklerBusy = false;
          answerCalls(shed, free);
        });
      });
    });
  });
}
