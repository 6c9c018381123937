/** Where a device's copy of the book has got to. */
export interface Cursor {
  readonly epoch: string;
  readonly scope: string;
  /** The last change it has, and that change's mark: two books agree on both. */
  readonly seq: number;
  readonly ref: string;
  /** In the middle of a snapshot: entries since `from`, those up to place `seq` in the book have been sent. */
  readonly snapshot: { readonly from: number; readonly seq: number } | null;
}

const SEPARATOR = '.';

export function writeCursor({ epoch, scope, seq, ref, snapshot }: Cursor): string {
  const parts = [epoch, scope, String(seq), ref];
  if (snapshot) parts.push(String(snapshot.from), String(snapshot.seq));
  return parts.map((part) => encodeURIComponent(part).replaceAll(SEPARATOR, '%2E')).join(SEPARATOR);
}

/** Null: not one of ours. */
export function readCursor(text: string): Cursor | null {
  const parts = text.split(SEPARATOR).map(decoded);
  const [epoch, scope, seq, ref, from, sent] = parts;
  if (parts.length !== 4 && parts.length !== 6) return null;
  if (epoch == null || scope == null || seq == null || ref == null) return null;
  const numbers = [seq, from ?? '0', sent ?? '0'].map(Number);
  if (!numbers.every((one) => Number.isSafeInteger(one) && one >= 0)) return null;
  const [at = 0, since = 0, place = 0] = numbers;
  return { epoch, scope, seq: at, ref, snapshot: parts.length === 6 ? { from: since, seq: place } : null };
}

function decoded(part: string): string | null {
  try {
    return decodeURIComponent(part);
  } catch {
    return null;
  }
}
