import { permissionsOf, type Role } from '../../shared/contract/roles.js';
import { AlleyRow } from '../database/entities/index.js';
import type { Deps } from '../deps.js';
import { list } from '../features/book/bulk.js';
import type { Delivery, PushAddress } from './push-carrier.js';
import { vapidKeys } from './vapid-keys.js';

type TellerDeps = Pick<Deps, 'reads' | 'writer' | 'settings' | 'feed' | 'push' | 'log' | 'now'>;

interface CallRecord {
  id: string;
  shedId: string;
  at: number;
  by: string;
  loomNumber: number;
  alley: string;
}

interface Listener extends PushAddress {
  personId: string;
  roles: string;
  shedIds: string;
}

export interface CallTeller {
  /** Resolves when whatever was announced so far has been told. */
  settled(): Promise<void>;
  stop(): void;
}

/** A call that came later than this (a tablet was without network) is on the page; nobody is woken for it. */
const NEWS = 30 * 60_000;

/**
 * Tells the tacklers' browsers of calls as they come into the book, whichever way: it listens to the live feed as a
 * tablet does. What is told is loom and alley; words and names stay in the book.
 */
export async function startCallTeller(deps: TellerDeps): Promise<CallTeller> {
  await vapidKeys(deps);
  let told = await lastChange(deps);
  let running = Promise.resolve();
  const tellFrom = async (seq: number): Promise<void> => {
    const after = told;
    if (seq <= after) return;
    told = seq;
    for (const call of await newCalls(deps, after, seq)) await tellOf(deps, call);
  };
  const stop = deps.feed.listen({
    shedIds: null,
    sessionId: null,
    deviceId: null,
    send: (seq) => {
      running = running
        .then(() => tellFrom(seq))
        .catch((error: unknown) => deps.log.warn({ err: error }, 'a call could not be told of'));
    },
    close: () => undefined,
  });
  return { settled: () => running, stop };
}

async function lastChange({ reads }: TellerDeps): Promise<number> {
  const [row] = await reads.query<{ seq: number | null }[]>(`SELECT MAX("seq") AS "seq" FROM "change"`);
  return row?.seq ?? 0;
}

/** Calls among the changes that nobody has taken back, answered, or ended by the loom's running, and that are not held. */
function newCalls({ reads, now }: TellerDeps, after: number, upTo: number): Promise<CallRecord[]> {
  return reads.query<CallRecord[]>(
    `SELECT e."id", e."shedId", e."at", e."by", l."number" AS "loomNumber", l."alley"
       FROM "change" c JOIN "entry" e ON e."id" = c."ref"
       JOIN "entry_loom" el ON el."seq" = e."seq" AND el."loomId" = e."body" ->> 'loomId'
       JOIN "loom" l ON l."id" = el."loomId"
      WHERE c."seq" > ? AND c."seq" <= ? AND c."kind" = 'entry' AND e."kind" = 'call' AND e."at" > ?
        AND NOT EXISTS (SELECT 1 FROM "entry" t WHERE t."targetId" = e."id" AND t."kind" IN ('attend', 'void'))
        AND (e."targetId" IS NULL OR NOT EXISTS
          (SELECT 1 FROM "entry" r WHERE r."targetId" = e."targetId" AND r."kind" = 'resume'))
        AND NOT EXISTS (SELECT 1 FROM "entry_hold" h WHERE h."entryId" = e."id" AND h."state" <> 'accepted')
      ORDER BY c."seq"`,
    [after, upTo, now() - NEWS],
  );
}

async function tellOf(deps: TellerDeps, call: CallRecord): Promise<void> {
  const keys = await vapidKeys(deps);
  const payload = JSON.stringify(notificationOf(call));
  const gone: string[] = [];
  const outcomes = await Promise.all(
    (await listenersFor(deps, call)).map(async (to): Promise<Delivery> => {
      const delivery = await deps.push.send(keys, to, payload);
      if (delivery === 'gone') gone.push(to.endpoint);
      return delivery;
    }),
  );
  if (outcomes.includes('failed')) deps.log.info({ outcomes }, 'a browser was not told of a call this time');
  if (gone.length > 0)
    await deps.writer.write((tx) =>
      tx.query(`DELETE FROM "push_subscription" WHERE "endpoint" IN (SELECT value FROM json_each(?))`, [
        list(gone),
      ]),
    );
}

/** As Angular's service worker shows it; a tap on it opens the calls. */
function notificationOf({ id, loomNumber, alley }: CallRecord): object {
  return {
    notification: {
      title: `Loom ${loomNumber}`,
      body: `Alley ${alley}: the tackler is called`,
      tag: `call-${id}`,
      icon: '/icons/icon-192x192.png',
      requireInteraction: true,
      vibrate: [300, 150, 300, 150, 600],
      data: { onActionClick: { default: { operation: 'navigateLastFocusedOrOpen', url: '/calls' } } },
    },
  };
}

/** Whoever may see calls of the shed and is signed in still; the alley's own tacklers, where one of them listens. */
async function listenersFor({ reads, now }: TellerDeps, call: CallRecord): Promise<Listener[]> {
  const rows = await reads.query<Listener[]>(
    `SELECT p."endpoint", p."p256dh", p."auth", p."personId", r."roles", r."shedIds"
       FROM "push_subscription" p
       JOIN "session" s ON s."id" = p."sessionId" AND s."endedAt" IS NULL AND s."expiresAt" > ?
       JOIN "device" d ON d."id" = p."deviceId" AND d."revokedAt" IS NULL
       JOIN "person_rights" r ON r."personId" = p."personId" AND r."disabled" = 0 AND r."effectiveAt" =
         (SELECT MAX("effectiveAt") FROM "person_rights" WHERE "personId" = p."personId" AND "effectiveAt" <= ?)`,
    [now(), now()],
  );
  const may = rows.filter(({ personId, roles, shedIds }) => {
    const sheds = JSON.parse(shedIds) as string[];
    const permitted = permissionsOf(JSON.parse(roles) as Role[]).has('calls.read');
    return permitted && personId !== call.by && (sheds.length === 0 || sheds.includes(call.shedId));
  });
  const alley = await reads.manager.findOneBy(AlleyRow, { shedId: call.shedId, name: call.alley });
  const own = may.filter(({ personId }) => alley?.tacklerIds.includes(personId) === true);
  return own.length > 0 ? own : may;
}
