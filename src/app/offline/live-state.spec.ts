import { NOT_YET, type SyncStatus } from './book-events';
import { NO_FEED, liveStateOf, type FeedState } from './live-state';

const NOW = Date.UTC(2026, 10, 30, 10, 12);
const S = 1_000;
const status = (over: Partial<SyncStatus> = {}): SyncStatus => ({
  ...NOT_YET,
  reach: 'reached',
  lastReachedAt: NOW - 300 * S,
  ...over,
});
const feed = (over: Partial<FeedState> = {}): FeedState => ({
  open: true,
  heardAt: NOW - 12 * S,
  newsAt: NOW - 301 * S,
  ...over,
});

describe('liveStateOf', () => {
  it('is live while the stream is open and the last exchange went well, however long ago that was', () => {
    expect(liveStateOf(feed(), status(), NOW)).toEqual({ live: true, knownUntil: NOW - 12 * S });
  });

  it('holds what is shown until the stream was last heard, once it is broken', () => {
    const broken = liveStateOf(feed({ open: false }), status(), NOW);
    expect(broken).toEqual({ live: false, knownUntil: NOW - 12 * S });
  });

  it('does not believe a stream that has been silent for longer than three comments', () => {
    expect(liveStateOf(feed({ heardAt: NOW - 49 * S }), status(), NOW).live).toBe(true);
    expect(liveStateOf(feed({ heardAt: NOW - 50 * S }), status(), NOW)).toEqual({
      live: false,
      knownUntil: NOW - 50 * S,
    });
  });

  it('knows nothing later than the last exchange where news were announced and could not be fetched', () => {
    const behind = liveStateOf(feed({ newsAt: NOW - 20 * S }), status({ reach: 'offline' }), NOW);
    expect(behind).toEqual({ live: false, knownUntil: NOW - 300 * S });
  });

  it('is live without a stream only just after an exchange', () => {
    expect(liveStateOf(NO_FEED, status({ lastReachedAt: NOW - 14 * S }), NOW).live).toBe(true);
    expect(liveStateOf(NO_FEED, status({ lastReachedAt: NOW - 15 * S }), NOW).live).toBe(false);
  });

  it('is not live when the server cannot be reached or says no, even with the stream open', () => {
    for (const reach of ['offline', 'refused'] as const)
      expect(liveStateOf(feed(), status({ reach, lastReachedAt: NOW }), NOW).live).toBe(false);
  });

  it('knows nothing where the book was never reached', () => {
    const never = liveStateOf(feed(), status({ lastReachedAt: null, reach: 'unknown' }), NOW);
    expect(never).toEqual({ live: false, knownUntil: null });
  });
});
