import 'fake-indexeddb/auto';
import { TestBed, type ComponentFixture } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { Reference } from '@shared/contract/reference';
import { permissionsOf, type Role } from '@shared/contract/roles';
import type { PullResponse } from '@shared/contract/sync';
import { aClothVersion, aFitting, aLoomVersion, aShift, someCauses } from '@shared/testing/builders';
import { API } from '../../core/api-paths';
import { SessionStore } from '../../core/session-store';
import { OfflineBook } from '../../offline/offline-book';
import { OfflineParts } from '../../offline/offline-parts';
import { aPull, anUnnumbered, pulled } from '../../testing/entry-builders';
import { ADA, aSession, json, StubServer } from '../../testing/stub-server';
import { WatchedFactory } from '../../testing/watched-factory';
import { provideIcons } from '../../ui/icons';
import { FloorPage } from './floor-page';
import { FloorStore } from './floor-store';

const MINUTE = 60_000;
const now = Date.now();
const long = now - 400 * 86_400_000;
const IDS = ['loom-1', 'loom-2', 'loom-3', 'loom-4'];
const shift = aShift({ startsAt: now - 60 * MINUTE, endsAt: now + 60 * MINUTE });
const reference: Reference = {
  mill: { name: 'Test', timeZone: 'UTC', units: 'metric' },
  sheds: [{ id: 'shed-1', name: 'North' }],
  looms: IDS.map((id, i) => ({
    id,
    shedId: 'shed-1',
    number: i + 1,
    row: i < 2 ? 1 : 2,
    position: (i % 2) + 1,
    alley: 'A',
    from: long,
    until: null,
  })),
  loomVersions: IDS.map((loomId) => aLoomVersion({ id: `${loomId}.1`, loomId, effectiveAt: long })),
  cloths: [{ id: 'cloth-1', name: 'Glebe 42' }],
  clothVersions: [aClothVersion({ effectiveAt: long })],
  warps: [],
  causeVersions: someCauses().map((cause) => ({ ...cause, effectiveAt: long })),
};
const fittings = IDS.map((loomId) => aFitting({ id: `fitting-${loomId}`, loomId, effectiveAt: long }));
const people = [
  { id: 'wanda', worksNumber: '1', name: 'Wanda Hale', shortName: 'Wanda', roles: [], usualSet: [] },
];
const WHOLE: Partial<PullResponse> = { snapshot: true, reference, people, fittings, shifts: [shift] };
let seq = 0;
const entry = (draft: Parameters<typeof anUnnumbered>[0], minutesAgo: number) => ({
  ...anUnnumbered({ ...draft, at: now - minutesAgo * MINUTE }, { now: now - minutesAgo * MINUTE }),
  deviceSeq: ++seq,
});
const stands = (loomId: string, cause: string, minutesAgo: number) => {
  const one = entry({ kind: 'standing', loomId, cause } as never, minutesAgo);
  return pulled(one as never, { at: now - minutesAgo * MINUTE, shiftKey: shift.key });
};

let server: StubServer;
let pulls: Partial<PullResponse>[];
let fixture: ComponentFixture<FloorPage>;

async function openFloor(role: Role): Promise<void> {
  const person = { ...ADA, roles: [role], permissions: [...permissionsOf([role])] };
  server.on(API.refresh, () => json(aSession({ person, serverNow: Date.now() })));
  TestBed.configureTestingModule({ providers: [provideRouter([]), provideIcons()] });
  await TestBed.inject(SessionStore).start();
  fixture = TestBed.createComponent(FloorPage);
  await TestBed.inject(OfflineBook).whenReady();
}

const text = (): string => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');
const says = (words: string | RegExp): Promise<void> =>
  vi.waitFor(
    () => {
      fixture.detectChanges();
      expect(text()).toMatch(words);
    },
    { timeout: 5_000 },
  );
const tile = (loom: number): HTMLElement | null =>
  (fixture.nativeElement as HTMLElement).querySelector(`[data-loom="${loom}"]`);
const press = (name: RegExp): void => {
  const buttons = [...(fixture.nativeElement as HTMLElement).querySelectorAll('button')];
  buttons.find((button) => name.test(button.textContent.trim()))?.click();
};
/** The next pull brings these. */
const arrives = (pull: Partial<PullResponse>): void => {
  pulls.push(pull);
  TestBed.inject(OfflineBook).retryNow();
};

beforeEach(() => {
  localStorage.clear();
  vi.stubGlobal('indexedDB', new WatchedFactory().factory);
  server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
  pulls = [WHOLE];
  server.on(API.pull, () => json(aPull({ serverNow: Date.now(), ...pulls.shift() })));
  // A stream that stays open and says nothing.
  server.on(API.live, () => {
    const body = new ReadableStream<Uint8Array>({
      start: (stream) => stream.enqueue(new TextEncoder().encode(':\n\n')),
    });
    return new Response(body, { headers: { 'content-type': 'text/event-stream' } });
  });
});
afterEach(async () => {
  await TestBed.inject(OfflineParts).loop.stop();
  TestBed.resetTestingModule();
  vi.unstubAllGlobals();
  vi.useRealTimers();
});

