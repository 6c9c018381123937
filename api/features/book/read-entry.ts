import * as z from 'zod/mini';
import type { PushResult } from '../../../shared/contract/sync.js';
import { entrySchema, type Entry } from '../../../shared/entries/entry.js';
import { upgradeEntry } from '../../../shared/entries/upgrades.js';
import { canonicalJson } from './canonical-json.js';

export type ReadEntry = { readonly id: string | null } & (
  | { readonly result: 'read'; readonly entry: Entry; readonly body: string }
  | { readonly result: 'later' }
  | ({ readonly result: 'refused' } & Pick<PushResult, 'code' | 'detail'>)
);

/** Reads an entry as sent, whatever it is: never throws. `body` is what was sent, in canonical form. */
export function readEntry(raw: unknown): ReadEntry {
  if (typeof raw !== 'object' || raw === null || Array.isArray(raw))
    return { id: null, result: 'refused', code: 'entry-malformed', detail: 'An entry is an object.' };
  const sent = raw as Readonly<Record<string, unknown>>;
  const id = typeof sent['id'] === 'string' ? sent['id'] : null;
  const upgraded = upgradeEntry(sent);
  if (upgraded.is === 'later') return { id, result: 'later' };
  if (upgraded.is === 'too-old') return { id, result: 'refused', code: 'schema-too-old' };
  if (upgraded.is === 'unversioned')
    return { id, result: 'refused', code: 'entry-malformed', detail: 'schema: a whole number from 1' };
  const parsed = z.safeParse(entrySchema, upgraded.entry);
  if (!parsed.success)
    return { id, result: 'refused', code: 'entry-malformed', detail: whatIsWrong(parsed.error.issues) };
  return { id, result: 'read', entry: parsed.data, body: canonicalJson(sent) };
}

function whatIsWrong(issues: readonly z.core.$ZodIssue[]): string {
  return issues
    .slice(0, 5)
    .map((issue) => `${issue.path.join('.') || 'entry'}: ${issue.message}`)
    .join('; ');
}
