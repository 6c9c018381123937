import type { Shift } from '../../shared/contract/reference.js';
import type { Said } from './daybook.js';
import type { Mishaps } from './mishaps.js';
import type { Shed } from './shed.js';
import { MINUTE, clockShows, SECOND, type LoomState } from './weaving.js';
import { sure } from './sure.js';

/** The weavers take over: each puts their name to the set and reads the pick clocks. */
export function takeOver(shed: Shed, shift: Shift, mishaps: Mishaps): void {
  shed.crew.weavers.forEach((weaver, set) => {
    const looms = shed.looms.filter((loom) => loom.set === set);
    const at = shift.startsAt + Math.round(shed.random.between(20, 70) * SECOND);
    const batchId = shed.daybook.newBatchId(at);
    const say = (loom: LoomState, moment: number, said: Said): string =>
      shed.say(weaver, loom, moment, { ...said, batchId });
    say(sure(looms[0]), at, {
      kind: 'assign',
      at,
      shiftKey: shift.key,
      weaverId: weaver,
      loomIds: looms.map((loom) => loom.id),
    });
    looms.forEach((loom, i) => {
      if (mishaps.forgetsReading(shift.key, loom.number, 'start')) return;
      const read = at + (i + 1) * 9 * SECOND;
      say(loom, read, {
        kind: 'reading',
        loomId: loom.id,
        at: read,
        shiftKey: shift.key,
        boundary: 'start',
        value: mishaps.misread(shift.key, loom, 'start', clockShows(loom)),
      });
    });
  });
}

/** The weavers hand over at the shift's end: pick clocks read, perns counted from the baskets. */
export function handOver(shed: Shed, shift: Shift, mishaps: Mishaps): void {
  shed.crew.weavers.forEach((weaver, set) => {
    const looms = shed.looms.filter((loom) => loom.set === set);
    const first = shift.endsAt - Math.round(shed.random.between(80, 150) * SECOND);
    const batchId = shed.daybook.newBatchId(first);
    looms.forEach((loom, i) => {
      const at = first + i * 11 * SECOND;
      if (!mishaps.forgetsReading(shift.key, loom.number, 'end'))
        mishaps.keep(
          shift.key,
          loom,
          shed.say(weaver, loom, at, {
            kind: 'reading',
            batchId,
            loomId: loom.id,
            at,
            shiftKey: shift.key,
            boundary: 'end',
            value: mishaps.misread(shift.key, loom, 'end', clockShows(loom)),
          }),
        );
      shed.say(weaver, loom, at + 4 * SECOND, {
        kind: 'count',
        batchId,
        loomId: loom.id,
        at: at + 4 * SECOND,
        shiftKey: shift.key,
        cause: 'pern-change',
        total: loom.perns,
      });
      loom.perns = 0;
    });
  });
}

/** The foreman closes the shift some time after its end. */
export function closeShift(shed: Shed, shift: Shift, foreman: string, note: string | null): number {
  const at = shift.endsAt + Math.round(shed.random.between(22, 45) * MINUTE);
  shed.daybook.log(
    foreman,
    'demo-office',
    at,
    { kind: 'close', at, shiftKey: shift.key, ...(note ? { note } : {}) },
    at + SECOND,
  );
  return at;
}
