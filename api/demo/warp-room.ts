import type { Shed } from './shed.js';
import { MINUTE, SECOND, type LoomState } from './weaving.js';
import { sure } from './sure.js';

/** A new beam for a cloth, and how many picks it gives. */
function newWarp(shed: Shed, clothId: string): { warpId: string; picks: number; lengthM: number } {
  const cloth = sure(shed.mill.clothVersions.find((version) => version.clothId === clothId));
  const number = 2_301 + shed.warps.length;
  const lengthM = shed.random.whole(22, 34) * 50;
  const thrumM = 3;
  const warpId = `warp-${number}`;
  shed.warps.push({ id: warpId, name: `W ${number}`, clothId, lengthM, thrumM });
  return {
    warpId,
    lengthM,
    picks: ((lengthM - thrumM) / (1 + cloth.crimp)) * cloth.picksPerCmLoomState * 100,
  };
}

/** What is on each loom when the book begins, part of it woven. */
export function findWarps(shed: Shed, foreman: string, at: number): void {
  for (const loom of shed.looms) {
    const { warpId, picks, lengthM } = newWarp(shed, loom.clothId);
    const left = shed.random.between(0.15, 1);
    loom.picksToWarpOut = picks * left;
    shed.say(foreman, loom, at, {
      kind: 'warp-change',
      loomId: loom.id,
      at,
      how: 'as-found',
      warpId,
      clothId: loom.clothId,
      // What is left on the beam is what counts from here.
      lengthM: Math.round(lengthM * left),
    });
  }
}

/**
 * The warp is out: sometimes the next one is not there yet, then it is knotted to the old (same cloth) or gaited
 * (another cloth). Answers when the weaver is free.
 */
export function changeWarp(
  shed: Shed,
  loom: LoomState,
  weaver: string,
  at: number,
  mayChangeCloth: boolean,
): number {
  const { random, agenda } = shed;
  const gaiting = mayChangeCloth && random.chance(0.35);
  const wait = random.chance(0.3) ? random.duration(25 * MINUTE, 0.6) : 0;
  if (wait > 0) {
    const waiting = shed.say(weaver, loom, at, {
      kind: 'standing',
      loomId: loom.id,
      at: Math.round(at),
      cause: 'wait-warp',
    });
    agenda.schedule(at + wait, (then) => {
      shed.say(shed.crew.tackler, loom, then, {
        kind: 'resume',
        loomId: loom.id,
        at: Math.round(then),
        targetId: waiting,
      });
    });
  }
  agenda.schedule(at + wait + 1, (then) => {
    const { tackler } = shed.crew;
    const stopId = shed.say(tackler, loom, then, {
      kind: 'standing',
      loomId: loom.id,
      at: Math.round(then),
      cause: gaiting ? 'gaiting' : 'knotting',
    });
    const length = gaiting ? random.duration(200 * MINUTE, 0.2) : random.duration(75 * MINUTE, 0.25);
    agenda.schedule(then + length, (ready) => {
      if (gaiting) loom.clothId = random.pick(shed.mill.cloths).id;
      const { warpId, picks } = newWarp(shed, loom.clothId);
      loom.picksToWarpOut = picks;
      const by = shed.crew.tackler;
      shed.say(by, loom, ready, {
        kind: 'warp-change',
        loomId: loom.id,
        at: Math.round(ready),
        how: gaiting ? 'gaiting' : 'knotting',
        warpId,
        clothId: loom.clothId,
        thrumM: 3,
        sizeSet: `S ${410 + Math.floor(shed.warps.length / 4)}`,
        weftLot: `L ${70 + Math.floor(shed.warps.length / 9)}`,
      });
      shed.resume(loom, by, stopId, ready);
    });
  });
  return at + 60 * SECOND;
}
