import { LIMITS } from '../../../shared/contract/limits.js';
import type { PushRequest, PushResponse } from '../../../shared/contract/sync.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { ingestEntries } from '../book/ingest.js';

type Sent = Omit<PushRequest, 'entries'> & { readonly entries: readonly unknown[] };

/** Takes what a device hands in, in one transaction: acknowledged is stored, or nothing is. */
export async function push(
  { writer, feed, now }: Pick<Deps, 'writer' | 'feed' | 'now'>,
  { device }: Principal,
  sent: Sent,
): Promise<PushResponse> {
  if (!device) throw new ApiError('device-unknown');
  if (sent.entries.length > LIMITS.entriesPerPush) throw new ApiError('too-many-entries');
  const serverNow = now();
  const offset = serverNow - sent.sentAt;
  const { results, changed } = await writer.write(async (tx) => {
    await tx.query(
      `UPDATE "device" SET "lastSeenAt" = ?, "clockOffset" = ?, "appVersion" = COALESCE(?, "appVersion") WHERE "id" = ?`,
      [serverNow, offset, sent.appVersion ?? null, device.id],
    );
    return ingestEntries(tx, sent.entries, {
      deviceId: device.id,
      deviceRevoked: device.revoked,
      tabletShedId: device.kind === 'tablet' ? device.shedId : null,
      sentAt: sent.sentAt,
      serverNow,
    });
  });
  if (changed.seq !== null) for (const shedId of changed.shedIds) feed.announce(shedId, changed.seq);
  return { serverNow, offset, results };
}
