import type { Reference } from '@shared/contract/reference';
import type { PulledEntry } from '@shared/contract/sync';
import type { Entry } from '@shared/entries/entry';
import {
  aClothVersion,
  aFitting,
  aLoomVersion,
  aShift,
  at,
  entryBuilder,
  LOOM_ID,
  SHED_ID,
  someCauses,
  WEAVER_ID,
} from '@shared/testing/builders';
import { aPull, pulled } from '../testing/entry-builders';
import { BookView } from './book-view';
import { newOutboxRecord, type OutboxRecord } from './records';

const loom = (id: string, number: number) => ({
  id,
  shedId: SHED_ID,
  number,
  row: 1,
  position: number,
  alley: 'A',
  from: at(-1000),
  until: null,
});
const reference: Reference = {
  mill: { name: 'Test', timeZone: 'UTC', units: 'metric' },
  sheds: [{ id: SHED_ID, name: 'North' }],
  looms: [loom(LOOM_ID, 1), loom('loom-2', 2), loom('loom-3', 3)],
  loomVersions: [aLoomVersion(), aLoomVersion({ loomId: 'loom-2' })],
  cloths: [],
  clothVersions: [aClothVersion()],
  warps: [],
  causeVersions: someCauses(),
};
const shift = aShift();

function setUp(offset = 0) {
  const view = new BookView(() => offset);
  view.load({ entries: [], shifts: [shift], fittings: [aFitting()], reference, people: [] }, []);
  const { entry } = entryBuilder();
  const outbox = (one: Entry, over: Partial<OutboxRecord> = {}) =>
    view.apply({ kind: 'outbox', records: [{ ...newOutboxRecord(one, one.at), ...over }], dismissed: [] });
  const pull = (...entries: PulledEntry[]) => view.apply({ kind: 'pulled', pull: aPull({ entries }) });
  const warpBreak = (minutes = 10) => entry('stop', minutes, { cause: 'warp-break', count: 1 });
  const stops = () => view.project(LOOM_ID, shift).stops.map((stop) => stop.id);
  return { view, entry, outbox, pull, warpBreak, stops };
}

describe('BookView: what counts', () => {
  it('counts what waits, at the provisional corrected moment', () => {
    const { view, outbox, warpBreak } = setUp(90_000);
    outbox(warpBreak());
    expect(view.project(LOOM_ID, shift).stops.map((stop) => stop.from)).toEqual([at(10) + 90_000]);
    expect(view.notSent(LOOM_ID)).toBe(1);
  });

  it('says of a shed stop that each loom waits, of Running after it and of taking that back its own loom alone', () => {
    const { view, entry, outbox } = setUp();
    const unsent = () => [LOOM_ID, 'loom-2', 'loom-3'].map((loomId) => view.notSent(loomId));
    const stop = entry('shed-stop', 20, {
      cause: 'power',
      scope: { of: 'looms', loomIds: [LOOM_ID, 'loom-2'] },
    });
    outbox(stop);
    expect(unsent()).toEqual([1, 1, 0]);
    const runs = entry('resume', 25, { loomId: 'loom-2', targetId: stop.id });
    outbox(runs);
    expect(unsent()).toEqual([1, 2, 0]);
    outbox(entry('void', 26, { targetId: runs.id }));
    expect(unsent()).toEqual([1, 3, 0]);
    outbox(entry('void', 27, { targetId: stop.id }));
    expect(unsent()).toEqual([2, 4, 0]);
  });

  it('takes the offset that the entry itself carries before the present one', () => {
    const { view, outbox, warpBreak } = setUp(90_000);
    outbox({ ...warpBreak(), clock: { offset: -30_000, measuredAt: at(0) } });
    expect(view.project(LOOM_ID, shift).stops.map((stop) => stop.from)).toEqual([at(10) - 30_000]);
  });

  it('counts `later`, and an acknowledged one at the moment that the server fixed, until it is pulled', () => {
    const { view, outbox, pull, warpBreak, stops } = setUp();
    const one = warpBreak();
    outbox(one, { state: 'later', rev: 2 });
    expect(stops()).toEqual([one.id]);
    outbox(one, { state: 'stored', rev: 3, at: at(12), shiftKey: shift.key });
    expect(view.project(LOOM_ID, shift).stops.map((stop) => stop.from)).toEqual([at(12)]);
    expect(view.notSent(LOOM_ID)).toBe(0);
    pull(pulled(one, { at: at(12), shiftKey: shift.key }));
    expect(view.outbox.size).toBe(0);
    expect(stops()).toEqual([one.id]);
  });

  it('does not count held and refused ones', () => {
    const { outbox, warpBreak, stops } = setUp();
    outbox(warpBreak(10), { state: 'held', rev: 2, hold: 'time-doubtful' });
    outbox(warpBreak(20), { state: 'refused', rev: 2, code: 'loom-unknown' });
    expect(stops()).toEqual([]);
  });

  it('leaves out a pulled entry in the shift for which it is held or refused, not elsewhere', () => {
    const { pull, warpBreak, stops } = setUp();
    const one = warpBreak();
    const hold = (shiftKey: string, state: 'held' | 'accepted' | 'refused') =>
      pulled(one, { shiftKey: shift.key, holds: [{ shiftKey, reason: 'shift-closed', state }] });
    for (const [named, state, counts] of [
      [shift.key, 'held', false],
      [shift.key, 'refused', false],
      [shift.key, 'accepted', true],
      ['*', 'held', false],
      ['another', 'held', true],
    ] as const) {
      pull(hold(named, state));
      expect(stops()).toEqual(counts ? [one.id] : []);
    }
  });

  it('takes back by a void that waits', () => {
    const { view, entry, outbox, pull, warpBreak, stops } = setUp();
    const one = warpBreak();
    pull(pulled(one, { shiftKey: shift.key }));
    const back = entry('void', 11, { targetId: one.id });
    expect(outbox(back).loomIds).toEqual(new Set([LOOM_ID]));
    expect(stops()).toEqual([]);
    expect(view.latestCorrection(one.id)).toBe(back.id);
    expect(view.ownOf(LOOM_ID, WEAVER_ID, shift.startsAt)).toMatchObject([{ id: one.id, voided: true }]);
  });

  it('takes a correction that comes before its target', () => {
    const { entry, pull, warpBreak, stops } = setUp();
    const one = warpBreak();
    pull(pulled(entry('void', 11, { targetId: one.id })));
    pull(pulled(one, { shiftKey: shift.key }));
    expect(stops()).toEqual([]);
  });

  it('takes a whole act back by its batch', () => {
    const { entry, outbox, warpBreak, stops } = setUp();
    const batchId = '019e8000-0000-7000-8000-0000000000aa';
    outbox({ ...warpBreak(), batchId });
    outbox({ ...entry('stop', 12, { cause: 'warp-break', count: 1, loomId: 'loom-2' }), batchId });
    expect(outbox(entry('void', 13, { targetBatchId: batchId })).loomIds).toEqual(
      new Set([LOOM_ID, 'loom-2']),
    );
    expect(stops()).toEqual([]);
  });
});

