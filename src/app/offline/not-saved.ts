/** Why an entry could not be made durable on this device. It was not saved, and the person must know. */
export const NOT_SAVED = {
  'storage-full':
    'Not saved: this device’s storage is full. What was logged before is safe. Free some space or fetch the foreman, then log it again.',
  'storage-closed':
    'Not saved: this device’s storage did not answer. What was logged before is safe. Close other tabs, reload, then log it again.',
  'newer-version':
    'Not saved: a newer version of Shedbeat has been open here. What was logged before is safe. Reload, then log it again.',
  nobody: 'Not saved: nobody is signed in here. Sign in, then log it again.',
  'no-shed':
    'Not saved: this device has not yet learned which shed it belongs to. Reach the book once, then log it again.',
  malformed:
    'Not saved: something in it is not as it should be. Look at what was entered, then log it again.',
} as const;
export type NotSavedReason = keyof typeof NOT_SAVED;

export class NotSaved extends Error {
  readonly sentence: string;

  constructor(
    readonly reason: NotSavedReason,
    /** What exactly, for whoever mends it. */
    readonly detail = '',
    options?: ErrorOptions,
  ) {
    super(`${reason}${detail ? `: ${detail}` : ''}`, options);
    this.name = 'NotSaved';
    this.sentence = NOT_SAVED[reason];
  }
}

/** Says a storage failure in a person's words. */
export function notSaved(error: unknown): NotSaved {
  if (error instanceof NotSaved) return error;
  const name = error instanceof Error || error instanceof DOMException ? error.name : '';
  if (name === 'QuotaExceededError') return new NotSaved('storage-full', name, { cause: error });
  if (name === 'VersionError') return new NotSaved('newer-version', name, { cause: error });
  return new NotSaved('storage-closed', name, { cause: error });
}
