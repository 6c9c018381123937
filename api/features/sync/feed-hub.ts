import type { Feed, FeedListener } from './feed.js';

/** The hub of the live feed, in memory: whoever misses a word finds out at the next pull. */
export function createFeed(): Feed {
  const listeners = new Set<FeedListener>();
  return {
    announce: (shedId, seq) => {
      for (const each of listeners)
        if (shedId === null || each.shedIds === null || each.shedIds.includes(shedId)) each.send(seq);
    },
    listen: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    end: (of) => {
      for (const each of [...listeners]) {
        if (of?.sessionId !== undefined && of.sessionId !== each.sessionId) continue;
        if (of?.deviceId !== undefined && of.deviceId !== each.deviceId) continue;
        listeners.delete(each);
        each.close();
      }
    },
  };
}
