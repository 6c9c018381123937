import { LIMITS } from '../../../shared/contract/limits.js';
import type { PushRequest, PushResponse } from '../../../shared/contract/sync.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { ingestEntries } from '../book/ingest.js';
import { readCursor, writeCursor } from './cursor.js';
import { isOfThisBook } from './pull.service.js';
import { lastChange } from './snapshot.js';

type Sent = Omit<PushRequest, 'entries'> & { readonly entries: readonly unknown[] };

/** Takes what a device hands in, in one transaction: acknowledged is stored, or nothing is. */
export async function push(
  { writer, feed, now, epoch }: Pick<Deps, 'writer' | 'feed' | 'now' | 'epoch'>,
  { device }: Principal,
  sent: Sent,
): Promise<PushResponse> {
  if (!device) throw new ApiError('device-unknown');
  if (sent.entries.length > LIMITS.entriesPerPush) throw new ApiError('too-many-entries');
  const serverNow = now();
  const offset = serverNow - sent.sentAt;
  const { results, changed, ...book } = await writer.write(async (tx) => {
    await tx.query(
      `UPDATE "device" SET "lastSeenAt" = ?, "clockOffset" = ?, "appVersion" = COALESCE(?, "appVersion"),
        "waiting" = ?, "persisted" = COALESCE(?, "persisted") WHERE "id" = ?`,
      [serverNow, offset, sent.appVersion ?? null, waitingAfter(sent), persistedOf(sent), device.id],
    );
    const forgot = sent.seen !== undefined && !(await isOfThisBook(tx, epoch, readCursor(sent.seen)));
    const ingested = await ingestEntries(tx, sent.entries, {
      deviceId: device.id,
      deviceRevoked: device.revoked,
      tabletShedId: device.kind === 'tablet' ? device.shedId : null,
      sentAt: sent.sentAt,
      serverNow,
    });
    const mark = writeCursor({ epoch, scope: '', ...(await lastChange(tx)), snapshot: null });
    return { ...ingested, mark, resend: forgot };
  });
  if (changed.seq !== null) for (const shedId of changed.shedIds) feed.announce(shedId, changed.seq);
  return { serverNow, offset, results, ...book };
}

/** Those that wait behind these. */
function waitingAfter({ waiting, entries }: Sent): number | null {
  return waiting === undefined ? null : Math.max(0, waiting - entries.length);
}

function persistedOf({ persisted }: Sent): number | null {
  return persisted === undefined ? null : Number(persisted);
}
