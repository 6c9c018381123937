import type { EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { BringInResponse, PushResult } from '../../../shared/contract/sync.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';
import { push } from '../book/bulk.js';
import { ingestEntries } from '../book/ingest.js';

interface Origin {
  readonly id: string;
  readonly revokedAt: number | null;
  /** Server minus device, ms, at its last exchange. */
  readonly clockOffset: number | null;
}

/**
 * Takes what a device could not send and a person exported: through the one ingest, so that grants, rights, looms and
 * times are checked as ever, and what the book has already is a duplicate. The author stays who it was; the clock is
 * corrected by what was last measured of the device that logged it.
 */
export async function bringIn(
  { writer, feed, now, log }: Pick<Deps, 'writer' | 'feed' | 'now' | 'log'>,
  principal: Principal,
  entries: readonly unknown[],
): Promise<BringInResponse> {
  if (entries.length > LIMITS.entriesPerPush) throw new ApiError('too-many-entries');
  const results = new Array<PushResult>(entries.length);
  const byDevice = new Map<string, number[]>();
  entries.forEach((entry, index) => {
    if (isOfOtherShed(principal, entry)) results[index] = otherShed(entry, index);
    else push(byDevice, textOf(entry, 'deviceId') ?? '', index);
  });
  const serverNow = now();
  const changed = await writer.write(async (tx) => {
    const told = [];
    for (const [deviceId, places] of byDevice) {
      const origin = await originOf(tx, deviceId);
      const ingested = await ingestEntries(
        tx,
        places.map((place) => entries[place]),
        {
          deviceId: null,
          deviceRevoked: origin !== null && origin.revokedAt !== null,
          tabletShedId: null,
          sentAt: serverNow - (origin?.clockOffset ?? 0),
          serverNow,
        },
      );
      for (const result of ingested.results) {
        const index = places[result.index] ?? 0;
        results[index] = { ...result, index };
      }
      told.push(ingested.changed);
    }
    return told;
  });
  for (const { seq, shedIds } of changed)
    if (seq !== null) for (const shedId of shedIds) feed.announce(shedId, seq);
  log.info({ by: principal.person?.id, entries: entries.length }, 'entries were brought in from a file');
  return { results };
}

async function originOf(tx: EntityManager, id: string): Promise<Origin | null> {
  const [row] = await tx.query<Origin[]>(
    `SELECT "id", "revokedAt", "clockOffset" FROM "device" WHERE "id" = ?`,
    [id],
  );
  return row ?? null;
}

function isOfOtherShed(principal: Principal, entry: unknown): boolean {
  const shedId = textOf(entry, 'shedId');
  return shedId !== null && !maySeeShed(principal, shedId);
}

function otherShed(entry: unknown, index: number): PushResult {
  return { id: textOf(entry, 'id'), index, result: 'refused', code: 'entry-other-shed' };
}

function textOf(entry: unknown, key: string): string | null {
  if (typeof entry !== 'object' || entry === null) return null;
  const value: unknown = Reflect.get(entry, key);
  return typeof value === 'string' ? value : null;
}
