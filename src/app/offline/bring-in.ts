import { Injectable, inject } from '@angular/core';
import { HOLDS, sentenceOf } from '@shared/contract/errors';
import { LIMITS } from '@shared/contract/limits';
import { bringInResponseSchema, type PushResult } from '@shared/contract/sync';
import * as z from 'zod/mini';
import { outcomeOf } from '../core/answer';
import { ApiClient } from '../core/api-client';
import { API } from '../core/api-paths';

const fileSchema = z.object({
  format: z.literal('shedbeat.waiting-entries.1'),
  entries: z.array(z.object({ entry: z.record(z.string(), z.unknown()) })),
});

/** How many, and of those that are not simply in the book how many why. */
export interface BroughtIn {
  readonly inBook: number;
  readonly others: readonly { readonly why: string; readonly count: number }[];
  /** Why it stopped before the end; what came before that is in the book. Null: it did not. */
  readonly stopped: string | null;
}

/** Hands in what another device exported. Safe to repeat: what the book has already stays as it is. */
@Injectable({ providedIn: 'root' })
export class BringIn {
  private readonly api = inject(ApiClient);

  /** Null: this is no such file. */
  async file(text: string): Promise<BroughtIn | null> {
    const entries = entriesIn(text);
    if (!entries) return null;
    const results: PushResult[] = [];
    for (let from = 0; from < entries.length; from += LIMITS.entriesPerPush) {
      const body = { entries: entries.slice(from, from + LIMITS.entriesPerPush) };
      const answer = await this.api.post(API.bringIn, bringInResponseSchema, body, { timeout: 60_000 });
      if (answer.kind !== 'ok') {
        const outcome = outcomeOf(answer);
        return summary(results, outcome.ok ? null : outcome.sentence);
      }
      results.push(...answer.body.results);
    }
    return summary(results, null);
  }
}

function entriesIn(text: string): Record<string, unknown>[] | null {
  try {
    const file = fileSchema.safeParse(JSON.parse(text));
    return file.success ? file.data.entries.map(({ entry }) => entry) : null;
  } catch {
    return null;
  }
}

function summary(results: readonly PushResult[], stopped: string | null): BroughtIn {
  const others = new Map<string, number>();
  for (const why of results.map(whyNot)) if (why !== null) others.set(why, (others.get(why) ?? 0) + 1);
  const inBook = results.filter((result) => whyNot(result) === null).length;
  return { inBook, others: [...others].map(([why, count]) => ({ why, count })), stopped };
}

function whyNot({ result, code, hold }: PushResult): string | null {
  if (hold) return HOLDS[hold];
  if (result === 'refused') return sentenceOf(code ?? 'entry-malformed');
  if (result === 'later')
    return 'The server is older than what made this entry. Bring the file in again after its upgrade.';
  return null;
}
