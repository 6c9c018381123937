import { TestBed } from '@angular/core/testing';
import { LIMITS } from '@shared/contract/limits';
import { StopLog } from './stop-log';
import { loomsideBed } from './testing/loomside-bed';

describe('StopLog', () => {
  beforeEach(() => vi.useFakeTimers());
  afterEach(() => vi.useRealTimers());

  it('offers to take the last act back for ten seconds', async () => {
    const { book } = loomsideBed();
    const log = TestBed.inject(StopLog);
    await log.count(book.allLooms[0]!, 'warp-break');
    vi.advanceTimersByTime(LIMITS.undoWindow - 1);
    expect(log.lastAct()?.words).toContain('Warp break on loom 1');
    vi.advanceTimersByTime(1);
    expect(log.lastAct()).toBeNull();
  });

  it('takes back the last act alone', async () => {
    const { book } = loomsideBed();
    const log = TestBed.inject(StopLog);
    await log.count(book.allLooms[0]!, 'warp-break');
    await log.count(book.allLooms[1]!, 'weft-break');
    await log.undoLast();
    expect(book.logged.at(-1)).toMatchObject({ kind: 'void', targetId: book.logged[1]?.id });
    expect(book.lineOf('loom-1')?.stops).toHaveLength(1);
    expect(book.lineOf('loom-2')?.stops).toHaveLength(0);
  });

  it('keeps saying what failed until the next act on that loom', async () => {
    const { book } = loomsideBed();
    const log = TestBed.inject(StopLog);
    book.failure = new Error('gone');
    await log.count(book.allLooms[0]!, 'warp-break');
    vi.advanceTimersByTime(60_000);
    expect(log.cardActs().get('loom-1')).toMatchObject({ state: 'failed' });
    expect(log.cardActs().get('loom-1')?.sentence).toMatch(/^Not saved: /);
    expect(log.lastAct()).toBeNull();
  });

  it('ends every stop that is open on the loom', async () => {
    const { book } = loomsideBed();
    await book.log({ kind: 'standing', loomId: 'loom-1', cause: 'warp-break' });
    await book.log({ kind: 'standing', loomId: 'loom-1', cause: 'picking' });
    const log = TestBed.inject(StopLog);
    const { LoomsideStore } = await import('./loomside-store');
    const view = TestBed.inject(LoomsideStore).set()[0]!;
    await log.run(view);
    expect(book.lineOf('loom-1')?.stops.every((stop) => stop.until !== null)).toBe(true);
    await log.undoLast();
    expect(book.lineOf('loom-1')?.stops.filter((stop) => stop.until === null)).toHaveLength(2);
  });
});
