import type { Entry } from '../../shared/entries/entry.js';
import { EARLY, entry, HOUR, LATE, MINUTE, MONDAY, NIGHT, TUESDAY } from './test-entries.js';

/** Chance from a seed: the same history each time. */
export class Dice {
  constructor(private state: number) {}

  /** In [0, 1). mulberry32. */
  next(): number {
    this.state = (this.state + 0x6d2b79f5) | 0;
    let t = Math.imul(this.state ^ (this.state >>> 15), 1 | this.state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  }

  /** A whole number in [0, most). */
  upTo(most: number): number {
    return Math.floor(this.next() * most);
  }

  of<T>(items: readonly T[]): T {
    const item = items[this.upTo(items.length)];
    if (item === undefined) throw new Error('nothing to choose from');
    return item;
  }

  shuffled<T>(items: readonly T[]): T[] {
    return this.stirred(items, items.length * 10);
  }

  /** Each item moved by at most so many places or so. */
  stirred<T>(items: readonly T[], places: number): T[] {
    return items
      .map((item, at) => ({ item, at: at + this.next() * places }))
      .sort((a, b) => a.at - b.at)
      .map(({ item }) => item);
  }
}

const SHIFTS = [EARLY, LATE, NIGHT, TUESDAY] as const;
const LOOMS = ['n1', 'n2', 'n3', 'n4'] as const;
const CAUSES = ['warp-break', 'weft-break', 'pern-change', 'picking', 'smash', 'cut-off'] as const;

/**
 * A shed's days as people might log them, with everything that makes projection hard: stops over shift ends, shed
 * stops, resumes twice, corrections of corrections, voided batches, readings that disagree, warps changed after the
 * fact. Nothing in it is refused. `decisions`: shifts are closed and reopened too, and what is held is decided.
 */
export function randomHistory(dice: Dice, size: number, { decisions }: { decisions: boolean }): Entry[] {
  const history: Entry[] = [];
  const span = 27 * HOUR;
  for (let n = 0; n < size; n += 1) {
    const at = MONDAY + Math.floor((n / size) * span) + dice.upTo(20) * MINUTE;
    history.push(...whatHappens(dice, history, at, decisions));
  }
  return history;
}

function whatHappens(dice: Dice, history: readonly Entry[], at: number, decisions: boolean): Entry[] {
  const shiftAt = Math.min(SHIFTS.length - 1, Math.floor((at - MONDAY) / (8 * HOUR)));
  const shiftKey = SHIFTS[shiftAt] ?? EARLY;
  const loomId = dice.of(LOOMS);
  const cause = dice.of(CAUSES);
  const stops = history.filter((one) => one.kind === 'standing' || one.kind === 'shed-stop');
  const chance = dice.next();
  if (chance < 0.3) return [entry('stop', { loomId, cause, count: 1 + dice.upTo(3), at })];
  if (chance < 0.36)
    return [entry('stop', { loomId, cause, count: 1, at, until: at + dice.upTo(90) * MINUTE })];
  if (chance < 0.44) return [entry('standing', { loomId, cause, at: at - dice.upTo(15) * MINUTE })];
  if (chance < 0.54 && stops.length > 0) {
    const stop = dice.of(stops.slice(-8));
    const of = stop.kind === 'standing' ? stop.loomId : loomId;
    return [entry('resume', { loomId: of, targetId: stop.id, at: Math.max(at, stop.at) })];
  }
  if (chance < 0.66) {
    const boundary = dice.of(['start', 'end', 'start', 'end', 'reset'] as const);
    const value = 1_000 + shiftAt * 900 + (boundary === 'start' ? 0 : 900) + dice.upTo(3);
    return [entry('reading', { loomId, shiftKey, boundary, value, at })];
  }
  if (chance < 0.7) {
    const batchId = entry('note', { text: '', at }).id;
    return LOOMS.slice(0, 1 + dice.upTo(3)).map((of) =>
      entry('stop', { loomId: of, cause: 'pern-change', count: 1, at, batchId }),
    );
  }
  if (chance < 0.72) return [shedStop(dice, at)];
  if (chance < 0.75)
    return [entry('count', { loomId, shiftKey, cause: 'pern-change', total: dice.upTo(80), at })];
  if (chance < 0.78)
    return [entry('assign', { shiftKey, weaverId: dice.of(['wanda', 'wilf']), loomIds: [loomId], at })];
  if (chance < 0.8)
    return [
      entry('warp-change', { who: 'tackler', loomId, how: 'gaiting', warpId: null, clothId: 'calico', at }),
    ];
  if (chance < 0.84) return callOf(dice, stops, loomId, at);
  if (chance < 0.93) return correction(dice, history, at);
  return decisions ? decision(dice, history, shiftAt, at) : [];
}

function shedStop(dice: Dice, at: number): Entry {
  const scope = dice.of([
    { of: 'shed' },
    { of: 'row', row: 1 },
    { of: 'looms', loomIds: ['n2', 'n4'] },
  ] as const);
  const until = dice.next() < 0.5 ? at + dice.upTo(60) * MINUTE : undefined;
  return entry('shed-stop', {
    cause: 'power',
    scope: scope.of === 'looms' ? { of: 'looms', loomIds: [...scope.loomIds] } : scope,
    at,
    ...(until === undefined ? {} : { until }),
  });
}

function callOf(dice: Dice, stops: readonly Entry[], loomId: string, at: number): Entry[] {
  const stop = stops.slice(-5).find((one) => one.kind === 'standing');
  const of = stop?.kind === 'standing' ? { loomId: stop.loomId, targetId: stop.id } : { loomId };
  const call = entry('call', { ...of, at });
  const attend = (step: 'take' | 'arrive', later: number) =>
    entry('attend', { who: 'tackler', loomId: of.loomId, targetId: call.id, step, at: at + later });
  return [call, attend('take', MINUTE), attend('arrive', (2 + dice.upTo(10)) * MINUTE)];
}

function correction(dice: Dice, history: readonly Entry[], at: number): Entry[] {
  const target = history.length > 0 ? dice.of(history.slice(-30)) : null;
  if (!target || ['close', 'reopen', 'accept', 'refuse'].includes(target.kind)) return [];
  const reason = 'Put right';
  if (target.batchId !== undefined && dice.next() < 0.5)
    return [entry('void', { targetBatchId: target.batchId, reason, at })];
  if (target.kind === 'void' || target.kind === 'amend' || dice.next() < 0.3)
    return [entry('void', { targetId: target.id, reason, at })];
  const earlier = history.filter((one) => one.kind === 'amend' && one.targetId === target.id);
  const basedOn = earlier.length > 0 && dice.next() < 0.6 ? { basedOn: dice.of(earlier).id } : {};
  const changes = [
    { count: 1 + dice.upTo(5) },
    { at: target.at + (dice.upTo(600) - 300) * MINUTE },
    { loomId: dice.of(LOOMS) },
    { cause: dice.of(CAUSES) },
    { value: 1_000 + dice.upTo(3_000) },
    { until: target.at + dice.upTo(700) * MINUTE },
  ];
  const change = dice.of(changes);
  if (change.at !== undefined && (change.at < MONDAY || change.at > MONDAY + 27 * HOUR)) return [];
  return [entry('amend', { targetId: target.id, ...basedOn, reason, change, at })];
}

function decision(dice: Dice, history: readonly Entry[], shiftAt: number, at: number): Entry[] {
  const shiftKey = SHIFTS[Math.max(0, shiftAt - 1)] ?? EARLY;
  const chance = dice.next();
  if (shiftAt > 0 && chance < 0.45) return [entry('close', { who: 'foreman', shiftKey, at })];
  if (shiftAt > 0 && chance < 0.55)
    return [entry('reopen', { who: 'foreman', shiftKey, reason: 'More came', at })];
  if (history.length === 0) return [];
  const targetId = dice.of(history.slice(-40)).id;
  return [
    entry(chance < 0.85 ? 'accept' : 'refuse', { who: 'foreman', targetId, reason: 'Asked around', at }),
  ];
}
