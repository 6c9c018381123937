import { TestBed } from '@angular/core/testing';
import { SwUpdate, type UnrecoverableStateEvent, type VersionEvent } from '@angular/service-worker';
import { Subject } from 'rxjs';
import { AppUpdate } from './app-update';

const READY = {
  type: 'VERSION_READY',
  currentVersion: { hash: 'a' },
  latestVersion: { hash: 'b' },
} as const;

/** Stands for the browser's service worker. */
class Worker {
  readonly isEnabled = true;
  readonly versionUpdates = new Subject<VersionEvent>();
  readonly unrecoverable = new Subject<UnrecoverableStateEvent>();
  readonly steps: string[] = [];
  activateUpdate(): Promise<boolean> {
    this.steps.push('activated');
    return Promise.resolve(true);
  }
  checkForUpdate(): Promise<boolean> {
    this.steps.push('asked');
    return Promise.reject(new Error('no network'));
  }
}

function bed() {
  const worker = new Worker();
  TestBed.configureTestingModule({ providers: [{ provide: SwUpdate, useValue: worker }] });
  const update = TestBed.inject(AppUpdate);
  vi.spyOn(update, 'reload').mockImplementation(() => worker.steps.push('loaded again'));
  return { worker, update };
}

const tap = () => document.dispatchEvent(new Event('pointerdown'));

describe('AppUpdate', () => {
  beforeEach(() => vi.useFakeTimers());
  afterEach(() => vi.useRealTimers());

  it('offers a new version only when nobody has touched anything for a while, and forces nothing', () => {
    const { worker, update } = bed();
    worker.versionUpdates.next(READY);
    expect(update.offered()).toBe(false);
    for (let taps = 0; taps < 20; taps++) {
      tap();
      vi.advanceTimersByTime(3_000);
    }
    expect(update.offered()).toBe(false);
    vi.advanceTimersByTime(2_000);
    expect(update.offered()).toBe(true);
    vi.advanceTimersByTime(60_000);
    expect(worker.steps).toEqual([]);
  });

  it('activates before it loads the page again, once the person says so', async () => {
    const { worker, update } = bed();
    await update.update();
    expect(worker.steps).toEqual(['activated', 'loaded again']);
  });

  it('takes no for an answer, and offers it again hours later', () => {
    const { worker, update } = bed();
    worker.versionUpdates.next(READY);
    vi.advanceTimersByTime(5_000);
    update.later();
    expect(update.offered()).toBe(false);
    vi.advanceTimersByTime(4 * 3_600_000);
    expect(update.offered()).toBe(true);
  });

  it('asks now and then, and minds no missing network', async () => {
    const { worker } = bed();
    await vi.advanceTimersByTimeAsync(30 * 60_000);
    expect(worker.steps).toEqual(['asked']);
  });

  it('tells when this version cannot be loaded whole any more', () => {
    const { worker, update } = bed();
    worker.unrecoverable.next({ type: 'UNRECOVERABLE_STATE', reason: 'gone' });
    expect(update.broken()).toBe(true);
    expect(worker.steps).toEqual([]);
  });
});
