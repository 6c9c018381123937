import type { Signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { combineLatest, map, Observable, of, scan, startWith, switchMap } from 'rxjs';
import type { ErrorCode } from '@shared/contract/errors';
import { type Answer, outcomeOf } from './answer';

/** What a report's screen shows. `value` outlives a failed or running request, so that nothing flickers away. */
export interface ReportLoad<T> {
  readonly state: 'loading' | 'ready' | 'offline' | 'not-permitted' | 'not-found' | 'failed';
  readonly value: T | null;
  /** For a state that is neither loading nor ready: what happened, what is safe, what to do. */
  readonly sentence: string;
}

/**
 * Asks for a report whenever its query changes or `again` speaks, and gives up the request before. A changed query
 * forgets the value, a repeated one keeps it on show. Call it where injection is possible.
 *
 * @param query null: nothing to ask yet
 */
export function reportLoad<Q, T>(
  query: Signal<Q | null>,
  again: Observable<unknown>,
  ask: (query: Q, signal: AbortSignal) => Promise<Answer<T>>,
): Signal<ReportLoad<T>> {
  const loads = combineLatest([toObservable(query), again.pipe(startWith(null))]).pipe(
    switchMap(([asked]) => (asked === null ? of(null) : answers(asked, ask))),
    scan(next<Q, T>, { asked: null as Q | null, load: LOADING as ReportLoad<T> }),
    map(({ load }) => load),
  );
  return toSignal(loads, { initialValue: LOADING });
}

const LOADING = { state: 'loading', value: null, sentence: '' } as const;

interface Asked<Q, T> {
  readonly asked: Q;
  /** Null: not there yet. */
  readonly answer: Answer<T> | null;
}

function answers<Q, T>(
  asked: Q,
  ask: (query: Q, signal: AbortSignal) => Promise<Answer<T>>,
): Observable<Asked<Q, T>> {
  return new Observable((subscriber) => {
    const given = new AbortController();
    subscriber.next({ asked, answer: null });
    ask(asked, given.signal).then(
      (answer) => {
        subscriber.next({ asked, answer });
        subscriber.complete();
      },
      (error: unknown) => subscriber.error(error),
    );
    return () => given.abort();
  });
}

function next<Q, T>(
  before: { asked: Q | null; load: ReportLoad<T> },
  now: Asked<Q, T> | null,
): { asked: Q | null; load: ReportLoad<T> } {
  if (!now) return { asked: null, load: LOADING };
  const kept = before.asked === now.asked ? before.load.value : null;
  if (!now.answer)
    return {
      asked: now.asked,
      load: kept === null ? LOADING : before.load,
    };
  return { asked: now.asked, load: loadOf(now.answer, kept) };
}

/** An answer as a state to show. */
export function loadOf<T>(answer: Answer<T>, kept: T | null): ReportLoad<T> {
  if (answer.kind === 'ok') return { state: 'ready', value: answer.body, sentence: '' };
  const outcome = outcomeOf(answer);
  const sentence = outcome.ok ? '' : outcome.sentence;
  if (answer.kind === 'offline') return { state: 'offline', value: kept, sentence };
  return { state: stateOf(answer.code), value: answer.status < 500 ? null : kept, sentence };
}

function stateOf(code: ErrorCode): ReportLoad<unknown>['state'] {
  switch (code) {
    case 'not-permitted':
    case 'other-shed':
      return 'not-permitted';
    case 'not-found':
      return 'not-found';
    default:
      return 'failed';
  }
}