describe('BookView: where an entry stands', () => {
  it('says what the foreman decided', () => {
    const { view, pull, warpBreak } = setUp();
    const one = warpBreak();
    for (const [state, says] of [
      ['held', 'held'],
      ['refused', 'refused'],
      ['accepted', 'stored'],
    ] as const) {
      pull(pulled(one, { holds: [{ shiftKey: '*', reason: 'no-shift', state }] }));
      expect(view.stateOf(one.id)).toBe(says);
    }
  });
});

describe('BookView: what is touched', () => {
  it('touches the loom that is named, and both when a stop is moved', () => {
    const { view, entry, outbox, warpBreak, stops } = setUp();
    const one = warpBreak();
    expect(outbox(one)).toEqual({ loomIds: new Set([LOOM_ID]), all: false });
    const move = entry('amend', 11, { targetId: one.id, change: { loomId: 'loom-2' } });
    expect(outbox(move).loomIds).toEqual(new Set([LOOM_ID, 'loom-2']));
    expect(stops()).toEqual([]);
    expect(view.project('loom-2', shift).stops.map((stop) => stop.id)).toEqual([one.id]);
  });

  it('touches every loom of a row that stands', () => {
    const { entry, outbox } = setUp();
    const stop = entry('shed-stop', 20, { cause: 'power', scope: { of: 'row', row: 1 } });
    expect(outbox(stop).loomIds).toEqual(new Set([LOOM_ID, 'loom-2', 'loom-3']));
  });

  it('does not take an older record for the newer', () => {
    const { view, outbox, warpBreak } = setUp();
    const one = warpBreak();
    outbox(one, { state: 'held', rev: 2 });
    outbox(one, { state: 'waiting', rev: 1 });
    expect(view.outbox.get(one.id)?.state).toBe('held');
  });

  it('starts anew at a snapshot, but for what waits', () => {
    const { view, outbox, pull, warpBreak, stops } = setUp();
    pull(pulled(warpBreak(10), { shiftKey: shift.key }));
    const waiting = warpBreak(20);
    outbox(waiting);
    const { all } = view.apply({
      kind: 'pulled',
      pull: aPull({ snapshot: true, shifts: [shift], reference, fittings: [aFitting()] }),
    });
    expect(all).toBe(true);
    expect(stops()).toEqual([waiting.id]);
  });

  it('forgets a shift that is no more, and the fittings of a loom that has none any more', () => {
    const { view } = setUp();
    expect(view.project(LOOM_ID, shift).stretches[0]).toMatchObject({ clothId: aFitting().clothId });
    const { loomIds } = view.apply({ kind: 'pulled', pull: aPull({ fittingsOf: [LOOM_ID] }) });
    expect(loomIds).toEqual(new Set([LOOM_ID]));
    expect(view.project(LOOM_ID, shift).stretches[0]).toMatchObject({ clothId: null });
    const { all } = view.apply({ kind: 'pulled', pull: aPull({ goneShifts: [shift.key] }) });
    expect(all).toBe(true);
    expect(view.shiftAt(SHED_ID, at(10))).toBeNull();
  });
});

describe('BookView: who minds what', () => {
  it('lets the last assignment of each loom hold, in the order in which looms were taken', () => {
    const { view, entry, outbox } = setUp();
    outbox(entry('assign', 0, { weaverId: WEAVER_ID, loomIds: ['loom-3', LOOM_ID, 'loom-2'] }));
    outbox(entry('assign', 5, { weaverId: 'other', loomIds: [LOOM_ID] }));
    const minds = [...view.assignments(shift)].filter(([, { weaverId }]) => weaverId === WEAVER_ID);
    expect(minds.map(([loomId]) => loomId)).toEqual(['loom-3', 'loom-2']);
  });
});
