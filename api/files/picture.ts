import sharp from 'sharp';
import { LIMITS } from '../../shared/contract/limits.js';
import { ApiError } from '../middleware/api-error.js';

export interface Picture {
  readonly jpeg: Buffer;
  readonly width: number;
  readonly height: number;
}

const READ = new Set(['jpeg', 'png', 'webp']);

// Pictures are decoded in threads of their own; one at a time is enough, and taps must not wait for them.
sharp.concurrency(1);
sharp.cache(false);

/**
 * Makes a picture of what was sent, whatever it claims to be: decoded, turned upright, no larger than `LIMITS.photoSide`
 * on its longest side, encoded anew. So nothing of what a camera writes beside the picture (place, device, moment) is
 * kept, and nothing that only looks like a picture is.
 *
 * @throws ApiError `photo-not-an-image`, `photo-too-large`
 */
export async function readPicture(sent: Buffer): Promise<Picture> {
  if (sent.byteLength > LIMITS.photoBytes) throw new ApiError('photo-too-large');
  const { format, width, height } = await sharp(sent, { limitInputPixels: false })
    .metadata()
    .catch(() => {
      throw new ApiError('photo-not-an-image');
    });
  if (!READ.has(format)) throw new ApiError('photo-not-an-image');
  if (width * height > LIMITS.photoPixels) throw new ApiError('photo-too-large');
  try {
    const { data, info } = await sharp(sent, { limitInputPixels: LIMITS.photoPixels, failOn: 'truncated' })
      .rotate()
      .resize({ width: LIMITS.photoSide, height: LIMITS.photoSide, fit: 'inside', withoutEnlargement: true })
      .flatten({ background: '#ffffff' })
      .jpeg({ quality: 80 })
      .toBuffer({ resolveWithObject: true });
    return { jpeg: data, width: info.width, height: info.height };
  } catch {
    throw new ApiError('photo-not-an-image');
  }
}
