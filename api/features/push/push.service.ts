import type { PushSubscriptionOnWire } from '../../../shared/contract/calls.js';
import { PushSubscriptionRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';

/** Browsers of one person that are told of calls; the oldest gives way. */
const MOST = 8;

/** Tells this browser of calls from now on, for as long as this sign-in lasts. */
export async function subscribe(
  { writer, push, now }: Pick<Deps, 'writer' | 'push' | 'now'>,
  { person, device }: Principal,
  { endpoint, keys }: PushSubscriptionOnWire,
): Promise<void> {
  if (!person || !device) throw new ApiError('not-signed-in');
  if (!push.takes(endpoint)) throw new ApiError('push-address-refused');
  await writer.write(async (tx) => {
    await tx.upsert(
      PushSubscriptionRow,
      {
        endpoint,
        p256dh: keys.p256dh,
        auth: keys.auth,
        personId: person.id,
        deviceId: device.id,
        sessionId: person.sessionId,
        since: now(),
      },
      ['endpoint'],
    );
    await tx.query(
      `DELETE FROM "push_subscription" WHERE "personId" = ? AND "endpoint" NOT IN
        (SELECT "endpoint" FROM "push_subscription" WHERE "personId" = ? ORDER BY "since" DESC, "endpoint" LIMIT ?)`,
      [person.id, person.id, MOST],
    );
  });
}

/** Tells it no more. Somebody else's stays. */
export async function endSubscription(
  { writer }: Pick<Deps, 'writer'>,
  { person }: Principal,
  endpoint: string,
): Promise<void> {
  await writer.write((tx) => tx.delete(PushSubscriptionRow, { endpoint, personId: person?.id ?? '' }));
}
