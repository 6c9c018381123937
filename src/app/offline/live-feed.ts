import { feedEventSchema } from '@shared/contract/sync';
import { LIMITS } from '@shared/contract/limits';
import { createParser } from 'eventsource-parser';
import { Observable, defer, retry, timer, type SchedulerLike } from 'rxjs';
import type { Fetch } from '../core/exchange';
import { backOff } from './back-off';

export interface LiveFeedPorts {
  readonly fetch: Fetch;
  readonly url: string;
  readonly token: () => string | null;
  /** Gets a new token after a 401. */
  readonly renew: () => Promise<boolean>;
  readonly random: () => number;
  /** The stream is open: something may have happened before. */
  readonly opened?: () => void;
  /** It said something, be it a comment. */
  readonly heard?: () => void;
  /** It ended, or was hung up. */
  readonly lost?: () => void;
  readonly scheduler?: SchedulerLike;
}

/** Silence for longer than a few comments means a dead connection that nobody closed. */
const SILENCE = LIMITS.feedComment * 3;

/**
 * The server's "there is something after N" as a stream of N. It never completes and never fails: a broken, refused
 * or silent stream is opened again after a back-off. Nothing depends on it but how soon news arrive.
 */
export function liveFeed(ports: LiveFeedPorts): Observable<number> {
  return defer(() => connection(ports)).pipe(
    retry({
      resetOnSuccess: true,
      delay: (_error, failures) =>
        timer(backOff(failures, { why: 'offline', retryAfter: null }, ports.random()), ports.scheduler),
    }),
  );
}

function connection(ports: LiveFeedPorts): Observable<number> {
  return new Observable<number>((subscriber) => {
    const ending = new AbortController();
    let silence: ReturnType<typeof setTimeout> | undefined;
    const heard = (): void => {
      clearTimeout(silence);
      silence = setTimeout(() => ending.abort(), SILENCE);
    };
    const parser = createParser({
      onEvent: (event) => {
        if (event.event !== 'changed') return;
        const seq = seqOf(event.data);
        if (seq !== null) subscriber.next(seq);
      },
    });
    const read = async (): Promise<void> => {
      heard();
      const response = await open(ports, ending.signal);
      ports.heard?.();
      ports.opened?.();
      const reader = response.body?.pipeThrough(new TextDecoderStream()).getReader();
      for (let part = await reader?.read(); part && !part.done; part = await reader?.read()) {
        heard();
        ports.heard?.();
        parser.feed(part.value);
      }
    };
    read().then(
      () => subscriber.error(new Error('The live feed ended.')),
      (error: unknown) => subscriber.error(error),
    );
    return () => {
      clearTimeout(silence);
      ending.abort();
      ports.lost?.();
    };
  });
}

async function open(ports: LiveFeedPorts, signal: AbortSignal): Promise<Response> {
  const ask = (): Promise<Response> => {
    const token = ports.token();
    return ports.fetch(ports.url, {
      headers: {
        accept: 'text/event-stream',
        'ngsw-bypass': 'true',
        ...(token && { authorization: `Bearer ${token}` }),
      },
      credentials: 'same-origin',
      cache: 'no-store',
      signal,
    });
  };
  let response = await ask();
  if (response.status === 401 && (await ports.renew())) response = await ask();
  if (!response.ok || !response.headers.get('content-type')?.startsWith('text/event-stream'))
    throw new Error(`The live feed was refused: ${response.status}.`);
  return response;
}

function seqOf(data: string): number | null {
  try {
    const parsed = feedEventSchema.safeParse(JSON.parse(data));
    return parsed.success ? parsed.data.seq : null;
  } catch {
    return null;
  }
}
