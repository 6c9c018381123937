import { sentenceOf, type ErrorCode, type Problem } from '@shared/contract/errors';

/**
 * What came of a request. `offline` is whatever proves that our server did not answer: no network, the service
 * worker's 504, a captive portal's HTML with status 200, a body that is not ours. Nothing is thrown.
 */
export type Answer<T> =
  | { readonly kind: 'ok'; readonly body: T }
  | {
      readonly kind: 'problem';
      readonly status: number;
      readonly code: ErrorCode;
      readonly problem: Problem;
      /** From `Retry-After`, ms; null: not said. */
      readonly retryAfter: number | null;
    }
  | {
      readonly kind: 'offline';
      readonly why: 'no-network' | 'service-worker' | 'not-our-server' | 'too-slow' | 'given-up';
    };

/** What a person's act came to: done, or a sentence that says why not. */
export type Outcome =
  | { readonly ok: true }
  | { readonly ok: false; readonly code: ErrorCode | 'offline' | OfflineCode; readonly sentence: string };

/** Ends that only the device itself can find. */
export type OfflineCode = 'unlock-unavailable' | 'unlock-unknown' | 'unlock-wrong' | 'unlock-wait';

export const DONE: Outcome = { ok: true };

export const NO_NETWORK_SENTENCE =
  'The book cannot be reached from here. What was logged is safe on this device; try again when there is a network.';

/** An answer as an outcome to show. */
export function outcomeOf(answer: Answer<unknown>): Outcome {
  switch (answer.kind) {
    case 'ok':
      return DONE;
    case 'problem':
      return {
        ok: false,
        code: answer.code,
        sentence: sentenceFor(answer.code, answer.retryAfter) ?? problemOf(answer.problem),
      };
    case 'offline':
      return { ok: false, code: 'offline', sentence: NO_NETWORK_SENTENCE };
  }
}

/** A sentence that says how long to wait, where the server does; null: the code's own will do. */
function sentenceFor(code: ErrorCode, retryAfter: number | null): string | null {
  if (code !== 'too-many-tries' || retryAfter === null) return null;
  const seconds = Math.ceil(retryAfter / 1000);
  return `Too many tries. Wait ${seconds < 60 ? `${seconds} s` : `${Math.ceil(seconds / 60)} min`}, then try again.`;
}

/** The sentence for a person: the code's own, with what exactly is wrong where the server says it. */
export function problemOf(problem: Problem): string {
  const marked = (problem.fields ?? []).map((field) => `${field.path}: ${field.message}`);
  return marked.length ? `${sentenceOf(problem.code)} (${marked.join('; ')})` : sentenceOf(problem.code);
}
