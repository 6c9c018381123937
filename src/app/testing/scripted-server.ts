import { ERRORS, type ErrorCode } from '@shared/contract/errors';
import type { PullResponse, PushRequest, PushResponse, PushResult } from '@shared/contract/sync';
import type { Answer } from '../core/answer';
import type { SyncApi } from '../offline/sync-ports';
import { aPull, MORNING } from './entry-builders';

export const OFFLINE: Answer<never> = { kind: 'offline', why: 'no-network' };

export function problem(code: ErrorCode, retryAfter: number | null = null): Answer<never> {
  const status = ERRORS[code][0];
  return {
    kind: 'problem',
    status,
    code,
    retryAfter,
    problem: { type: 'about:blank', title: code, status, code },
  };
}

type Word = Pick<PushResult, 'result'> & Partial<PushResult>;

/** A server that says what a spec wants, and otherwise takes everything and has nothing new. */
export class ScriptedServer implements SyncApi {
  readonly pushes: PushRequest[] = [];
  readonly pulls: (string | null)[] = [];
  /** The mark that each pull named. */
  readonly seen: (string | null)[] = [];
  /** Answers before the usual one, used up in order. */
  readonly nextPushes: Answer<PushResponse>[] = [];
  readonly nextPulls: Answer<PullResponse>[] = [];
  /** The word on an entry. */
  word: (entry: Readonly<Record<string, unknown>>) => Word = () => ({ result: 'stored' });
  /** More entries in one push than this are too large. */
  largest = 500;

  push(request: PushRequest): Promise<Answer<PushResponse>> {
    this.pushes.push(request);
    const scripted = this.nextPushes.shift();
    if (scripted) return Promise.resolve(scripted);
    if (request.entries.length > this.largest) return Promise.resolve(problem('too-large'));
    const results = request.entries.map((entry, index) => ({
      id: String(entry['id']),
      index,
      ...this.word(entry),
    }));
    return Promise.resolve({ kind: 'ok', body: { serverNow: MORNING, offset: 0, results } });
  }

  pull(after: string | null, seen: string | null): Promise<Answer<PullResponse>> {
    this.pulls.push(after);
    this.seen.push(seen);
    return Promise.resolve(this.nextPulls.shift() ?? { kind: 'ok', body: aPull({ cursor: after ?? 'c.1' }) });
  }
}
