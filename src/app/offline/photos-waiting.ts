import type { ErrorCode } from '@shared/contract/errors';

/** Photos on this device that the book has not got. */
export interface PhotosWaiting {
  readonly waiting: number;
  /** The server will not have them. */
  readonly refused: readonly { readonly id: string; readonly code: ErrorCode }[];
}

export const NO_PHOTOS: PhotosWaiting = { waiting: 0, refused: [] };
