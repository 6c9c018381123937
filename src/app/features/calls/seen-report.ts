import { computed, effect, inject, signal, untracked, type Signal } from '@angular/core';
import type * as z from 'zod/mini';
import { outcomeOf } from '../../core/answer';
import { ApiClient } from '../../core/api-client';
import { LastSeen } from '../../offline/last-seen';

export interface SeenReport<T> {
  readonly value: Signal<T | null>;
  /** When the value came from the server, corrected, where it is not fresh; null: it is, or there is none. */
  readonly seenAt: Signal<number | null>;
  readonly loading: Signal<boolean>;
  /** Why there is nothing newer; empty: there is. */
  readonly sentence: Signal<string>;
  /** Asks again. */
  again(): void;
}

/**
 * A report that is kept on this device as it was last seen: shown at once with its moment, then anew from the server
 * where it can be reached. Call it where injection is possible.
 *
 * @param path what is asked, with its query; null: nothing yet
 */
export function seenReport<S extends z.ZodMiniType>(
  path: Signal<string | null>,
  schema: S,
): SeenReport<z.infer<S>> {
  const api = inject(ApiClient);
  const seen = inject(LastSeen);
  const value = signal<z.infer<S> | null>(null);
  const seenAt = signal<number | null>(null);
  const loading = signal(true);
  const sentence = signal('');
  const asked = signal(0);
  let given: AbortController | null = null;
  let last: string | null = null;

  const load = async (from: string, signal: AbortSignal): Promise<void> => {
    loading.set(true);
    const known = await seen.get(from, (raw) => {
      const read = schema.safeParse(raw);
      return read.success ? read.data : null;
    });
    if (signal.aborted) return;
    if (known) {
      value.set(known.value);
      seenAt.set(known.at);
    }
    const answer = await api.get(from, schema, {}, { signal });
    if (signal.aborted) return;
    loading.set(false);
    if (answer.kind === 'ok') {
      value.set(answer.body);
      seenAt.set(null);
      sentence.set('');
      await seen.keep(from, answer.body);
    } else {
      const outcome = outcomeOf(answer);
      sentence.set(outcome.ok ? '' : outcome.sentence);
    }
  };
  effect((onCleanup) => {
    const from = path();
    asked();
    untracked(() => {
      given?.abort();
      given = new AbortController();
      // Another loom's report must not stand under this one's name.
      if (from !== last) value.set(null);
      last = from;
      if (from !== null) void load(from, given.signal);
    });
    onCleanup(() => given?.abort());
  });
  return {
    value: value.asReadonly(),
    seenAt: seenAt.asReadonly(),
    loading: computed(() => loading() && value() === null),
    sentence: sentence.asReadonly(),
    again: () => asked.update((n) => n + 1),
  };
}
