import * as z from 'zod/mini';
import { refSchema } from '../../../shared/contract/primitives.js';
import {
  bringInResponseSchema,
  cursorSchema,
  pullResponseSchema,
  pushRequestSchema,
  pushResponseSchema,
} from '../../../shared/contract/sync.js';
import { route, type Route } from '../route.js';
import { bringIn } from './bring-in.service.js';
import { streamFeed } from './feed-stream.js';
import { pull } from './pull.service.js';
import { push } from './push.service.js';
import { scopeOf } from './scope.js';

const shedQuery = { shedId: z.optional(refSchema) };

export const syncRoutes: Route[] = [
  route({
    method: 'post',
    path: '/sync/entries',
    permission: 'entries.push',
    summary:
      'Hands in up to 500 entries; each has its own result, and one bad entry never blocks its neighbours.',
    // Entries are looked at one by one; their number has a code of its own.
    body: z.object({ ...pushRequestSchema.shape, entries: z.array(z.unknown()) }),
    answer: pushResponseSchema,
    errors: ['too-many-entries', 'too-large', 'busy', 'disk-full', 'closing-down'],
    handle: ({ deps, principal, body }) => push(deps, principal, body),
  }),
  route({
    method: 'post',
    path: '/sync/bring-in',
    permission: 'entries.bring-in',
    summary:
      'Hands in up to 500 entries from a file that a device exported; each is judged by its own author’s rights.',
    body: z.object({ entries: z.array(z.unknown()) }),
    answer: bringInResponseSchema,
    errors: ['too-many-entries', 'too-large', 'busy', 'disk-full', 'closing-down'],
    handle: ({ deps, principal, body }) => bringIn(deps, principal, body.entries),
  }),
  route({
    method: 'get',
    path: '/sync/changes',
    permission: 'changes.read',
    summary: 'What changed in the book after a cursor, or (snapshot) the whole that a device needs.',
    query: z.object({ after: z.optional(cursorSchema), seen: z.optional(cursorSchema), ...shedQuery }),
    answer: pullResponseSchema,
    errors: ['other-shed'],
    handle: async ({ deps, principal, query }) =>
      pull(deps.reads, {
        scope: await scopeOf(deps.reads, principal, query.shedId),
        deviceId: principal.device?.id ?? null,
        after: query.after,
        seen: query.seen,
        epoch: deps.epoch,
        now: deps.now(),
      }),
  }),
  route({
    method: 'get',
    path: '/sync/feed',
    permission: 'changes.read',
    summary:
      'Live feed (text/event-stream): `event: changed`, `data: {"seq": N}` says that there is something after N.',
    query: z.object(shedQuery),
    errors: ['other-shed'],
    handle: async ({ deps, principal, query, response }) => {
      const { shedId } = await scopeOf(deps.reads, principal, query.shedId);
      const [last] = await deps.reads.query<{ seq: number | null }[]>(
        `SELECT MAX("seq") AS "seq" FROM "change"`,
      );
      streamFeed(
        deps.feed,
        response,
        {
          shedIds: shedId === null ? [] : [shedId],
          sessionId: principal.person?.sessionId ?? null,
          deviceId: principal.device?.id ?? null,
        },
        last?.seq ?? 0,
      );
      return undefined;
    },
  }),
];
