import { createHash } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { PhotoOnWire } from '../../../shared/contract/calls.js';
import { PhotoRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { dropPhoto, writePhoto } from '../../files/photo-files.js';
import { readPicture } from '../../files/picture.js';
import { ApiError } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';
import { entriesById } from '../book/entry-store.js';
import { toPhoto } from './photos.mapper.js';

export interface SentPhoto {
  readonly id: string;
  readonly repairId: string;
  readonly body: Buffer;
}

/**
 * Keeps a photo of a repair. Only the device that logged the repair may send what the repair names; the same picture
 * sent again is the same photo. Throws `photo-no-repair` until the repair is in the book.
 */
export async function keepPhoto(
  deps: Pick<Deps, 'reads' | 'writer' | 'settings' | 'now'>,
  { device }: Principal,
  sent: SentPhoto,
): Promise<PhotoOnWire> {
  if (!device) throw new ApiError('device-unknown');
  const sentHash = createHash('sha256').update(sent.body).digest('hex');
  const known = await keptBefore(deps.reads.manager, sent, sentHash);
  if (known) return toPhoto(known);
  const named = await placeOf(deps.reads.manager, sent);
  if (named.deviceId !== device.id) throw new ApiError('not-permitted');
  const picture = await readPicture(sent.body);
  const { dataDir } = deps.settings;
  const file = await writePhoto(dataDir, picture.jpeg);
  try {
    const row = await deps.writer.write(async (tx) => {
      const meanwhile = await keptBefore(tx, sent, sentHash);
      if (meanwhile) return meanwhile;
      const photo: PhotoRow = {
        id: sent.id,
        repairId: sent.repairId,
        shedId: named.shedId,
        place: named.place,
        file,
        width: picture.width,
        height: picture.height,
        bytes: picture.jpeg.byteLength,
        sentHash,
        deviceId: device.id,
        receivedAt: deps.now(),
      };
      await tx.insert(PhotoRow, photo);
      return photo;
    });
    if (row.file !== file) await dropPhoto(dataDir, file);
    return toPhoto(row);
  } catch (error) {
    await dropPhoto(dataDir, file);
    throw error;
  }
}

/** The file of a photo that the person may see. Throws `not-found`, `other-shed`. */
export async function photoFile(
  { reads }: Pick<Deps, 'reads'>,
  principal: Principal,
  id: string,
): Promise<string> {
  const row = await reads.manager.findOneBy(PhotoRow, { id });
  if (!row) throw new ApiError('not-found');
  if (!maySeeShed(principal, row.shedId)) throw new ApiError('other-shed');
  return row.file;
}

async function keptBefore(from: EntityManager, sent: SentPhoto, sentHash: string): Promise<PhotoRow | null> {
  const row = await from.findOneBy(PhotoRow, { id: sent.id });
  if (row && (row.sentHash !== sentHash || row.repairId !== sent.repairId)) throw new ApiError('photo-other');
  return row;
}

async function placeOf(from: EntityManager, { id, repairId }: SentPhoto) {
  const [repair] = await entriesById(from, [repairId]);
  const place = repair?.entry.kind === 'repair' ? (repair.entry.photoIds ?? []).indexOf(id) : -1;
  if (!repair || place < 0) throw new ApiError('photo-no-repair');
  return { place, shedId: repair.shedId, deviceId: repair.entry.deviceId };
}
