import { v7 } from 'uuid';

/** A new id: UUID v7, so that ids sort by the moment they were made. Works without a secure context. */
export function newId(): string {
  return v7();
}
