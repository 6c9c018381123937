import type { DemoMill } from './mill.js';
import { USUAL_SETS } from './people.js';
import type { Random } from './random.js';
import { sure } from './sure.js';

export const SECOND = 1_000;
export const MINUTE = 60 * SECOND;
export const HOUR = 60 * MINUTE;
export const DAY = 24 * HOUR;
export const WEEK = 7 * DAY;

/** Why a loom stops by itself. */
export type Trouble = 'pern' | 'warp' | 'weft' | 'cut' | 'fault' | 'warp-out';

/** A loom as it really is, which the book knows only through what people log. */
export interface LoomState {
  readonly id: string;
  readonly number: number;
  /** Which of the four sets. */
  readonly set: number;
  readonly bookPpm: number;
  /** Picks a millisecond: a little under the book speed. */
  readonly speed: number;
  readonly unit: number;
  readonly clockModulus: number;
  /** How troublesome the loom is by nature. */
  readonly temper: { warp: number; weft: number; fault: number };
  clothId: string;
  /** Picks since it was built; the pick clock shows these, rolled over. */
  picks: number;
  picksToPern: number;
  picksToCut: number;
  picksToWarpOut: number;
  running: boolean;
  /** While it runs: since when its picks are not yet added. */
  since: number;
  /** Stops a planned event from acting on a loom whose state has changed since. */
  turn: number;
  /** This shift's luck: gamma-mixed, so that breaks are over-dispersed. */
  luck: { warp: number; weft: number };
  /** Perns changed since the last hand-over. */
  perns: number;
}

/** Breaks per 10⁵ picks of an ordinary loom on an ordinary day, and minutes of running between the loom's own faults. */
const WARP_PER_1E5 = 4.4;
const WEFT_PER_1E5 = 3.6;
const MINUTES_BETWEEN_FAULTS = 2_100;
/** Gamma shape 5 on a mean of about 4 breaks a shift: dispersion near 1.8. */
const LUCK_SHAPE = 5;

export function newLooms(mill: DemoMill, random: Random): LoomState[] {
  return mill.looms.map((loom, i) => {
    const version = sure(mill.loomVersions[i]);
    const cloth = random.pick(mill.cloths);
    return {
      id: loom.id,
      number: loom.number,
      set: USUAL_SETS.findIndex((set) => set.includes(loom.number)),
      bookPpm: version.ppm,
      speed: (version.ppm * random.between(0.978, 0.998)) / MINUTE,
      unit: version.clock.unit,
      clockModulus: 10 ** version.clock.digits,
      temper: {
        warp: random.gammaOfMeanOne(14),
        weft: random.gammaOfMeanOne(14),
        fault: random.gammaOfMeanOne(6),
      },
      clothId: cloth.id,
      picks: random.whole(200_000, 9_000_000),
      picksToPern: random.between(50, 700),
      picksToCut: random.between(10_000, 150_000),
      picksToWarpOut: random.between(100_000, 2_400_000),
      running: false,
      since: 0,
      turn: 0,
      luck: { warp: 1, weft: 1 },
      perns: 0,
    };
  });
}

/** Two looms that really get worse, one that really improves; `weeksAgo` before now. */
export function drift(number: number, weeksAgo: number): { warp: number; weft: number; fault: number } {
  if (number === 11 && weeksAgo < 3) return { warp: 1, weft: 3, fault: 1.2 };
  if (number === 17 && weeksAgo < 5) {
    const share = Math.min(1, (5 - weeksAgo) / 3);
    return { warp: 1 + 1.8 * share, weft: 1, fault: 1 + share };
  }
  if (number === 5)
    return weeksAgo < 3 ? { warp: 0.7, weft: 1, fault: 0.7 } : { warp: 2, weft: 1, fault: 1.5 };
  return { warp: 1, weft: 1, fault: 1 };
}
/** These keep their cloth, so that what is seen is the loom. */
export const DRIFTING: readonly number[] = [5, 11, 17];

export function drawLuck(loom: LoomState, random: Random): void {
  loom.luck = { warp: random.gammaOfMeanOne(LUCK_SHAPE), weft: random.gammaOfMeanOne(LUCK_SHAPE) };
}

/** How long it will run from now, and what will stop it. */
export function nextTrouble(
  loom: LoomState,
  ends: number,
  weeksAgo: number,
  random: Random,
): { after: number; trouble: Trouble } {
  const worse = drift(loom.number, weeksAgo);
  const perMs = loom.speed / 1e5;
  const warp = WARP_PER_1E5 * (ends / 2_600) * loom.temper.warp * loom.luck.warp * worse.warp * perMs;
  const weft = WEFT_PER_1E5 * loom.temper.weft * loom.luck.weft * worse.weft * perMs;
  const fault = (loom.temper.fault * worse.fault) / (MINUTES_BETWEEN_FAULTS * MINUTE);
  const candidates: [number, Trouble][] = [
    [loom.picksToPern / loom.speed, 'pern'],
    [loom.picksToCut / loom.speed, 'cut'],
    [loom.picksToWarpOut / loom.speed, 'warp-out'],
    [random.exponential(1 / warp), 'warp'],
    [random.exponential(1 / weft), 'weft'],
    [random.exponential(1 / fault), 'fault'],
  ];
  let best = sure(candidates[0]);
  for (const candidate of candidates) if (candidate[0] < best[0]) best = candidate;
  return { after: Math.max(best[0], 1), trouble: best[1] };
}

/** Adds the picks woven since they were last added. */
export function weaveUntil(loom: LoomState, at: number): void {
  if (!loom.running) return;
  const woven = (at - loom.since) * loom.speed;
  loom.picks += woven;
  loom.picksToPern -= woven;
  loom.picksToCut -= woven;
  loom.picksToWarpOut -= woven;
  loom.since = at;
}

/** What its pick clock shows. */
export function clockShows(loom: LoomState): number {
  return Math.floor(loom.picks / loom.unit) % loom.clockModulus;
}