describe('FloorPage', () => {
  it('shows the looms row by row with the alley between, live', async () => {
    await openFloor('foreman');
    await says(/4 of 4/);
    await says('Live');
    expect(text()).toContain('Alley A');
    const rows = [...(fixture.nativeElement as HTMLElement).querySelectorAll('section')];
    expect(rows.map((row) => row.getAttribute('aria-label'))).toEqual(['Row 1, Alley A', 'Row 2, Alley A']);
    expect(tile(1)?.getAttribute('aria-label')).toMatch(
      /^Loom 1 runs, efficiency at most 100\.0%\. Glebe 42/,
    );
  });

  it('turns a loom that stands to ink, as soon as its entry is here, and makes no other loom anew', async () => {
    // The clock stands within one of its steps: nothing changes but by the entry.
    vi.useFakeTimers({ toFake: ['Date'], now: Math.floor(now / 10_000 + 1) * 10_000 + 2_000 });
    await openFloor('foreman');
    await says(/4 of 4/);
    await says('Live');
    const store = fixture.debugElement.injector.get(FloorStore);
    const viewOf = (number: number) => store.looms().find((one) => one.loom.number === number);
    const before = { two: viewOf(2), three: viewOf(3) };
    arrives({ entries: [stands('loom-2', 'warp-break', 4)] });
    await says(/3 of 4/);
    expect(tile(2)?.classList).toContain('stands');
    expect(tile(2)?.textContent).toContain('4 min');
    expect(tile(2)?.textContent).toContain('Warp break');
    expect(viewOf(2)).not.toBe(before.two);
    expect(viewOf(3)).toBe(before.three);
  });

  it('gives a planned stand the ground’s tone, not ink', async () => {
    pulls = [{ ...WHOLE, entries: [stands('loom-4', 'no-order', 30)] }];
    await openFloor('foreman');
    await says(/3 of 4 ?looms running, 1 planned stand/);
    expect(tile(4)?.classList).toContain('planned');
    expect(tile(4)?.classList).not.toContain('stands');
  });

  it('shows who minds a loom to the foreman, and to nobody on the floor', async () => {
    const minded = entry(
      { kind: 'assign', shiftKey: shift.key, weaverId: 'wanda', loomIds: ['loom-1'] } as never,
      50,
    );
    const entries = [pulled(minded as never, { shiftKey: shift.key })];
    pulls = [{ ...WHOLE, entries }];
    await openFloor('foreman');
    await says('Wanda');
    await TestBed.inject(OfflineParts).loop.stop();
    TestBed.resetTestingModule();
    vi.stubGlobal('indexedDB', new WatchedFactory().factory);
    pulls = [{ ...WHOLE, entries }];
    await openFloor('tackler');
    await says(/4 of 4/);
    expect(text()).not.toContain('Wanda');
    expect(tile(1)?.getAttribute('aria-label')).not.toContain('minded by');
  });

  it('says since when there are no news, once server and stream are gone', async () => {
    await openFloor('foreman');
    await says('Live');
    server.unplug();
    TestBed.inject(OfflineBook).retryNow();
    await says(/As of \d\d:\d\d No news since \d\d:\d\d/);
    expect(text()).toContain('4 of 4');
    expect(text()).not.toContain('Live');
  });

  it('counts nothing before the whole of the shed is here', async () => {
    let rest = (): void => undefined;
    const waits = new Promise<void>((resolve) => (rest = resolve));
    server.on(API.pull, async () => {
      if (pulls.length === 0) return json(aPull({ serverNow: Date.now() }));
      const pull = pulls.shift();
      if (!pull?.more) await waits;
      return json(aPull({ serverNow: Date.now(), ...pull }));
    });
    pulls = [
      { ...WHOLE, more: true },
      { entries: [stands('loom-1', 'smash', 10)], more: false },
    ];
    await openFloor('foreman');
    await says('Fetching the shed');
    await vi.waitFor(() => expect(TestBed.inject(OfflineBook).looms()).toHaveLength(4));
    fixture.detectChanges();
    expect(text()).toContain('Fetching the shed');
    expect(text()).not.toContain('of 4');
    rest();
    await says(/3 of 4/);
  });

  it('finds what stands, and says so where a filter finds nothing', async () => {
    pulls = [{ ...WHOLE, entries: [stands('loom-3', 'smash', 10)] }];
    await openFloor('foreman');
    await says(/3 of 4/);
    press(/^Standing now/);
    fixture.detectChanges();
    expect(tile(1)).toBeNull();
    expect(tile(3)).not.toBeNull();
    press(/^No stop for two hours/);
    fixture.detectChanges();
    expect(text()).toContain('The shift is not two hours old yet.');
    press(/^Show all looms/);
    fixture.detectChanges();
    expect(tile(1)).not.toBeNull();
  });

  it('says that no shift runs, and when the next one begins', async () => {
    const later = aShift({
      key: 'later',
      name: 'Late shift',
      startsAt: now + 90 * MINUTE,
      endsAt: now + 500 * MINUTE,
    });
    pulls = [{ ...WHOLE, shifts: [later] }];
    await openFloor('foreman');
    await says(/No shift runs now ?The next one, Late shift, begins/);
  });

  it('says that a shed without looms has none', async () => {
    pulls = [{ ...WHOLE, reference: { ...reference, looms: [] } }];
    await openFloor('manager');
    await says('This shed has no looms yet');
  });

  it('says what is safe where this device never reached the book', async () => {
    server.unplug();
    await openFloor('foreman');
    await says(/does not know the whole shed yet.*safe on its devices/);
  });

  it('is not for a weaver, whatever the address says', async () => {
    await openFloor('weaver');
    await says('Not for your role');
    expect(tile(1)).toBeNull();
  });
});
