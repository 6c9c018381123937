import type { Response } from 'express';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { Feed, FeedListener } from './feed.js';

/**
 * Writes the live feed to a response until one of both ends it. A comment now and then keeps proxies from closing a
 * quiet stream, and shows a listener that it is alive.
 */
export function streamFeed(
  feed: Feed,
  response: Response,
  who: Pick<FeedListener, 'shedIds' | 'sessionId' | 'deviceId'>,
  seqNow: number,
): void {
  response.writeHead(200, {
    'Content-Type': 'text/event-stream',
    'Cache-Control': 'no-store, no-transform',
    'X-Accel-Buffering': 'no',
  });
  const send = (seq: number) => response.write(`event: changed\ndata: ${JSON.stringify({ seq })}\n\n`);
  const alive = setInterval(() => response.write(': still here\n\n'), LIMITS.feedComment);
  const leave = feed.listen({
    ...who,
    send,
    close: () => {
      clearInterval(alive);
      response.end();
    },
  });
  response.on('close', () => {
    clearInterval(alive);
    leave();
  });
  // Whatever changed between the last pull and this listening is not announced again.
  send(seqNow);
}
