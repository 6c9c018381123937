import { LIMITS } from '@shared/contract/limits';

const QUALITY = 0.8;

/**
 * A picture small enough to be kept and sent: upright, at most `LIMITS.photoSide` px on its longest side, JPEG. Drawn
 * anew, so nothing of what the camera wrote beside it (place, device) leaves this page. Throws where the browser
 * cannot read it.
 */
export async function shrinkPhoto(file: Blob): Promise<Blob> {
  const picture = await createImageBitmap(file, { imageOrientation: 'from-image' });
  try {
    const { width, height } = fitted(picture, LIMITS.photoSide);
    const canvas = document.createElement('canvas');
    canvas.width = width;
    canvas.height = height;
    const context = canvas.getContext('2d');
    if (!context) throw new Error('no canvas');
    context.fillStyle = 'white';
    context.fillRect(0, 0, width, height);
    context.drawImage(picture, 0, 0, width, height);
    return await new Promise((resolve, reject) =>
      canvas.toBlob(
        (blob) => (blob ? resolve(blob) : reject(new Error('no picture'))),
        'image/jpeg',
        QUALITY,
      ),
    );
  } finally {
    picture.close();
  }
}

/** Width and height at most so long on the longest side, px; what is smaller stays as it is. */
export function fitted(
  { width, height }: { readonly width: number; readonly height: number },
  side: number,
): { width: number; height: number } {
  const scale = Math.min(1, side / Math.max(width, height));
  return { width: Math.max(1, Math.round(width * scale)), height: Math.max(1, Math.round(height * scale)) };
}
