import 'fake-indexeddb/auto';
import { TestBed } from '@angular/core/testing';
import type { Reference } from '@shared/contract/reference';
import { aLoomVersion, aShift, someCauses } from '@shared/testing/builders';
import { API } from '../core/api-paths';
import { SessionStore } from '../core/session-store';
import { aPull } from '../testing/entry-builders';
import { aSession, json, StubServer } from '../testing/stub-server';
import { WatchedFactory } from '../testing/watched-factory';
import { OfflineBook } from './offline-book';
import { OfflineParts } from './offline-parts';
import { ShedBook } from './shed-book';

const now = Date.now();
const long = now - 400 * 86_400_000;
const shift = aShift({ startsAt: now - 3_600_000, endsAt: now + 3_600_000 });
const reference: Reference = {
  mill: { name: 'Test', timeZone: 'UTC', units: 'metric' },
  sheds: [{ id: 'shed-1', name: 'North' }],
  looms: ['loom-1', 'loom-2'].map((id, i) => ({
    id,
    shedId: 'shed-1',
    number: i + 1,
    row: 1,
    position: i + 1,
    alley: 'A',
    from: long,
    until: null,
  })),
  loomVersions: ['loom-1', 'loom-2'].map((loomId) => aLoomVersion({ loomId, effectiveAt: long })),
  cloths: [],
  clothVersions: [],
  warps: [],
  causeVersions: someCauses().map((cause) => ({ ...cause, effectiveAt: long })),
};

let book: OfflineBook;
let shed: ShedBook;

beforeEach(async () => {
  localStorage.clear();
  vi.stubGlobal('indexedDB', new WatchedFactory().factory);
  const server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
  server.on(API.refresh, () => json(aSession({ serverNow: Date.now() })));
  const whole = { snapshot: true, reference, shifts: [shift] };
  server.on(API.pull, () => json(aPull({ serverNow: Date.now(), ...whole })));
  TestBed.resetTestingModule();
  book = TestBed.inject(OfflineBook);
  shed = TestBed.inject(ShedBook);
  await TestBed.inject(SessionStore).start();
  await book.whenReady();
  await vi.waitFor(() => expect(book.currentShift()?.key).toBe(shift.key), { timeout: 3_000 });
});
afterEach(async () => {
  await TestBed.inject(OfflineParts).loop.stop();
  TestBed.resetTestingModule();
  vi.unstubAllGlobals();
});

describe('ShedBook', () => {
  it('knows who minds which loom, the latest word first', async () => {
    expect([...shed.weaversIn(shift)]).toEqual([]);
    const minds = { kind: 'assign', shiftKey: shift.key } as const;
    await book.log({ ...minds, weaverId: 'ada', loomIds: ['loom-1', 'loom-2'] });
    await book.log({ ...minds, weaverId: null, loomIds: ['loom-2'] });
    expect(Object.fromEntries(shed.weaversIn(shift))).toEqual({ 'loom-1': 'ada', 'loom-2': null });
  });

  it('knows a loom’s open call and how far it has come, until its stop ends', async () => {
    expect(shed.callOf('loom-1', shift)).toBeNull();
    const stop = await book.log({ kind: 'standing', loomId: 'loom-1', cause: 'picking' });
    const call = await book.log({ kind: 'call', loomId: 'loom-1', targetId: stop.id });
    expect(shed.callOf('loom-1', shift)).toMatchObject({ id: call.id, step: null, state: 'waiting' });
    expect(shed.callOf('loom-2', shift)).toBeNull();
    await book.log({ kind: 'attend', loomId: 'loom-1', targetId: call.id, step: 'arrive' });
    expect(shed.callOf('loom-1', shift)?.step).toBe('arrive');
    await book.log({ kind: 'resume', loomId: 'loom-1', targetId: stop.id });
    expect(shed.callOf('loom-1', shift)).toBeNull();
  });

  it('forgets a call that was taken back', async () => {
    const call = await book.log({ kind: 'call', loomId: 'loom-2' });
    expect(shed.callOf('loom-2', shift)?.id).toBe(call.id);
    await book.undo(call.id);
    expect(shed.callOf('loom-2', shift)).toBeNull();
  });
});
